import { createHash, randomBytes, randomUUID } from "node:crypto";
import { existsSync } from "node:fs";
import { join } from "node:path";
import { pathToFileURL } from "node:url";
import { applyGrants, prepareDatabase } from "./accounts.js";
import { Failure } from "./failures.js";
import { connect, migrations } from "./migrate.js";
import { projectFolder } from "./settings.js";

/**
 * Make a database ready for the application: there, migrated, its accounts with their rights.
 *
 * @param {object} given
 * @param {{ host: string, port: number, socket: string }} given.mariadb
 * @param {string} given.database
 * @param {{ migratorPassword: string, appPassword: string }} given.settings
 * @param {(connection: import("mariadb").Connection) => Promise<void>} [given.then] what else to do as the migrator
 */
export async function readyDatabase({ mariadb, database, settings, then = async () => {} }) {
  const { socket, host, port } = mariadb;
  const { migratorPassword, appPassword } = settings;
  prepareDatabase({ socket, database, migratorPassword, appPassword });
  const connection = await connect({ host, port, database, user: "migrator", password: migratorPassword });
  try {
    await migrations(connection).up();
    applyGrants({ socket, database });
    await then(connection);
  } finally {
    await connection.end();
  }
}

/**
 * Load the demo region where there is no town yet.
 *
 * @param {import("mariadb").Connection} connection the migrator's
 * @param {string} issuer of the demo people's sign-ins
 * @returns {Promise<boolean>} whether it was loaded now
 */
export async function loadDemoIfEmpty(connection, issuer) {
  const [{ townCount }] = await connection.query("SELECT COUNT(*) AS townCount FROM town");
  if (townCount > 0) return false;
  const file = join(projectFolder, "data", "demo", "load.js");
  if (!existsSync(file))
    throw new Failure(
      `${file} is missing. Restore it (git checkout data/demo), or start without the demo: npm start -- --empty`,
    );
  const { loadDemo } = await import(pathToFileURL(file).href);
  await loadDemo({ connection, issuer, now: new Date() });
  return true;
}

/**
 * Let people who came in through the provider of this machine keep their place when its port has changed: an account is
 * known by its provider's address and its subject.
 *
 * @param {import("mariadb").Connection} connection the migrator's
 * @param {string} issuer the address now
 */
export async function followIssuer(connection, issuer) {
  await connection.query("UPDATE user_account SET issuer = ? WHERE issuer LIKE 'http://127.0.0.1:%' AND issuer <> ?", [
    issuer,
    issuer,
  ]);
}

/**
 * An invitation for the first coordinator of a network in which nobody has an account yet. Only its hash is stored, so
 * the link cannot be shown twice: each start replaces the one before until somebody has come in.
 *
 * @param {import("mariadb").Connection} connection the migrator's
 * @returns {Promise<string | null>} the token of the link; null when somebody has an account
 */
export async function inviteFirstCoordinator(connection) {
  const [{ accountCount }] = await connection.query("SELECT COUNT(*) AS accountCount FROM user_account");
  if (accountCount > 0) return null;
  const token = randomBytes(32).toString("base64url");
  await connection.beginTransaction();
  await connection.query("DELETE FROM invitation WHERE accepted_at IS NULL AND created_by_id IS NULL");
  await connection.query(
    `INSERT INTO invitation (token_hash, client_ref, name, email, role, town_id, created_by_id, created_at, expires_at)
     VALUES (?, ?, 'First coordinator', 'coordinator@commonweigh.example', 'coordinator', NULL, NULL,
       UTC_TIMESTAMP(3), UTC_TIMESTAMP(3) + INTERVAL 7 DAY)`,
    [createHash("sha256").update(token).digest("hex"), randomUUID()],
  );
  await connection.commit();
  return token;
}
