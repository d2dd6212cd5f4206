import { type CreationOptional, DataTypes, type InferAttributes, type InferCreationAttributes, Model } from "sequelize";
import { db } from "#app/lib/db.server.ts";

/** Who did what to what. Inserted once, never changed. */
export class AuditEntry extends Model<InferAttributes<AuditEntry>, InferCreationAttributes<AuditEntry>> {
  declare id: CreationOptional<number>;
  declare createdAt: Date;
  declare actorUserId: CreationOptional<number | null>;
  declare actorRole: string;
  declare townId: CreationOptional<number | null>;
  declare action: string;
  declare entity: string;
  declare entityId: CreationOptional<number | null>;
  declare detail: unknown;
  declare requestId: CreationOptional<string>;
}

AuditEntry.init(
  {
    id: { type: DataTypes.INTEGER.UNSIGNED, autoIncrement: true, primaryKey: true },
    createdAt: { type: DataTypes.DATE(3), allowNull: false },
    actorUserId: DataTypes.INTEGER.UNSIGNED,
    actorRole: { type: DataTypes.STRING(20), allowNull: false },
    townId: DataTypes.INTEGER.UNSIGNED,
    action: { type: DataTypes.STRING(60), allowNull: false },
    entity: { type: DataTypes.STRING(40), allowNull: false },
    entityId: DataTypes.INTEGER.UNSIGNED,
    detail: { type: DataTypes.JSON, allowNull: false },
    requestId: DataTypes.STRING(64),
  },
  { sequelize: db, tableName: "audit_entry" },
);
