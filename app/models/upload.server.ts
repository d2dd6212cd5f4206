import { type CreationOptional, DataTypes, type InferAttributes, type InferCreationAttributes, Model } from "sequelize";
import { db } from "#app/lib/db.server.ts";

export type UploadKind = "season-figures" | "calibrations" | "trucks";

/** A file as it came, with what the checks made of it. */
export class Upload extends Model<InferAttributes<Upload>, InferCreationAttributes<Upload>> {
  declare id: CreationOptional<number>;
  declare townId: number;
  declare kind: UploadKind;
  declare fileName: string;
  declare byteCount: number;
  declare sha256: string;
  declare content: Buffer;
  declare rowCount: number;
  declare staged: unknown;
  declare problems: unknown;
  declare state: "checked" | "accepted";
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
    content: { type: DataTypes.BLOB("medium"), allowNull: false },
    rowCount: { type: DataTypes.INTEGER.UNSIGNED, allowNull: false },
    staged: { type: DataTypes.JSON, allowNull: false },
    problems: { type: DataTypes.JSON, allowNull: false },
    state: { type: DataTypes.STRING(24), allowNull: false },
    createdById: { type: DataTypes.INTEGER.UNSIGNED, allowNull: false },
    createdAt: { type: DataTypes.DATE(3), allowNull: false },
    settledById: DataTypes.INTEGER.UNSIGNED,
    settledAt: DataTypes.DATE(3),
  },
  { sequelize: db, tableName: "upload" },
);
