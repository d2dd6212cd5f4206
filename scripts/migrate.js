import { readdirSync } from "node:fs";
import { join } from "node:path";
import { fileURLToPath, pathToFileURL } from "node:url";
import mariadb from "mariadb";
import { Umzug } from "umzug";
import { projectFolder } from "./settings.js";

/**
 * A connection with the time zone and types that the whole project assumes: UTC, dates as text, counts as numbers.
 *
 * @param {{ host: string, port: number, user: string, password: string, database: string }} settings
 * @returns {Promise<import("mariadb").Connection>}
 */
export function connect(settings) {
  return mariadb.createConnection({
    ...settings,
    timezone: "Z",
    dateStrings: true,
    bigIntAsNumber: true,
    insertIdAsNumber: true,
    checkNumberRange: true,
    connectTimeout: 10_000,
  });
}

/**
 * The migrations of data/migrations over one database, in the order of their names; what has run is kept in the table
 * schema_migration.
 *
 * @param {import("mariadb").Connection} connection with all rights on the database
 * @returns {Umzug<{ sql: (text: string) => Promise<unknown> }>} `up()` runs what is missing, `down({ to: 0 })` takes all back
 */
export function migrations(connection) {
  const folder = join(projectFolder, "data", "migrations");
  const sql = (/** @type {string} */ text) => connection.query(text);
  return new Umzug({
    context: { sql },
    logger: undefined,
    storage: {
      logMigration: async ({ name }) => {
        await connection.query("INSERT INTO schema_migration (name, applied_at) VALUES (?, UTC_TIMESTAMP(3))", [name]);
      },
      unlogMigration: async ({ name }) => {
        await connection.query("DELETE FROM schema_migration WHERE name = ?", [name]);
      },
      executed: async () => {
        await sql(`CREATE TABLE IF NOT EXISTS schema_migration (
          name VARCHAR(120) CHARACTER SET ascii COLLATE ascii_bin NOT NULL PRIMARY KEY,
          applied_at DATETIME(3) NOT NULL
        ) ENGINE=InnoDB`);
        const rows = await connection.query("SELECT name FROM schema_migration ORDER BY name");
        return rows.map((/** @type {{ name: string }} */ row) => row.name);
      },
    },
    migrations: readdirSync(folder)
      .filter((file) => file.endsWith(".js"))
      .sort()
      .map((file) => {
        const load = () => import(pathToFileURL(join(folder, file)).href);
        return {
          name: file,
          up: async () => (await load()).up({ sql }),
          down: async () => (await load()).down({ sql }),
        };
      }),
  });
}

async function main() {
  const { DB_HOST = "127.0.0.1", DB_PORT = "3306", DB_NAME = "", DB_USER = "", DB_PASSWORD = "" } = process.env;
  const connection = await connect({
    host: DB_HOST,
    port: Number(DB_PORT),
    database: DB_NAME,
    user: DB_USER,
    password: DB_PASSWORD,
  });
  const umzug = migrations(connection);
  const done = process.argv[2] === "down" ? await umzug.down() : await umzug.up();
  for (const { name } of done) console.log(name);
  await connection.end();
}

if (process.argv[1] === fileURLToPath(import.meta.url)) await main();
