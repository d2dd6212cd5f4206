import { type CreationOptional, DataTypes, type InferAttributes, type InferCreationAttributes, Model } from "sequelize";
import { db } from "#app/lib/db.server.ts";

import type { StormKind } from "#app/domain/season/storm.ts";

/** One line of a town’s storm log: a storm, or one truck’s share of it. Times are the town’s local time. */
export class Storm extends Model<InferAttributes<Storm>, InferCreationAttributes<Storm>> {
  declare id: CreationOptional<number>;
  declare clientRef: CreationOptional<string | null>;
  declare townId: number;
  declare seasonStartYear: number;
  declare startedAt: string; // local, "2026-01-12 04:30:00"
  declare endedAt: CreationOptional<string | null>;
  declare kind: StormKind;
  declare pavementTempF: CreationOptional<number | null>;
  declare passes: CreationOptional<number | null>;
  declare laneMilesTreated: CreationOptional<number | null>;
  declare hours: CreationOptional<number | null>;
  declare truckId: CreationOptional<number | null>;
  declare route: CreationOptional<string>;
  declare note: CreationOptional<string>;
  declare uploadId: CreationOptional<number | null>;
  declare version: CreationOptional<number>;
  declare createdById: CreationOptional<number | null>;
  declare createdAt: Date;
}

Storm.init(
  {
    id: { type: DataTypes.INTEGER.UNSIGNED, autoIncrement: true, primaryKey: true },
    clientRef: DataTypes.STRING(36),
    townId: { type: DataTypes.INTEGER.UNSIGNED, allowNull: false },
    seasonStartYear: { type: DataTypes.INTEGER.UNSIGNED, allowNull: false },
    startedAt: { type: DataTypes.STRING(20), allowNull: false },
    endedAt: DataTypes.STRING(20),
    kind: { type: DataTypes.STRING(20), allowNull: false },
    pavementTempF: DataTypes.DOUBLE,
    passes: DataTypes.INTEGER.UNSIGNED,
    laneMilesTreated: DataTypes.DOUBLE,
    hours: DataTypes.DOUBLE,
    truckId: DataTypes.INTEGER.UNSIGNED,
    route: DataTypes.STRING(60),
    note: DataTypes.STRING(300),
    uploadId: DataTypes.INTEGER.UNSIGNED,
    version: DataTypes.INTEGER.UNSIGNED,
    createdById: DataTypes.INTEGER.UNSIGNED,
    createdAt: { type: DataTypes.DATE(3), allowNull: false },
  },
  { sequelize: db, tableName: "storm" },
);
