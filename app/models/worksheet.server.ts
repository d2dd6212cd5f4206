import { type CreationOptional, DataTypes, type InferAttributes, type InferCreationAttributes, Model } from "sequelize";
import { db } from "#app/lib/db.server.ts";

/** A worksheet as the server last took it from a phone. Finished ones have become a calibration and stay as they are. */
export class StoredWorksheet extends Model<InferAttributes<StoredWorksheet>, InferCreationAttributes<StoredWorksheet>> {
  declare id: CreationOptional<number>;
  declare townId: number;
  declare clientRef: string;
  declare truckId: number;
  declare materialId: number;
  declare version: CreationOptional<number>;
  declare content: unknown;
  declare state: CreationOptional<"open" | "finished">;
  declare calibrationId: CreationOptional<number | null>;
  declare device: CreationOptional<string>;
  declare createdById: number;
  declare updatedById: number;
  declare createdAt: Date;
  declare updatedAt: Date;
}

StoredWorksheet.init(
  {
    id: { type: DataTypes.INTEGER.UNSIGNED, autoIncrement: true, primaryKey: true },
    townId: { type: DataTypes.INTEGER.UNSIGNED, allowNull: false },
    clientRef: { type: DataTypes.STRING(36), allowNull: false },
    truckId: { type: DataTypes.INTEGER.UNSIGNED, allowNull: false },
    materialId: { type: DataTypes.INTEGER.UNSIGNED, allowNull: false },
    version: DataTypes.INTEGER.UNSIGNED,
    content: { type: DataTypes.JSON, allowNull: false },
    state: DataTypes.STRING(12),
    calibrationId: DataTypes.INTEGER.UNSIGNED,
    device: DataTypes.STRING(80),
    createdById: { type: DataTypes.INTEGER.UNSIGNED, allowNull: false },
    updatedById: { type: DataTypes.INTEGER.UNSIGNED, allowNull: false },
    createdAt: { type: DataTypes.DATE(3), allowNull: false },
    updatedAt: { type: DataTypes.DATE(3), allowNull: false },
  },
  { sequelize: db, tableName: "worksheet" },
);
