import { type CreationOptional, DataTypes, type InferAttributes, type InferCreationAttributes, Model } from "sequelize";
import { db } from "#app/lib/db.server.ts";

/** What a ground-speed controller laid at a simulated speed, against what it was told to lay. */
export class CalibrationVerification extends Model<
  InferAttributes<CalibrationVerification>,
  InferCreationAttributes<CalibrationVerification>
> {
  declare id: CreationOptional<number>;
  declare calibrationId: number;
  declare position: number;
  declare speedMph: number;
  declare commandedLbPerLaneMile: number;
  declare seconds: number;
  declare grossLb: number;
  declare tareLb: CreationOptional<number>;
}

CalibrationVerification.init(
  {
    id: { type: DataTypes.INTEGER.UNSIGNED, autoIncrement: true, primaryKey: true },
    calibrationId: { type: DataTypes.INTEGER.UNSIGNED, allowNull: false },
    position: { type: DataTypes.INTEGER.UNSIGNED, allowNull: false },
    speedMph: { type: DataTypes.DOUBLE, allowNull: false },
    commandedLbPerLaneMile: { type: DataTypes.DOUBLE, allowNull: false },
    seconds: { type: DataTypes.DOUBLE, allowNull: false },
    grossLb: { type: DataTypes.DOUBLE, allowNull: false },
    tareLb: DataTypes.DOUBLE,
  },
  { sequelize: db, tableName: "calibration_verification" },
);
