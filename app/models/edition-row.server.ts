import { DataTypes, type InferAttributes, type InferCreationAttributes, Model } from "sequelize";
import { db } from "#app/lib/db.server.ts";

/** One row of the protected row file. */
export class EditionRow extends Model<InferAttributes<EditionRow>, InferCreationAttributes<EditionRow>> {
  declare editionId: number;
  declare position: number;
  declare content: unknown;
}

EditionRow.init(
  {
    editionId: { type: DataTypes.INTEGER.UNSIGNED, primaryKey: true },
    position: { type: DataTypes.INTEGER.UNSIGNED, primaryKey: true },
    content: { type: DataTypes.JSON, allowNull: false },
  },
  { sequelize: db, tableName: "edition_row" },
);
