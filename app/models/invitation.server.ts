import { type CreationOptional, DataTypes, type InferAttributes, type InferCreationAttributes, Model } from "sequelize";
import type { Role } from "#app/context.ts";
import { db } from "#app/lib/db.server.ts";

/** A way in for one person, once. */
export class Invitation extends Model<InferAttributes<Invitation>, InferCreationAttributes<Invitation>> {
  declare id: CreationOptional<number>;
  declare tokenHash: string;
  declare clientRef: string;
  declare name: string;
  declare email: string;
  declare role: Role;
  declare townId: CreationOptional<number | null>;
  declare createdById: CreationOptional<number | null>;
  declare createdAt: Date;
  declare expiresAt: Date;
  declare acceptedAt: CreationOptional<Date | null>;
  declare acceptedById: CreationOptional<number | null>;
}

Invitation.init(
  {
    id: { type: DataTypes.INTEGER.UNSIGNED, autoIncrement: true, primaryKey: true },
    tokenHash: { type: DataTypes.STRING(64), allowNull: false },
    clientRef: { type: DataTypes.STRING(36), allowNull: false },
    name: { type: DataTypes.STRING(120), allowNull: false },
    email: { type: DataTypes.STRING(254), allowNull: false },
    role: { type: DataTypes.STRING(24), allowNull: false },
    townId: DataTypes.INTEGER.UNSIGNED,
    createdById: DataTypes.INTEGER.UNSIGNED,
    createdAt: { type: DataTypes.DATE(3), allowNull: false },
    expiresAt: { type: DataTypes.DATE(3), allowNull: false },
    acceptedAt: DataTypes.DATE(3),
    acceptedById: DataTypes.INTEGER.UNSIGNED,
  },
  { sequelize: db, tableName: "invitation" },
);
