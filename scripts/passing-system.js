import { mkdtemp, rm } from "node:fs/promises";
import { tmpdir } from "node:os";
import { join } from "node:path";
import { ensureBuild } from "./build.js";
import { loadDemoIfEmpty, readyDatabase } from "./database.js";
import { startMariadb } from "./mariadb.js";
import { freePorts } from "./ports.js";
import { startPrograms } from "./programs.js";
import { loadSettings, projectFolder } from "./settings.js";

/**
 * A whole network as `npm start` brings it up, on free ports, with data of its own that is thrown away at the end.
 *
 * @typedef {object} PassingSystem
 * @property {string} origin
 * @property {string} idpOrigin
 * @property {string} mailOrigin
 * @property {Record<string, string>} env settings of the running application, its database's among them
 * @property {{ host: string, port: number, database: string, user: string, password: string }} migrator connection
 *   settings of the account with all rights on its database
 * @property {string} logFolder
 * @property {number} appPid process id of the application
 * @property {() => Promise<void>} stop
 */

/**
 * Start one.
 *
 * @param {object} [given]
 * @param {boolean} [given.hasDemo] whether the demo region is loaded; the demo people can sign in either way
 * @param {(connection: import("mariadb").Connection, issuer: string) => Promise<void>} [given.prepare] what else to do
 *   in its database, as the migrator, before the programs start
 * @param {string} [given.faults] "1" lets tests make the identity provider fail
 * @param {string} [given.logLevel]
 * @param {(line: string) => void} [given.say]
 * @returns {Promise<PassingSystem>}
 */
export async function startPassingSystem({ hasDemo = true, prepare, faults = "", logLevel, say = console.log } = {}) {
  ensureBuild(projectFolder, say);
  const folder = await mkdtemp(join(tmpdir(), "commonweigh-passing-"));
  const settings = loadSettings(join(folder, "state"));
  const database = "commonweigh_demo";
  const mariadb = await startMariadb({ folder: join(folder, "db"), isPassing: true });
  const stopDatabase = async () => {
    await mariadb.stop();
    await rm(folder, { recursive: true, force: true });
  };
  try {
    const ports = await freePorts();
    const issuer = `http://127.0.0.1:${ports.idp}`;
    await readyDatabase({
      mariadb,
      database,
      settings,
      then: async (connection) => {
        if (hasDemo) await loadDemoIfEmpty(connection, issuer);
        await prepare?.(connection, issuer);
      },
    });
    const programs = await startPrograms({
      root: projectFolder,
      folder: join(folder, "state"),
      settings,
      ports,
      mariadb,
      database,
      devPages: true,
      hasDemoPeople: true,
      faults,
      logLevel,
    });
    const { origin, idpOrigin, mailOrigin, env, appPid } = programs;
    const { host, port } = mariadb;
    return {
      origin,
      idpOrigin,
      mailOrigin,
      env,
      appPid,
      migrator: { host, port, database, user: "migrator", password: settings.migratorPassword },
      logFolder: join(folder, "state", "logs"),
      stop: async () => {
        await programs.stop();
        await stopDatabase();
      },
    };
  } catch (error) {
    await stopDatabase();
    throw error;
  }
}
