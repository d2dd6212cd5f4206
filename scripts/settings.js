import { randomBytes } from "node:crypto";
import { chmodSync, existsSync, mkdirSync, readFileSync, renameSync, writeFileSync } from "node:fs";
import { join } from "node:path";
import { fileURLToPath } from "node:url";
import { Failure } from "./failures.js";

/** The folder of the checkout. */
export const projectFolder = fileURLToPath(new URL("..", import.meta.url)).replace(/\/$/, "");

/** Everything this machine keeps for the project, outside version control. */
export const privateFolder = join(projectFolder, ".commonweigh");

const names = /** @type {const} */ (["oidcClientSecret", "workerToken", "migratorPassword", "appPassword"]);

/**
 * The secrets of this machine's network: made once, kept in a file that only its owner reads.
 *
 * @param {string} folder where settings.json lies; made when it is missing
 * @returns {{ oidcClientSecret: string, workerToken: string, migratorPassword: string, appPassword: string }}
 *   each 32 random bytes as base64url
 * @throws {Failure} when the file is there but cannot be read as settings
 */
export function loadSettings(folder) {
  // Others may pass through (the database server is another account), but not look around.
  mkdirSync(folder, { recursive: true, mode: 0o711 });
  const file = join(folder, "settings.json");
  const kept = existsSync(file) ? parse(file) : {};
  const settings = {
    oidcClientSecret: kept.oidcClientSecret ?? secret(),
    workerToken: kept.workerToken ?? secret(),
    migratorPassword: kept.migratorPassword ?? secret(),
    appPassword: kept.appPassword ?? secret(),
  };
  if (names.some((name) => kept[name] === undefined)) {
    // Written aside and moved, so that a full disk never leaves half a file behind.
    writeFileSync(`${file}.new`, `${JSON.stringify(settings, null, 2)}\n`, { mode: 0o600 });
    renameSync(`${file}.new`, file);
  }
  chmodSync(file, 0o600);
  return settings;
}

/**
 * The environment of the application and its worker.
 *
 * @param {object} given
 * @param {ReturnType<typeof loadSettings>} given.settings
 * @param {{ app: number, idp: number, mailPage: number, smtp: number }} given.ports
 * @param {{ host: string, port: number }} given.mariadb
 * @param {string} given.database
 * @param {boolean} given.devPages whether pages for developers are served
 * @param {string} [given.logLevel]
 * @returns {Record<string, string>}
 */
export function appEnvironment({ settings, ports, mariadb, database, devPages, logLevel = "info" }) {
  return {
    NODE_ENV: "production",
    HOST: "127.0.0.1",
    PORT: String(ports.app),
    PUBLIC_ORIGIN: `http://127.0.0.1:${ports.app}`,
    DB_HOST: mariadb.host,
    DB_PORT: String(mariadb.port),
    DB_NAME: database,
    DB_USER: "app",
    DB_PASSWORD: settings.appPassword,
    OIDC_ISSUER: `http://127.0.0.1:${ports.idp}`,
    OIDC_CLIENT_ID: "commonweigh",
    OIDC_CLIENT_SECRET: settings.oidcClientSecret,
    SMTP_HOST: "127.0.0.1",
    SMTP_PORT: String(ports.smtp),
    MAIL_FROM: "Commonweigh <network@commonweigh.example>",
    WORKER_TOKEN: settings.workerToken,
    DEV_PAGES: devPages ? "1" : "0",
    LOG_LEVEL: logLevel,
  };
}

/** What a program started by us may know of the shell it was started from. */
export function plainEnvironment() {
  const passed = ["PATH", "HOME", "USER", "LANG", "LC_ALL", "TMPDIR", "TERM"];
  return Object.fromEntries(
    passed.flatMap((name) => (process.env[name] === undefined ? [] : [[name, process.env[name]]])),
  );
}

function secret() {
  return randomBytes(32).toString("base64url");
}

/** @param {string} file @returns {Record<string, string | undefined>} */
function parse(file) {
  try {
    return JSON.parse(readFileSync(file, "utf8"));
  } catch (error) {
    if (!(error instanceof SyntaxError)) throw error;
    throw new Failure(`${file} is damaged. Delete it and start again: new secrets are made, and no data is lost.`);
  }
}
