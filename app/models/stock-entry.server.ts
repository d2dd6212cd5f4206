import { type CreationOptional, DataTypes, type InferAttributes, type InferCreationAttributes, Model } from "sequelize";
import { db } from "#app/lib/db.server.ts";

import type { StockKind } from "#app/domain/season/stock-balance.ts";
import type { StockUnit } from "#app/domain/season/stock-quantity.ts";

/** One movement or measurement of a pile. */
export class StockEntry extends Model<InferAttributes<StockEntry>, InferCreationAttributes<StockEntry>> {
  declare id: CreationOptional<number>;
  declare clientRef: string;
  declare townId: number;
  declare seasonStartYear: number;
  declare materialId: number;
  declare kind: StockKind;
  declare day: string;
  declare quantityLb: number;
  declare typedQuantity: number; // as typed, in typedUnit
  declare typedUnit: StockUnit;
  declare lbPerCubicYard: CreationOptional<number | null>;
  declare priceCents: CreationOptional<number | null>; // for the whole delivery
  declare supplier: CreationOptional<string>;
  declare uploadId: CreationOptional<number | null>;
  declare createdById: CreationOptional<number | null>;
  declare createdAt: Date;
}

StockEntry.init(
  {
    id: { type: DataTypes.INTEGER.UNSIGNED, autoIncrement: true, primaryKey: true },
    clientRef: { type: DataTypes.STRING(36), allowNull: false },
    townId: { type: DataTypes.INTEGER.UNSIGNED, allowNull: false },
    seasonStartYear: { type: DataTypes.INTEGER.UNSIGNED, allowNull: false },
    materialId: { type: DataTypes.INTEGER.UNSIGNED, allowNull: false },
    kind: { type: DataTypes.STRING(16), allowNull: false },
    day: { type: DataTypes.DATEONLY, allowNull: false },
    quantityLb: { type: DataTypes.DOUBLE, allowNull: false },
    typedQuantity: { type: DataTypes.DOUBLE, allowNull: false },
    typedUnit: { type: DataTypes.STRING(12), allowNull: false },
    lbPerCubicYard: DataTypes.DOUBLE,
    priceCents: DataTypes.INTEGER.UNSIGNED,
    supplier: DataTypes.STRING(80),
    uploadId: DataTypes.INTEGER.UNSIGNED,
    createdById: DataTypes.INTEGER.UNSIGNED,
    createdAt: { type: DataTypes.DATE(3), allowNull: false },
  },
  { sequelize: db, tableName: "stock_entry" },
);
