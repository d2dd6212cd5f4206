import { type CreationOptional, DataTypes, type InferAttributes, type InferCreationAttributes, Model } from "sequelize";
import { db } from "#app/lib/db.server.ts";

/** A weather station, known by the eleven characters of the public daily archive. */
export class Station extends Model<InferAttributes<Station>, InferCreationAttributes<Station>> {
  declare id: CreationOptional<number>;
  declare code: string;
  declare name: string;
}

Station.init(
  {
    id: { type: DataTypes.INTEGER.UNSIGNED, autoIncrement: true, primaryKey: true },
    code: { type: DataTypes.STRING(11), allowNull: false },
    name: { type: DataTypes.STRING(80), allowNull: false },
  },
  { sequelize: db, tableName: "station" },
);
