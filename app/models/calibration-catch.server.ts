import { type CreationOptional, DataTypes, type InferAttributes, type InferCreationAttributes, Model } from "sequelize";
import { db } from "#app/lib/db.server.ts";

/** Material caught over counted revolutions, and weighed. */
export class CalibrationCatch extends Model<
  InferAttributes<CalibrationCatch>,
  InferCreationAttributes<CalibrationCatch>
> {
  declare id: CreationOptional<number>;
  declare calibrationId: number;
  declare position: number;
  declare revolutions: number;
  declare grossLb: number;
  declare tareLb: CreationOptional<number>;
}

CalibrationCatch.init(
  {
    id: { type: DataTypes.INTEGER.UNSIGNED, autoIncrement: true, primaryKey: true },
    calibrationId: { type: DataTypes.INTEGER.UNSIGNED, allowNull: false },
    position: { type: DataTypes.INTEGER.UNSIGNED, allowNull: false },
    revolutions: { type: DataTypes.DOUBLE, allowNull: false },
    grossLb: { type: DataTypes.DOUBLE, allowNull: false },
    tareLb: DataTypes.DOUBLE,
  },
  { sequelize: db, tableName: "calibration_catch" },
);
