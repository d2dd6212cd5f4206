import {
  type CreationOptional,
  DataTypes,
  type InferAttributes,
  type InferCreationAttributes,
  Model,
  type NonAttribute,
} from "sequelize";
import { db } from "#app/lib/db.server.ts";
import type { Material } from "./material.server.ts";
import type { CalibrationCount } from "./calibration-count.server.ts";
import type { CalibrationCatch } from "./calibration-catch.server.ts";

/** One truck, one material, one gate opening, one day in the yard. Approved ones are never changed. */
export class Calibration extends Model<InferAttributes<Calibration>, InferCreationAttributes<Calibration>> {
  declare id: CreationOptional<number>;
  declare clientRef: string;
  declare townId: number;
  declare truckId: number;
  declare materialId: number;
  declare testedOn: string; // local date, YYYY-MM-DD
  declare gateOpeningIn: number | null; // null for liquid alone: tanks have no gate
  declare method: CreationOptional<"counts" | "timed-catch">;
  declare gateScaleMark: CreationOptional<string | null>;
  /** Whose counts were used again after a gate change. */
  declare countsFromCalibrationId: CreationOptional<number | null>;
  declare sameDayNumber: CreationOptional<number>;
  declare note: CreationOptional<string>;
  declare state: CreationOptional<"ready" | "approved">;
  declare uploadId: CreationOptional<number | null>;
  declare createdById: CreationOptional<number | null>;
  declare createdAt: Date;
  declare approvedAt: CreationOptional<Date | null>;
  declare approvedById: CreationOptional<number | null>;
  declare material?: NonAttribute<Material>;
  declare counts?: NonAttribute<CalibrationCount[]>;
  declare catches?: NonAttribute<CalibrationCatch[]>;
}

Calibration.init(
  {
    id: { type: DataTypes.INTEGER.UNSIGNED, autoIncrement: true, primaryKey: true },
    clientRef: { type: DataTypes.STRING(36), allowNull: false },
    townId: { type: DataTypes.INTEGER.UNSIGNED, allowNull: false },
    truckId: { type: DataTypes.INTEGER.UNSIGNED, allowNull: false },
    materialId: { type: DataTypes.INTEGER.UNSIGNED, allowNull: false },
    testedOn: { type: DataTypes.DATEONLY, allowNull: false },
    gateOpeningIn: DataTypes.DOUBLE,
    method: DataTypes.STRING(16),
    gateScaleMark: DataTypes.STRING(20),
    countsFromCalibrationId: DataTypes.INTEGER.UNSIGNED,
    sameDayNumber: DataTypes.INTEGER.UNSIGNED,
    note: DataTypes.STRING(500),
    state: DataTypes.STRING(24),
    uploadId: DataTypes.INTEGER.UNSIGNED,
    createdById: DataTypes.INTEGER.UNSIGNED,
    createdAt: { type: DataTypes.DATE(3), allowNull: false },
    approvedAt: DataTypes.DATE(3),
    approvedById: DataTypes.INTEGER.UNSIGNED,
  },
  { sequelize: db, tableName: "calibration" },
);
