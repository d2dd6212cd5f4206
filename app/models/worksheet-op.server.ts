import { DataTypes, type InferAttributes, type InferCreationAttributes, Model } from "sequelize";
import { db } from "#app/lib/db.server.ts";

/** What was answered to a message from a phone, so that a second sending of it changes nothing. */
export class WorksheetOp extends Model<InferAttributes<WorksheetOp>, InferCreationAttributes<WorksheetOp>> {
  declare townId: number;
  declare opId: string;
  declare requestSha256: string;
  declare response: unknown;
  declare createdAt: Date;
}

WorksheetOp.init(
  {
    townId: { type: DataTypes.INTEGER.UNSIGNED, primaryKey: true },
    opId: { type: DataTypes.STRING(36), primaryKey: true },
    requestSha256: { type: DataTypes.STRING(64), allowNull: false, field: "request_sha256" },
    response: { type: DataTypes.JSON, allowNull: false },
    createdAt: { type: DataTypes.DATE(3), allowNull: false },
  },
  { sequelize: db, tableName: "worksheet_op" },
);
