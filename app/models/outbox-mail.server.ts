import { type CreationOptional, DataTypes, type InferAttributes, type InferCreationAttributes, Model } from "sequelize";
import { db } from "#app/lib/db.server.ts";

export type MailState = "queued" | "sending" | "sent" | "uncertain" | "dead";

/** A mail to be sent once. */
export class OutboxMail extends Model<InferAttributes<OutboxMail>, InferCreationAttributes<OutboxMail>> {
  declare id: CreationOptional<number>;
  declare messageId: string;
  declare dedupeKey: string;
  declare toName: string;
  declare toAddress: string;
  declare subject: string;
  declare text: string;
  declare html: string;
  declare state: CreationOptional<MailState>;
  declare attempts: CreationOptional<number>;
  declare runAfter: Date;
  declare lastError: CreationOptional<string | null>;
  declare createdAt: Date;
  declare sentAt: CreationOptional<Date | null>;
}

OutboxMail.init(
  {
    id: { type: DataTypes.INTEGER.UNSIGNED, autoIncrement: true, primaryKey: true },
    messageId: { type: DataTypes.STRING(120), allowNull: false },
    dedupeKey: { type: DataTypes.STRING(120), allowNull: false },
    toName: { type: DataTypes.STRING(120), allowNull: false },
    toAddress: { type: DataTypes.STRING(254), allowNull: false },
    subject: { type: DataTypes.STRING(200), allowNull: false },
    text: { type: DataTypes.TEXT("medium"), allowNull: false },
    html: { type: DataTypes.TEXT("medium"), allowNull: false },
    state: DataTypes.STRING(24),
    attempts: DataTypes.INTEGER.UNSIGNED,
    runAfter: { type: DataTypes.DATE(3), allowNull: false },
    lastError: DataTypes.STRING(300),
    createdAt: { type: DataTypes.DATE(3), allowNull: false },
    sentAt: DataTypes.DATE(3),
  },
  { sequelize: db, tableName: "outbox_mail" },
);
