import { type CreationOptional, DataTypes, type InferAttributes, type InferCreationAttributes, Model } from "sequelize";
import { db } from "#app/lib/db.server.ts";

/** A winter, 1 July to 30 June. */
export class Season extends Model<InferAttributes<Season>, InferCreationAttributes<Season>> {
  declare startYear: number; // 2025 is the winter 2025-26
  declare figuresDueOn: string;
  declare opensOn: CreationOptional<string | null>; // from that day on towns enter it; null = since ever
  declare closesOn: CreationOptional<string | null>; // after that day towns change nothing; null = not closed
}

Season.init(
  {
    startYear: { type: DataTypes.INTEGER.UNSIGNED, primaryKey: true },
    figuresDueOn: { type: DataTypes.DATEONLY, allowNull: false },
    opensOn: DataTypes.DATEONLY,
    closesOn: DataTypes.DATEONLY,
  },
  { sequelize: db, tableName: "season" },
);
