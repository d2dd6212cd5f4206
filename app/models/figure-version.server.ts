import { DataTypes, type InferAttributes, type InferCreationAttributes, Model } from "sequelize";
import { db } from "#app/lib/db.server.ts";

/** A town’s figures as they were sent, once for every time. Written once, never changed. */
export class FigureVersion extends Model<InferAttributes<FigureVersion>, InferCreationAttributes<FigureVersion>> {
  declare figureId: number;
  declare version: number;
  declare content: unknown;
  declare sentAt: Date;
  declare sentById: number;
}

FigureVersion.init(
  {
    figureId: { type: DataTypes.INTEGER.UNSIGNED, primaryKey: true },
    version: { type: DataTypes.INTEGER.UNSIGNED, primaryKey: true },
    content: { type: DataTypes.JSON, allowNull: false },
    sentAt: { type: DataTypes.DATE(3), allowNull: false },
    sentById: { type: DataTypes.INTEGER.UNSIGNED, allowNull: false },
  },
  { sequelize: db, tableName: "figure_version" },
);
