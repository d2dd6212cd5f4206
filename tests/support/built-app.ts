import { randomBytes } from "node:crypto";
import { mkdtemp, rm } from "node:fs/promises";
import { tmpdir } from "node:os";
import { join } from "node:path";
import type { TestProject } from "vitest/node";
import { ensureBuild } from "#scripts/build.js";
import { startMariadb } from "#scripts/mariadb.js";
import { projectFolder } from "#scripts/settings.js";

/** Where the database server of this test run is, and the passwords of its two accounts. */
export type TestServer = {
  host: string;
  port: number;
  rootSocket: string;
  migratorPassword: string;
  appPassword: string;
};

declare module "vitest" {
  // Adding to a declaration of the library takes an interface.
  // eslint-disable-next-line @typescript-eslint/consistent-type-definitions
  export interface ProvidedContext {
    testServer: TestServer;
  }
}

/** One MariaDB for the whole run, thrown away at its end; each test file makes a database of its own on it. */
export default async function setup(project: TestProject) {
  ensureBuild(projectFolder, (line: string) => console.log(line));
  const folder = await mkdtemp(join(tmpdir(), "commonweigh-test-db-"));
  const mariadb = await startMariadb({ folder, isPassing: true });
  project.provide("testServer", {
    host: mariadb.host,
    port: mariadb.port,
    rootSocket: mariadb.socket,
    migratorPassword: randomBytes(24).toString("base64url"),
    appPassword: randomBytes(24).toString("base64url"),
  });
  return async function teardown() {
    await mariadb.stop();
    await rm(folder, { recursive: true, force: true });
  };
}
