import {
  type CreationOptional,
  DataTypes,
  type InferAttributes,
  type InferCreationAttributes,
  Model,
  type NonAttribute,
} from "sequelize";
import { db } from "#app/lib/db.server.ts";
import type { Edition } from "./edition.server.ts";

/** A meeting held around one edition. */
export class Workshop extends Model<InferAttributes<Workshop>, InferCreationAttributes<Workshop>> {
  declare id: CreationOptional<number>;
  declare clientRef: string;
  declare title: string;
  declare heldOn: string;
  declare editionId: number;
  declare createdById: CreationOptional<number | null>;
  declare createdAt: Date;
  declare edition?: NonAttribute<Edition>;
}

Workshop.init(
  {
    id: { type: DataTypes.INTEGER.UNSIGNED, autoIncrement: true, primaryKey: true },
    clientRef: { type: DataTypes.STRING(36), allowNull: false },
    title: { type: DataTypes.STRING(120), allowNull: false },
    heldOn: { type: DataTypes.DATEONLY, allowNull: false },
    editionId: { type: DataTypes.INTEGER.UNSIGNED, allowNull: false },
    createdById: DataTypes.INTEGER.UNSIGNED,
    createdAt: { type: DataTypes.DATE(3), allowNull: false },
  },
  { sequelize: db, tableName: "workshop" },
);
