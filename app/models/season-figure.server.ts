import {
  type CreationOptional,
  DataTypes,
  type InferAttributes,
  type InferCreationAttributes,
  Model,
  type NonAttribute,
} from "sequelize";
import { db } from "#app/lib/db.server.ts";
import type { Town } from "./town.server.ts";

export type FigureState = "draft" | "sent" | "returned" | "accepted";

/** What a town sends in for one season. */
export class SeasonFigure extends Model<InferAttributes<SeasonFigure>, InferCreationAttributes<SeasonFigure>> {
  declare id: CreationOptional<number>;
  declare townId: number;
  declare seasonStartYear: number;
  declare state: CreationOptional<FigureState>;
  declare version: CreationOptional<number>;
  declare laneMiles: number;
  declare eventCount: number;
  declare saltLb: number;
  declare mixLb: number;
  declare mixSaltShare: CreationOptional<number | null>; // 0 to 1 by weight
  declare sandLb: number;
  declare brineGal: CreationOptional<number | null>;
  declare materialCostCents: CreationOptional<number | null>;
  declare laneMilesTreated: CreationOptional<number | null>;
  declare wettedSaltLb: CreationOptional<number | null>;
  declare stockUsedLb: CreationOptional<number | null>;
  declare stockLoggedLb: CreationOptional<number | null>;
  declare uploadId: CreationOptional<number | null>;
  declare reviewNote: CreationOptional<string | null>;
  declare createdAt: Date;
  declare sentAt: CreationOptional<Date | null>;
  declare sentById: CreationOptional<number | null>;
  declare reviewedAt: CreationOptional<Date | null>;
  declare reviewedById: CreationOptional<number | null>;
  declare town?: NonAttribute<Town>;
}

SeasonFigure.init(
  {
    id: { type: DataTypes.INTEGER.UNSIGNED, autoIncrement: true, primaryKey: true },
    townId: { type: DataTypes.INTEGER.UNSIGNED, allowNull: false },
    seasonStartYear: { type: DataTypes.INTEGER.UNSIGNED, allowNull: false },
    state: DataTypes.STRING(24),
    version: DataTypes.INTEGER.UNSIGNED,
    laneMiles: { type: DataTypes.DOUBLE, allowNull: false },
    eventCount: { type: DataTypes.INTEGER.UNSIGNED, allowNull: false },
    saltLb: { type: DataTypes.DOUBLE, allowNull: false },
    mixLb: { type: DataTypes.DOUBLE, allowNull: false },
    mixSaltShare: DataTypes.DOUBLE,
    sandLb: { type: DataTypes.DOUBLE, allowNull: false },
    brineGal: DataTypes.DOUBLE,
    materialCostCents: DataTypes.INTEGER.UNSIGNED,
    laneMilesTreated: DataTypes.DOUBLE,
    wettedSaltLb: DataTypes.DOUBLE,
    stockUsedLb: DataTypes.DOUBLE,
    stockLoggedLb: DataTypes.DOUBLE,
    uploadId: DataTypes.INTEGER.UNSIGNED,
    reviewNote: DataTypes.TEXT("medium"),
    createdAt: { type: DataTypes.DATE(3), allowNull: false },
    sentAt: DataTypes.DATE(3),
    sentById: DataTypes.INTEGER.UNSIGNED,
    reviewedAt: DataTypes.DATE(3),
    reviewedById: DataTypes.INTEGER.UNSIGNED,
  },
  { sequelize: db, tableName: "season_figure" },
);
