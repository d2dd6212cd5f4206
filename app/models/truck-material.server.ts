import { type CreationOptional, DataTypes, type InferAttributes, type InferCreationAttributes, Model } from "sequelize";
import { db } from "#app/lib/db.server.ts";

/** A material that a truck carries. */
export class TruckMaterial extends Model<InferAttributes<TruckMaterial>, InferCreationAttributes<TruckMaterial>> {
  declare truckId: number;
  declare materialId: number;
  /** First local day of a new material or supplier: calibrations before it no longer hold. */
  declare sinceOn: CreationOptional<string | null>;
}

TruckMaterial.init(
  {
    truckId: { type: DataTypes.INTEGER.UNSIGNED, allowNull: false, primaryKey: true },
    materialId: { type: DataTypes.INTEGER.UNSIGNED, allowNull: false, primaryKey: true },
    sinceOn: DataTypes.DATEONLY,
  },
  { sequelize: db, tableName: "truck_material" },
);
