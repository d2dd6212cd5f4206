import { randomBytes } from "node:crypto";
import type { Server } from "node:http";
import { join } from "node:path";
import { pathToFileURL } from "node:url";
import type { ServerBuild } from "react-router";
import { vi } from "vitest";
import { connect } from "#scripts/migrate.js";
import { freePort } from "#scripts/ports.js";
import { projectFolder } from "#scripts/settings.js";
import { freshDatabase, type TestDatabase } from "./database.ts";
import { type Answer, type Asked, askAt } from "./http.ts";

export type Connection = Awaited<ReturnType<typeof connect>>;

/** The built application behind the real server, with a database of its own. */
export type TestApp = {
  origin: string;
  issuer: string;
  build: ServerBuild;
  database: TestDatabase;
  /** The account with all rights: what a test prepares and looks up by itself. */
  db: Connection;
  workerToken: string;
  ask: (path: string, asked?: Asked) => Promise<Answer>;
  /** One turn of the worker. */
  tick: () => Promise<Answer>;
  /** End it. @returns every answer of 500 and above, and every word on the error console: none, in a good run */
  close: () => Promise<string[]>;
};

type Given = { origin?: string; issuer?: string; clientSecret?: string; smtpPort?: number; devPages?: boolean };

/** @returns a free address for an application, to tell others before it is started */
export async function freeOrigin(): Promise<string> {
  return `http://127.0.0.1:${await freePort()}`;
}

/**
 * Start the built application in this process. Once a test file: the build reads its settings when it is imported.
 *
 * @param given - origin, and the neighbours it is to find; by default nobody answers at their addresses
 */
export async function startApp(given: Given = {}): Promise<TestApp> {
  const database = await freshDatabase();
  const origin = given.origin ?? (await freeOrigin());
  const issuer = given.issuer ?? "http://127.0.0.1:1";
  const workerToken = randomBytes(32).toString("base64url");
  Object.assign(process.env, {
    NODE_ENV: "production",
    PUBLIC_ORIGIN: origin,
    ...database.env,
    OIDC_ISSUER: issuer,
    OIDC_CLIENT_ID: "commonweigh",
    OIDC_CLIENT_SECRET: given.clientSecret ?? randomBytes(32).toString("base64url"),
    SMTP_HOST: "127.0.0.1",
    SMTP_PORT: String(given.smtpPort ?? 1),
    MAIL_FROM: "Commonweigh <network@commonweigh.example>",
    WORKER_TOKEN: workerToken,
    DEV_PAGES: given.devPages ? "1" : "0",
    LOG_LEVEL: process.env.TEST_LOG_LEVEL ?? "silent",
  });
  const faults: string[] = [];
  const errorConsole = vi.spyOn(console, "error").mockImplementation((...words: unknown[]) => {
    faults.push(words.map(String).join(" "));
  });
  // Not before: the framework looks at NODE_ENV when it is imported.
  const { createServer } = await import("#scripts/server.js");
  const address = pathToFileURL(join(projectFolder, "build", "server", "index.js")).href;
  const build = (await import(/* @vite-ignore */ address)) as ServerBuild;
  const server = createServer({ build, origin });
  await new Promise<void>((resolve) => server.listen(Number(new URL(origin).port), "127.0.0.1", resolve));
  const db = await connect(database.migrator);

  async function ask(path: string, asked: Asked = {}) {
    const answer = await askAt(origin, path, asked);
    if (answer.status >= 500)
      faults.push(`${asked.method ?? "GET"} ${path} ${answer.status}: ${answer.body.slice(0, 200)}`);
    return answer;
  }
  return {
    origin,
    issuer,
    build,
    database,
    db,
    workerToken,
    ask,
    tick: () => ask("/internal/tick", { method: "POST", token: workerToken }),
    close: async () => {
      await closed(server);
      await globalThis.__commonweigh?.close();
      await db.end();
      database.drop();
      errorConsole.mockRestore();
      return faults;
    },
  };
}

async function closed(server: Server) {
  const done = new Promise((resolve) => server.close(resolve));
  server.closeAllConnections();
  await done;
}
