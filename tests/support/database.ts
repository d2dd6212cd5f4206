import { randomBytes } from "node:crypto";
import { inject } from "vitest";
import { readyDatabase } from "#scripts/database.js";
import { administer } from "#scripts/mariadb.js";

/** A database of one test file. */
export type TestDatabase = {
  name: string;
  /** Settings of the application for it: the account that may only do what the application may do. */
  env: { DB_HOST: string; DB_PORT: string; DB_NAME: string; DB_USER: string; DB_PASSWORD: string };
  /** Connection settings of the account with all rights on it. */
  migrator: { host: string; port: number; database: string; user: string; password: string };
  /** Remove it again. */
  drop: () => void;
};

/**
 * A new, migrated, empty database with the rights that the application has in earnest.
 *
 * @returns how to reach it, as the application and as the migrator
 */
export async function freshDatabase(): Promise<TestDatabase> {
  const { host, port, rootSocket, migratorPassword, appPassword } = inject("testServer");
  const name = `t_${process.pid}_${randomBytes(4).toString("hex")}`;
  await readyDatabase({
    mariadb: { host, port, socket: rootSocket },
    database: name,
    settings: { migratorPassword, appPassword },
  });
  return {
    name,
    env: { DB_HOST: host, DB_PORT: String(port), DB_NAME: name, DB_USER: "app", DB_PASSWORD: appPassword },
    migrator: { host, port, database: name, user: "migrator", password: migratorPassword },
    drop: () => {
      administer(rootSocket, `DROP DATABASE IF EXISTS ${name}`);
    },
  };
}
