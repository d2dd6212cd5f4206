import { type CreationOptional, DataTypes, type InferAttributes, type InferCreationAttributes, Model } from "sequelize";
import { db } from "#app/lib/db.server.ts";

export type MaterialKind = "salt" | "mix" | "sand" | "brine";

/** What a town spreads. */
export class Material extends Model<InferAttributes<Material>, InferCreationAttributes<Material>> {
  declare id: CreationOptional<number>;
  declare townId: number;
  declare name: string;
  declare kind: MaterialKind;
  declare saltShare: number; // 0 to 1 by weight
  declare priceCentsPerTon: CreationOptional<number | null>;
}

Material.init(
  {
    id: { type: DataTypes.INTEGER.UNSIGNED, autoIncrement: true, primaryKey: true },
    townId: { type: DataTypes.INTEGER.UNSIGNED, allowNull: false },
    name: { type: DataTypes.STRING(60), allowNull: false },
    kind: { type: DataTypes.STRING(24), allowNull: false },
    saltShare: { type: DataTypes.DOUBLE, allowNull: false },
    priceCentsPerTon: DataTypes.INTEGER.UNSIGNED,
  },
  { sequelize: db, tableName: "material" },
);
