import { type CreationOptional, DataTypes, type InferAttributes, type InferCreationAttributes, Model } from "sequelize";
import { db } from "#app/lib/db.server.ts";

/** What one line of the storm log used of one material. Solids by weight, liquids by volume. */
export class StormMaterial extends Model<InferAttributes<StormMaterial>, InferCreationAttributes<StormMaterial>> {
  declare stormId: number;
  declare materialId: number;
  declare usedLb: CreationOptional<number | null>;
  declare usedGal: CreationOptional<number | null>;
}

StormMaterial.init(
  {
    stormId: { type: DataTypes.INTEGER.UNSIGNED, primaryKey: true },
    materialId: { type: DataTypes.INTEGER.UNSIGNED, primaryKey: true },
    usedLb: DataTypes.DOUBLE,
    usedGal: DataTypes.DOUBLE,
  },
  { sequelize: db, tableName: "storm_material" },
);
