import { type CreationOptional, DataTypes, type InferAttributes, type InferCreationAttributes, Model } from "sequelize";
import { db } from "#app/lib/db.server.ts";

/** A member agency. */
export class Town extends Model<InferAttributes<Town>, InferCreationAttributes<Town>> {
  declare id: CreationOptional<number>;
  declare name: string;
  declare district: string;
  declare timeZone: CreationOptional<string>;
  declare reportsThroughTownId: CreationOptional<number | null>;
  declare stationId: CreationOptional<number | null>;
  declare createdAt: Date;
}

Town.init(
  {
    id: { type: DataTypes.INTEGER.UNSIGNED, autoIncrement: true, primaryKey: true },
    name: { type: DataTypes.STRING(80), allowNull: false },
    district: { type: DataTypes.STRING(40), allowNull: false },
    timeZone: DataTypes.STRING(40),
    reportsThroughTownId: DataTypes.INTEGER.UNSIGNED,
    stationId: DataTypes.INTEGER.UNSIGNED,
    createdAt: { type: DataTypes.DATE(3), allowNull: false },
  },
  { sequelize: db, tableName: "town" },
);
