import { type CreationOptional, DataTypes, type InferAttributes, type InferCreationAttributes, Model } from "sequelize";
import { db } from "#app/lib/db.server.ts";

export type JobState = "ready" | "running" | "done" | "failed";

/** Work that outlives a request. */
export class Job extends Model<InferAttributes<Job>, InferCreationAttributes<Job>> {
  declare id: CreationOptional<number>;
  declare kind: string;
  declare payload: unknown;
  declare dedupeKey: string;
  declare state: CreationOptional<JobState>;
  declare runAfter: Date;
  declare attempts: CreationOptional<number>;
  declare lockedUntil: CreationOptional<Date | null>;
  declare lastError: CreationOptional<string | null>;
  declare createdById: CreationOptional<number | null>;
  declare createdAt: Date;
  declare finishedAt: CreationOptional<Date | null>;
}

Job.init(
  {
    id: { type: DataTypes.INTEGER.UNSIGNED, autoIncrement: true, primaryKey: true },
    kind: { type: DataTypes.STRING(40), allowNull: false },
    payload: { type: DataTypes.JSON, allowNull: false },
    dedupeKey: { type: DataTypes.STRING(120), allowNull: false },
    state: DataTypes.STRING(24),
    runAfter: { type: DataTypes.DATE(3), allowNull: false },
    attempts: DataTypes.INTEGER.UNSIGNED,
    lockedUntil: DataTypes.DATE(3),
    lastError: DataTypes.STRING(300),
    createdById: DataTypes.INTEGER.UNSIGNED,
    createdAt: { type: DataTypes.DATE(3), allowNull: false },
    finishedAt: DataTypes.DATE(3),
  },
  { sequelize: db, tableName: "job" },
);
