import { type CreationOptional, DataTypes, type InferAttributes, type InferCreationAttributes, Model } from "sequelize";
import { db } from "#app/lib/db.server.ts";

/** Shaft revolutions counted at one feed setting. */
export class CalibrationCount extends Model<
  InferAttributes<CalibrationCount>,
  InferCreationAttributes<CalibrationCount>
> {
  declare id: CreationOptional<number>;
  declare calibrationId: number;
  declare setting: number;
  declare revolutions: number;
  declare seconds: number;
  declare rpm: CreationOptional<number | null>;
}

CalibrationCount.init(
  {
    id: { type: DataTypes.INTEGER.UNSIGNED, autoIncrement: true, primaryKey: true },
    calibrationId: { type: DataTypes.INTEGER.UNSIGNED, allowNull: false },
    setting: { type: DataTypes.INTEGER.UNSIGNED, allowNull: false },
    revolutions: { type: DataTypes.DOUBLE, allowNull: false },
    seconds: { type: DataTypes.DOUBLE, allowNull: false },
    rpm: DataTypes.INTEGER.UNSIGNED,
  },
  { sequelize: db, tableName: "calibration_count" },
);
