import { DataTypes, type InferAttributes, type InferCreationAttributes, Model } from "sequelize";
import { db } from "#app/lib/db.server.ts";

/** A winter, 1 July to 30 June. */
export class Season extends Model<InferAttributes<Season>, InferCreationAttributes<Season>> {
  declare startYear: number; // 2025 is the winter 2025-26
  declare figuresDueOn: string;
}

Season.init(
  {
    startYear: { type: DataTypes.INTEGER.UNSIGNED, primaryKey: true },
    figuresDueOn: { type: DataTypes.DATEONLY, allowNull: false },
  },
  { sequelize: db, tableName: "season" },
);
