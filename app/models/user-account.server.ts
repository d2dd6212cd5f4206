import { type CreationOptional, DataTypes, type InferAttributes, type InferCreationAttributes, Model } from "sequelize";
import type { Role } from "#app/context.ts";
import { db } from "#app/lib/db.server.ts";

/** A person known by issuer and subject, with one role. */
export class UserAccount extends Model<InferAttributes<UserAccount>, InferCreationAttributes<UserAccount>> {
  declare id: CreationOptional<number>;
  declare issuer: string;
  declare subject: string;
  declare name: string;
  declare email: string;
  declare role: Role;
  declare townId: CreationOptional<number | null>;
  declare isActive: CreationOptional<boolean>;
  declare createdAt: Date;
}

UserAccount.init(
  {
    id: { type: DataTypes.INTEGER.UNSIGNED, autoIncrement: true, primaryKey: true },
    issuer: { type: DataTypes.STRING(190), allowNull: false },
    subject: { type: DataTypes.STRING(190), allowNull: false },
    name: { type: DataTypes.STRING(120), allowNull: false },
    email: { type: DataTypes.STRING(254), allowNull: false },
    role: { type: DataTypes.STRING(24), allowNull: false },
    townId: DataTypes.INTEGER.UNSIGNED,
    isActive: DataTypes.BOOLEAN,
    createdAt: { type: DataTypes.DATE(3), allowNull: false },
  },
  { sequelize: db, tableName: "user_account" },
);
