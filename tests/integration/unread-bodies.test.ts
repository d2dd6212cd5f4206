import { Agent, request } from "node:http";
import { afterAll, beforeAll, expect, test } from "vitest";
import { startApp, type TestApp } from "#tests/support/app.ts";
import { aPerson, aTown, signIn } from "#tests/support/factories.ts";

/*
 * A browser sends its next request on the same connection. When an answer went out before all of a form had been read,
 * the rest of that form must not keep the next request waiting.
 */

let app: TestApp;
let cookie: string;

beforeAll(async () => {
  app = await startApp();
  cookie = await signIn(app, await aPerson(app, { role: "analyst" }));
  await aTown(app);
});

afterAll(async () => expect(await app.close()).toEqual([]));

/** One request on the agent's one connection. */
function askOn(agent: Agent, path: string, method: string, headers: Record<string, string>, body?: Buffer) {
  const { hostname, port } = new URL(app.origin);
  return new Promise<{ status: number; isReused: boolean }>((resolve, reject) => {
    const sent = request({ hostname, port, path, method, headers, agent, timeout: 5_000 }, (response) => {
      response.resume().on("end", () => resolve({ status: response.statusCode ?? 0, isReused: sent.reusedSocket }));
    });
    sent.on("timeout", () => sent.destroy(new Error(`${method} ${path} had to wait`)));
    sent.on("error", reject).end(body);
  });
}

const form = { "content-type": "multipart/form-data; boundary=b" };
const ours = () => ({ ...form, origin: app.origin });

test.each<[string, string, () => Record<string, string>, number, number]>([
  ["a signed-out visitor's file", "/uploads", ours, 302, 300_000],
  ["a file of somebody who may send none", "/uploads", () => ({ ...ours(), cookie }), 403, 2_000_000],
  ["a file over the page's limit", "/uploads", ours, 302, 5_990_000],
  ["a file over the server's limit", "/uploads", ours, 413, 7_000_000],
  [
    "another site's form, refused by the framework",
    "/account",
    () => ({ ...form, origin: "http://elsewhere.example" }),
    400,
    300_000,
  ],
  [
    "another site's form, refused by the application",
    "/logout",
    () => ({ ...form, origin: "http://elsewhere.example" }),
    403,
    300_000,
  ],
  ["a form to a page that takes none", "/healthz", ours, 405, 300_000],
  ["a form to no page", "/nowhere", ours, 404, 300_000],
  ["a form that is not read", "/logout", () => ({ ...ours(), cookie }), 302, 300_000],
])("after %s the connection serves the next request at once", async (_what, path, headers, status, byteCount) => {
  const agent = new Agent({ keepAlive: true, maxSockets: 1 });
  const body = Buffer.alloc(byteCount, "x");
  const first = await askOn(agent, path, "POST", { ...headers(), "content-length": String(byteCount) }, body);
  expect(first.status).toBe(status);
  const next = await askOn(agent, "/healthz", "GET", {});
  // A client that is answered in the middle of its sending gives the connection up by itself.
  expect(next).toEqual({ status: 200, isReused: byteCount < 3_000_000 });
  agent.destroy();
});
