import { type CreationOptional, DataTypes, type InferAttributes, type InferCreationAttributes, Model } from "sequelize";
import type { ControlKind, SpreaderKind } from "#app/domain/fleet/truck.ts";
import { db } from "#app/lib/db.server.ts";

/** A truck with its spreader. */
export class Truck extends Model<InferAttributes<Truck>, InferCreationAttributes<Truck>> {
  declare id: CreationOptional<number>;
  declare townId: number;
  declare unitNumber: string;
  declare body: CreationOptional<string>;
  declare spreaderKind: SpreaderKind;
  declare control: ControlKind;
  declare lanesPerPass: CreationOptional<number>;
  declare workingSpeedMph: number;
  declare workingSetting: number;
  declare workingRpm: CreationOptional<number | null>;
  declare gateMaxIn: CreationOptional<number | null>;
  declare capacityTons: CreationOptional<number | null>;
  declare isInService: CreationOptional<boolean>;
  declare createdAt: Date;
}

Truck.init(
  {
    id: { type: DataTypes.INTEGER.UNSIGNED, autoIncrement: true, primaryKey: true },
    townId: { type: DataTypes.INTEGER.UNSIGNED, allowNull: false },
    unitNumber: { type: DataTypes.STRING(20), allowNull: false },
    body: DataTypes.STRING(60),
    spreaderKind: { type: DataTypes.STRING(24), allowNull: false },
    control: { type: DataTypes.STRING(24), allowNull: false },
    lanesPerPass: DataTypes.INTEGER.UNSIGNED,
    workingSpeedMph: { type: DataTypes.DOUBLE, allowNull: false },
    workingSetting: { type: DataTypes.INTEGER.UNSIGNED, allowNull: false },
    workingRpm: DataTypes.INTEGER.UNSIGNED,
    gateMaxIn: DataTypes.DOUBLE,
    capacityTons: DataTypes.DOUBLE,
    isInService: DataTypes.BOOLEAN,
    createdAt: { type: DataTypes.DATE(3), allowNull: false },
  },
  { sequelize: db, tableName: "truck" },
);
