import { type CreationOptional, DataTypes, type InferAttributes, type InferCreationAttributes, Model } from "sequelize";
import { db } from "#app/lib/db.server.ts";

/** Material caught over a stretch of time at one feed setting, and weighed. */
export class CalibrationTimedCatch extends Model<
  InferAttributes<CalibrationTimedCatch>,
  InferCreationAttributes<CalibrationTimedCatch>
> {
  declare id: CreationOptional<number>;
  declare calibrationId: number;
  declare position: number;
  declare setting: number;
  declare seconds: number;
  declare grossLb: number;
  declare tareLb: CreationOptional<number>;
}

CalibrationTimedCatch.init(
  {
    id: { type: DataTypes.INTEGER.UNSIGNED, autoIncrement: true, primaryKey: true },
    calibrationId: { type: DataTypes.INTEGER.UNSIGNED, allowNull: false },
    position: { type: DataTypes.INTEGER.UNSIGNED, allowNull: false },
    setting: { type: DataTypes.INTEGER.UNSIGNED, allowNull: false },
    seconds: { type: DataTypes.DOUBLE, allowNull: false },
    grossLb: { type: DataTypes.DOUBLE, allowNull: false },
    tareLb: DataTypes.DOUBLE,
  },
  { sequelize: db, tableName: "calibration_timed_catch" },
);
