import { DataTypes, type InferAttributes, type InferCreationAttributes, Model } from "sequelize";
import { db } from "#app/lib/db.server.ts";

/** What the coordinator says about one field of a sent version. */
export class FigureNote extends Model<InferAttributes<FigureNote>, InferCreationAttributes<FigureNote>> {
  declare figureId: number;
  declare version: number;
  declare field: string;
  declare note: string;
}

FigureNote.init(
  {
    figureId: { type: DataTypes.INTEGER.UNSIGNED, primaryKey: true },
    version: { type: DataTypes.INTEGER.UNSIGNED, primaryKey: true },
    field: { type: DataTypes.STRING(24), primaryKey: true },
    note: { type: DataTypes.STRING(500), allowNull: false },
  },
  { sequelize: db, tableName: "figure_note" },
);
