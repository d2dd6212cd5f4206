import { type CreationOptional, DataTypes, type InferAttributes, type InferCreationAttributes, Model } from "sequelize";
import type { MaterialKind } from "#app/domain/calibration/band.ts";
import { db } from "#app/lib/db.server.ts";

/** A band that a town, or the network for all towns, has set in place of common practice. */
export class StoredBand extends Model<InferAttributes<StoredBand>, InferCreationAttributes<StoredBand>> {
  declare id: CreationOptional<number>;
  /** Null is the network's own. */
  declare townId: CreationOptional<number | null>;
  declare materialKind: MaterialKind;
  declare lowLbPerLaneMile: number;
  declare highLbPerLaneMile: number;
}

StoredBand.init(
  {
    id: { type: DataTypes.INTEGER.UNSIGNED, autoIncrement: true, primaryKey: true },
    townId: DataTypes.INTEGER.UNSIGNED,
    materialKind: { type: DataTypes.STRING(12), allowNull: false },
    lowLbPerLaneMile: { type: DataTypes.DOUBLE, allowNull: false },
    highLbPerLaneMile: { type: DataTypes.DOUBLE, allowNull: false },
  },
  { sequelize: db, tableName: "band" },
);
