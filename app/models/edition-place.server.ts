import { DataTypes, type InferAttributes, type InferCreationAttributes, Model } from "sequelize";
import { db } from "#app/lib/db.server.ts";

/** One town's own place in an edition, for that town alone. */
export class EditionPlace extends Model<InferAttributes<EditionPlace>, InferCreationAttributes<EditionPlace>> {
  declare editionId: number;
  declare townId: number;
  declare indicator: string;
  declare ownValue: number;
  declare places: unknown;
}

EditionPlace.init(
  {
    editionId: { type: DataTypes.INTEGER.UNSIGNED, primaryKey: true },
    townId: { type: DataTypes.INTEGER.UNSIGNED, primaryKey: true },
    indicator: { type: DataTypes.STRING(40), primaryKey: true },
    ownValue: { type: DataTypes.DOUBLE, allowNull: false },
    places: { type: DataTypes.JSON, allowNull: false },
  },
  { sequelize: db, tableName: "edition_place" },
);
