import { type CreationOptional, DataTypes, type InferAttributes, type InferCreationAttributes, Model } from "sequelize";
import { db } from "#app/lib/db.server.ts";

/** A signed-in browser. Holds the hash of the cookie, never the cookie. */
export class Session extends Model<InferAttributes<Session>, InferCreationAttributes<Session>> {
  declare id: CreationOptional<number>;
  declare tokenHash: string;
  declare userId: number;
  declare createdAt: Date;
  declare lastSeenAt: Date;
  declare expiresAt: Date;
  declare authenticatedAt: Date;
  declare device: CreationOptional<string>;
}

Session.init(
  {
    id: { type: DataTypes.INTEGER.UNSIGNED, autoIncrement: true, primaryKey: true },
    tokenHash: { type: DataTypes.STRING(64), allowNull: false },
    userId: { type: DataTypes.INTEGER.UNSIGNED, allowNull: false },
    createdAt: { type: DataTypes.DATE(3), allowNull: false },
    lastSeenAt: { type: DataTypes.DATE(3), allowNull: false },
    expiresAt: { type: DataTypes.DATE(3), allowNull: false },
    authenticatedAt: { type: DataTypes.DATE(3), allowNull: false },
    device: DataTypes.STRING(200),
  },
  { sequelize: db, tableName: "session" },
);
