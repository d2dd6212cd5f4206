import { type CreationOptional, DataTypes, type InferAttributes, type InferCreationAttributes, Model } from "sequelize";
import { db } from "#app/lib/db.server.ts";

/** Liquid caught over a stretch of time: wetting the dry material, or laid on the road by itself. */
export class CalibrationLiquid extends Model<
  InferAttributes<CalibrationLiquid>,
  InferCreationAttributes<CalibrationLiquid>
> {
  declare id: CreationOptional<number>;
  declare calibrationId: number;
  declare position: number;
  declare kind: "prewet" | "direct";
  declare gallons: number;
  declare seconds: number;
  declare speedMph: CreationOptional<number | null>;
  declare lanes: CreationOptional<number | null>;
  declare dryLbPerMin: CreationOptional<number | null>;
}

CalibrationLiquid.init(
  {
    id: { type: DataTypes.INTEGER.UNSIGNED, autoIncrement: true, primaryKey: true },
    calibrationId: { type: DataTypes.INTEGER.UNSIGNED, allowNull: false },
    position: { type: DataTypes.INTEGER.UNSIGNED, allowNull: false },
    kind: { type: DataTypes.STRING(12), allowNull: false },
    gallons: { type: DataTypes.DOUBLE, allowNull: false },
    seconds: { type: DataTypes.DOUBLE, allowNull: false },
    speedMph: DataTypes.DOUBLE,
    lanes: DataTypes.INTEGER.UNSIGNED,
    dryLbPerMin: DataTypes.DOUBLE,
  },
  { sequelize: db, tableName: "calibration_liquid" },
);
