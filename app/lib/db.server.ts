import { Sequelize, type Transaction } from "sequelize";
import { env } from "./env.server.ts";
import { databaseCode } from "./error-reason.ts";

declare global {
  // The server entry closes the pool through this when it is told to stop.
  var __commonweigh: { close: () => Promise<void> } | undefined;
}

/** The one connection pool. Instants are UTC; measurements are DOUBLE, money is whole cents. */
export const db = new Sequelize({
  dialect: "mariadb",
  host: env.db.host,
  port: env.db.port,
  database: env.db.name,
  username: env.db.user,
  password: env.db.password,
  logging: false,
  timezone: "+00:00",
  isolationLevel: "READ COMMITTED",
  define: { underscored: true, timestamps: false, freezeTableName: true, charset: "utf8mb4" },
  pool: { max: env.db.poolMax, min: 0, acquire: 5000, idle: 10_000 },
  dialectOptions: {
    // Ids and counts as numbers, and an error rather than a rounded figure beyond 2^53.
    supportBigNumbers: false,
    bigIntAsNumber: true,
    insertIdAsNumber: true,
    checkNumberRange: true,
    connectTimeout: 5000,
    // One string: Sequelize appends to a given array at each connection.
    initSql: "SET SESSION sql_mode='TRADITIONAL', max_statement_time=10, innodb_lock_wait_timeout=5",
  },
});

globalThis.__commonweigh = { close: () => db.close() };

const retryable = new Set(["ER_LOCK_DEADLOCK", "ER_LOCK_WAIT_TIMEOUT", "ER_CHECKREAD"]);

/**
 * Run `work` in a transaction and, when the database asks for another try (deadlock, lock wait), run the whole of it
 * again in a new one. `work` must do nothing that a rollback does not undo: no mail, no fetch, no file.
 *
 * @returns what `work` returns
 * @throws the last error, after five tries
 */
export async function inTransaction<T>(work: (transaction: Transaction) => Promise<T>): Promise<T> {
  for (let attempt = 1; ; attempt++) {
    try {
      return await db.transaction(work);
    } catch (error) {
      if (attempt === 5 || !retryable.has(databaseCode(error) ?? "")) throw error;
      await new Promise((resume) => setTimeout(resume, 20 * 2 ** attempt * (0.5 + Math.random())));
    }
  }
}

/** True when the write lost to a unique key: somebody was first, or the form was sent twice. */
export function isDuplicate(error: unknown) {
  return error instanceof Error && error.name === "SequelizeUniqueConstraintError";
}
