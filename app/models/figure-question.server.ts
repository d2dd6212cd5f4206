import { type CreationOptional, DataTypes, type InferAttributes, type InferCreationAttributes, Model } from "sequelize";
import { db } from "#app/lib/db.server.ts";

/** A question about a sent season that does not send it back, and its answer. */
export class FigureQuestion extends Model<InferAttributes<FigureQuestion>, InferCreationAttributes<FigureQuestion>> {
  declare id: CreationOptional<number>;
  declare figureId: number;
  declare version: number;
  declare question: string;
  declare askedAt: Date;
  declare askedById: number;
  declare answer: CreationOptional<string | null>;
  declare answeredAt: CreationOptional<Date | null>;
  declare answeredById: CreationOptional<number | null>;
}

FigureQuestion.init(
  {
    id: { type: DataTypes.INTEGER.UNSIGNED, autoIncrement: true, primaryKey: true },
    figureId: { type: DataTypes.INTEGER.UNSIGNED, allowNull: false },
    version: { type: DataTypes.INTEGER.UNSIGNED, allowNull: false },
    question: { type: DataTypes.STRING(2000), allowNull: false },
    askedAt: { type: DataTypes.DATE(3), allowNull: false },
    askedById: { type: DataTypes.INTEGER.UNSIGNED, allowNull: false },
    answer: DataTypes.STRING(2000),
    answeredAt: DataTypes.DATE(3),
    answeredById: DataTypes.INTEGER.UNSIGNED,
  },
  { sequelize: db, tableName: "figure_question" },
);
