import { type CreationOptional, DataTypes, type InferAttributes, type InferCreationAttributes, Model } from "sequelize";
import { db } from "#app/lib/db.server.ts";

/** One indicator, one peer group and one question to discuss. */
export class Board extends Model<InferAttributes<Board>, InferCreationAttributes<Board>> {
  declare id: CreationOptional<number>;
  declare clientRef: string;
  declare workshopId: number;
  declare position: number;
  declare indicator: string;
  declare groupKey: string;
  declare question: string;
}

Board.init(
  {
    id: { type: DataTypes.INTEGER.UNSIGNED, autoIncrement: true, primaryKey: true },
    clientRef: { type: DataTypes.STRING(36), allowNull: false },
    workshopId: { type: DataTypes.INTEGER.UNSIGNED, allowNull: false },
    position: { type: DataTypes.INTEGER.UNSIGNED, allowNull: false },
    indicator: { type: DataTypes.STRING(40), allowNull: false },
    groupKey: { type: DataTypes.STRING(60), allowNull: false },
    question: { type: DataTypes.STRING(200), allowNull: false },
  },
  { sequelize: db, tableName: "board" },
);
