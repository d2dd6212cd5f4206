import { type CreationOptional, DataTypes, type InferAttributes, type InferCreationAttributes, Model } from "sequelize";
import { db } from "#app/lib/db.server.ts";

export type UploadKind = "season-figures" | "calibrations" | "trucks" | "storms" | "stock" | "weather";
export type UploadState =
  "received" | "matching" | "checking" | "checked" | "accepting" | "accepted" | "cancelled" | "failed";

/** A file as it came, and how far it has got. Its bytes are in upload_chunk, its rows in upload_row. */
export class Upload extends Model<InferAttributes<Upload>, InferCreationAttributes<Upload>> {
  declare id: CreationOptional<number>;
  declare townId: number;
  declare kind: UploadKind;
  declare fileName: string;
  declare byteCount: number;
  declare sha256: string;
  declare format: "csv" | "xlsx";
  declare encoding: string;
  declare state: UploadState;
  declare matching: CreationOptional<object | null>;
  declare run: CreationOptional<number>; // counts the steps begun
  declare rowsTotal: CreationOptional<number | null>; // an estimate until the file has been read
  declare rowsRead: CreationOptional<number>;
  declare rowsOk: CreationOptional<number>;
  declare rowsCheck: CreationOptional<number>;
  declare rowsError: CreationOptional<number>;
  declare rowsLeftOut: CreationOptional<number>;
  declare failure: CreationOptional<string | null>;
  declare periodStart: CreationOptional<string | null>;
  declare periodEnd: CreationOptional<string | null>;
  declare isReplacing: CreationOptional<boolean>;
  declare rowsAccepted: CreationOptional<number | null>;
  declare createdById: number;
  declare createdAt: Date;
  declare settledById: CreationOptional<number | null>;
  declare settledAt: CreationOptional<Date | null>;
}

Upload.init(
  {
    id: { type: DataTypes.INTEGER.UNSIGNED, autoIncrement: true, primaryKey: true },
    townId: { type: DataTypes.INTEGER.UNSIGNED, allowNull: false },
    kind: { type: DataTypes.STRING(24), allowNull: false },
    fileName: { type: DataTypes.STRING(200), allowNull: false },
    byteCount: { type: DataTypes.INTEGER.UNSIGNED, allowNull: false },
    sha256: { type: DataTypes.STRING(64), allowNull: false },
    format: { type: DataTypes.STRING(4), allowNull: false },
    encoding: { type: DataTypes.STRING(12), allowNull: false },
    state: { type: DataTypes.STRING(12), allowNull: false },
    matching: DataTypes.JSON,
    run: { type: DataTypes.INTEGER.UNSIGNED, defaultValue: 0 },
    rowsTotal: DataTypes.INTEGER.UNSIGNED,
    rowsRead: DataTypes.INTEGER.UNSIGNED,
    rowsOk: DataTypes.INTEGER.UNSIGNED,
    rowsCheck: DataTypes.INTEGER.UNSIGNED,
    rowsError: DataTypes.INTEGER.UNSIGNED,
    rowsLeftOut: DataTypes.INTEGER.UNSIGNED,
    failure: DataTypes.STRING(400),
    periodStart: DataTypes.DATEONLY,
    periodEnd: DataTypes.DATEONLY,
    isReplacing: DataTypes.BOOLEAN,
    rowsAccepted: DataTypes.INTEGER.UNSIGNED,
    createdById: { type: DataTypes.INTEGER.UNSIGNED, allowNull: false },
    createdAt: { type: DataTypes.DATE(3), allowNull: false },
    settledById: DataTypes.INTEGER.UNSIGNED,
    settledAt: DataTypes.DATE(3),
  },
  { sequelize: db, tableName: "upload" },
);
