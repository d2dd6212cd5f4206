import { type CreationOptional, DataTypes, type InferAttributes, type InferCreationAttributes, Model } from "sequelize";
import { db } from "#app/lib/db.server.ts";

/** A frozen, published set of protected peer figures. Inserted once, never changed. */
export class Edition extends Model<InferAttributes<Edition>, InferCreationAttributes<Edition>> {
  declare id: CreationOptional<number>;
  declare seasonStartYear: number;
  declare number: number;
  declare publishedAt: Date;
  declare publishedById: CreationOptional<number | null>;
  declare engineVersion: string;
  declare townCount: number;
  declare policy: unknown;
  declare inputSha256: string;
  declare contentSha256: string;
}

Edition.init(
  {
    id: { type: DataTypes.INTEGER.UNSIGNED, autoIncrement: true, primaryKey: true },
    seasonStartYear: { type: DataTypes.INTEGER.UNSIGNED, allowNull: false },
    number: { type: DataTypes.INTEGER.UNSIGNED, allowNull: false },
    publishedAt: { type: DataTypes.DATE(3), allowNull: false },
    publishedById: DataTypes.INTEGER.UNSIGNED,
    engineVersion: { type: DataTypes.STRING(20), allowNull: false },
    townCount: { type: DataTypes.INTEGER.UNSIGNED, allowNull: false },
    policy: { type: DataTypes.JSON, allowNull: false },
    inputSha256: { type: DataTypes.STRING(64), allowNull: false },
    contentSha256: { type: DataTypes.STRING(64), allowNull: false },
  },
  { sequelize: db, tableName: "edition" },
);
