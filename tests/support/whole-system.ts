import { mkdtemp, rm } from "node:fs/promises";
import { tmpdir } from "node:os";
import { join } from "node:path";
import type { TestProject } from "vitest/node";
import { ensureBuild } from "#scripts/build.js";
import { loadDemoIfEmpty, readyDatabase } from "#scripts/database.js";
import { startMariadb } from "#scripts/mariadb.js";
import { freePorts } from "#scripts/ports.js";
import { startPrograms } from "#scripts/programs.js";
import { loadSettings, projectFolder } from "#scripts/settings.js";

/** Where the running network of this test run is. */
export type WholeSystem = {
  origin: string;
  idpOrigin: string;
  mailOrigin: string;
  /** Settings of the running application, its database's among them. */
  env: Record<string, string>;
  /** Connection settings of the account with all rights on its database. */
  migrator: { host: string; port: number; database: string; user: string; password: string };
  logFolder: string;
};

declare module "vitest" {
  // Adding to a declaration of the library takes an interface.
  // eslint-disable-next-line @typescript-eslint/consistent-type-definitions
  export interface ProvidedContext {
    wholeSystem: WholeSystem;
  }
}

/** The whole network as `npm start` brings it up, with the demo region, on free ports and with data of its own. */
export default async function setup(project: TestProject) {
  ensureBuild(projectFolder, (line: string) => console.log(line));
  const folder = await mkdtemp(join(tmpdir(), "commonweigh-test-system-"));
  const settings = loadSettings(join(folder, "state"));
  const database = "commonweigh_demo";
  const mariadb = await startMariadb({ folder: join(folder, "db"), isPassing: true });
  const stopDatabase = async () => {
    await mariadb.stop();
    await rm(folder, { recursive: true, force: true });
  };
  try {
    const ports = await freePorts();
    await readyDatabase({
      mariadb,
      database,
      settings,
      then: async (connection) => {
        await loadDemoIfEmpty(connection, `http://127.0.0.1:${ports.idp}`);
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
      faults: "1",
    });
    project.provide("wholeSystem", {
      origin: programs.origin,
      idpOrigin: programs.idpOrigin,
      mailOrigin: programs.mailOrigin,
      env: programs.env,
      migrator: {
        host: mariadb.host,
        port: mariadb.port,
        database,
        user: "migrator",
        password: settings.migratorPassword,
      },
      logFolder: join(folder, "state", "logs"),
    });
    return async function teardown() {
      await programs.stop();
      await stopDatabase();
    };
  } catch (error) {
    await stopDatabase();
    throw error;
  }
}
