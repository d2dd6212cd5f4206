import { DataTypes, type InferAttributes, type InferCreationAttributes, Model } from "sequelize";
import { db } from "#app/lib/db.server.ts";

/** Whether a person wants the mail of an occasion. No row means yes. */
export class MailChoice extends Model<InferAttributes<MailChoice>, InferCreationAttributes<MailChoice>> {
  declare userId: number;
  declare occasion: string;
  declare isWanted: boolean;
}

MailChoice.init(
  {
    userId: { type: DataTypes.INTEGER.UNSIGNED, primaryKey: true },
    occasion: { type: DataTypes.STRING(24), primaryKey: true },
    isWanted: { type: DataTypes.BOOLEAN, allowNull: false },
  },
  { sequelize: db, tableName: "mail_choice" },
);
