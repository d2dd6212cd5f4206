import { type CreationOptional, DataTypes, type InferAttributes, type InferCreationAttributes, Model } from "sequelize";
import { db } from "#app/lib/db.server.ts";

/** Roads of one kind in a town; the length holds from a season on, until a later one is given. */
export class RoadClass extends Model<InferAttributes<RoadClass>, InferCreationAttributes<RoadClass>> {
  declare id: CreationOptional<number>;
  declare townId: number;
  declare name: string;
  declare seasonStartYear: number; // first season it holds for
  declare laneMiles: number;
}

RoadClass.init(
  {
    id: { type: DataTypes.INTEGER.UNSIGNED, autoIncrement: true, primaryKey: true },
    townId: { type: DataTypes.INTEGER.UNSIGNED, allowNull: false },
    name: { type: DataTypes.STRING(40), allowNull: false },
    seasonStartYear: { type: DataTypes.INTEGER.UNSIGNED, allowNull: false },
    laneMiles: { type: DataTypes.DOUBLE, allowNull: false },
  },
  { sequelize: db, tableName: "road_class" },
);
