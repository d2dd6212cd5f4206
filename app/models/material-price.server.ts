import { DataTypes, type InferAttributes, type InferCreationAttributes, Model } from "sequelize";
import { db } from "#app/lib/db.server.ts";

/** What a town pays for a ton of a material in one season. */
export class MaterialPrice extends Model<InferAttributes<MaterialPrice>, InferCreationAttributes<MaterialPrice>> {
  declare materialId: number;
  declare seasonStartYear: number;
  declare centsPerTon: number;
}

MaterialPrice.init(
  {
    materialId: { type: DataTypes.INTEGER.UNSIGNED, primaryKey: true },
    seasonStartYear: { type: DataTypes.INTEGER.UNSIGNED, primaryKey: true },
    centsPerTon: { type: DataTypes.INTEGER.UNSIGNED, allowNull: false },
  },
  { sequelize: db, tableName: "material_price" },
);
