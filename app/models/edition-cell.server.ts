import { type CreationOptional, DataTypes, type InferAttributes, type InferCreationAttributes, Model } from "sequelize";
import { db } from "#app/lib/db.server.ts";

export type Audience = "member" | "wall" | "download";

/** What one audience may be shown of one indicator in one peer group. */
export class EditionCell extends Model<InferAttributes<EditionCell>, InferCreationAttributes<EditionCell>> {
  declare id: CreationOptional<number>;
  declare editionId: number;
  declare audience: Audience;
  declare indicator: string;
  declare groupKey: string;
  declare cell: unknown;
}

EditionCell.init(
  {
    id: { type: DataTypes.INTEGER.UNSIGNED, autoIncrement: true, primaryKey: true },
    editionId: { type: DataTypes.INTEGER.UNSIGNED, allowNull: false },
    audience: { type: DataTypes.STRING(24), allowNull: false },
    indicator: { type: DataTypes.STRING(40), allowNull: false },
    groupKey: { type: DataTypes.STRING(60), allowNull: false },
    cell: { type: DataTypes.JSON, allowNull: false },
  },
  { sequelize: db, tableName: "edition_cell" },
);
