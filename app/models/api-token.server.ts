import { type CreationOptional, DataTypes, type InferAttributes, type InferCreationAttributes, Model } from "sequelize";
import { db } from "#app/lib/db.server.ts";

/** A key to the dataset for a program. Holds the hash of the secret. */
export class ApiToken extends Model<InferAttributes<ApiToken>, InferCreationAttributes<ApiToken>> {
  declare id: CreationOptional<number>;
  declare clientRef: string;
  declare lookupId: string;
  declare secretSha256: string;
  declare userId: number;
  declare name: string;
  declare createdAt: Date;
  declare expiresAt: Date;
  declare lastUsedOn: CreationOptional<string | null>;
  declare revokedAt: CreationOptional<Date | null>;
}

ApiToken.init(
  {
    id: { type: DataTypes.INTEGER.UNSIGNED, autoIncrement: true, primaryKey: true },
    clientRef: { type: DataTypes.STRING(36), allowNull: false },
    lookupId: { type: DataTypes.STRING(8), allowNull: false },
    secretSha256: { type: DataTypes.STRING(64), allowNull: false },
    userId: { type: DataTypes.INTEGER.UNSIGNED, allowNull: false },
    name: { type: DataTypes.STRING(80), allowNull: false },
    createdAt: { type: DataTypes.DATE(3), allowNull: false },
    expiresAt: { type: DataTypes.DATE(3), allowNull: false },
    lastUsedOn: DataTypes.DATEONLY,
    revokedAt: DataTypes.DATE(3),
  },
  { sequelize: db, tableName: "api_token" },
);
