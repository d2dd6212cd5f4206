import { type CreationOptional, DataTypes, type InferAttributes, type InferCreationAttributes, Model } from "sequelize";
import { db } from "#app/lib/db.server.ts";

/** What a phone sent that met a newer version: kept until a person has settled it, and after. */
export class WorksheetVersion extends Model<
  InferAttributes<WorksheetVersion>,
  InferCreationAttributes<WorksheetVersion>
> {
  declare id: CreationOptional<number>;
  declare worksheetId: number;
  declare baseVersion: number;
  declare content: unknown;
  declare device: CreationOptional<string>;
  declare byUserId: number;
  declare createdAt: Date;
  declare settledAt: CreationOptional<Date | null>;
}

WorksheetVersion.init(
  {
    id: { type: DataTypes.INTEGER.UNSIGNED, autoIncrement: true, primaryKey: true },
    worksheetId: { type: DataTypes.INTEGER.UNSIGNED, allowNull: false },
    baseVersion: { type: DataTypes.INTEGER.UNSIGNED, allowNull: false },
    content: { type: DataTypes.JSON, allowNull: false },
    device: DataTypes.STRING(80),
    byUserId: { type: DataTypes.INTEGER.UNSIGNED, allowNull: false },
    createdAt: { type: DataTypes.DATE(3), allowNull: false },
    settledAt: DataTypes.DATE(3),
  },
  { sequelize: db, tableName: "worksheet_version" },
);
