import { connect as connectSocket } from "node:net";
import { request } from "node:http";
import { afterAll, beforeAll, expect, test } from "vitest";
import { startApp, type TestApp } from "#tests/support/app.ts";
import { aPerson, aTown, reportingTowns, signIn } from "#tests/support/factories.ts";
import type { Answer, Asked } from "#tests/support/http.ts";

let app: TestApp;
let cookie: string;

beforeAll(async () => {
  app = await startApp();
  await reportingTowns(app, 1);
  cookie = await signIn(app, await aPerson(app, { role: "director", town: await aTown(app) }));
});

afterAll(async () => expect(await app.close()).toEqual([]));

const everywhere = {
  "x-content-type-options": "nosniff",
  "referrer-policy": "same-origin",
  "x-frame-options": "DENY",
  "cross-origin-opener-policy": "same-origin",
  "cross-origin-resource-policy": "same-origin",
  "permissions-policy": expect.stringContaining("camera=()") as string,
  "content-security-policy": expect.stringMatching(/^default-src 'none'; .*frame-ancestors 'none'$/) as string,
};

function staticFile() {
  return app.build.assets.entry.module;
}

type Case = [what: string, ask: () => Promise<Answer>, status: number];
const signedIn = (path: string, asked: Asked = {}) => app.ask(path, { cookie, ...asked });

test.each<Case>([
  ["a public page", () => app.ask("/"), 200],
  ["a signed-in page", () => signedIn("/today"), 200],
  ["its data", () => signedIn("/today.data"), 200],
  ["a file to keep", () => signedIn("/uploads/templates/calibrations"), 200],
  ["a redirect", () => signedIn("/season"), 302],
  ["a redirect of the data", () => signedIn("/season.data"), 202],
  ["a redirect to the sign-in page", () => app.ask("/fleet"), 302],
  ["a form that is no good", () => signedIn("/season/2024", { form: {} }), 404],
  [
    "a form that another site sends",
    () => signedIn("/season/2024", { form: {}, headers: { origin: "http://elsewhere.example" } }),
    400,
  ],
  [
    "its data form",
    () => signedIn("/season/2024.data", { form: {}, headers: { origin: "http://elsewhere.example" } }),
    400,
  ],
  ["a page that is not the role's", () => signedIn("/network"), 403],
  ["its data", () => signedIn("/network.data"), 403],
  ["a page that is not there", () => app.ask("/nowhere/at/all"), 404],
  ["its data", () => app.ask("/nowhere/at/all.data"), 404],
  ["a file that is not there", () => app.ask("/assets/nothing.js"), 404],
  ["the program's door without a token", () => app.ask("/api/v1/editions"), 401],
  ["a method that nobody serves", () => app.ask("/today", { method: "OPTIONS" }), 405],
  ["TRACE", () => app.ask("/today", { method: "TRACE" }), 405],
  ["another site's name", () => app.ask("/", { headers: { host: "elsewhere.example" } }), 421],
  [
    "a body that is announced as too long",
    () => app.ask("/uploads", { method: "POST", headers: { "content-length": "6000001", connection: "close" } }),
    413,
  ],
  ["an address that cannot be decoded", () => app.ask("/%E0%A4%A"), 400],
])("%s carries the security headers, and is kept by nobody", async (_what, ask, status) => {
  const answer = await ask();
  expect(answer.status).toBe(status);
  expect(answer.headers).toMatchObject({ ...everywhere, "cache-control": "private, no-store" });
  expect(answer.headers).not.toHaveProperty("x-powered-by");
});

test("a built file carries the security headers and may be kept for a year", async () => {
  const answer = await app.ask(staticFile());
  expect(answer.status).toBe(200);
  expect(answer.headers).toMatchObject({ ...everywhere, "cache-control": "public, max-age=31536000, immutable" });
});

test("a file under a lasting name is asked for again each time", async () => {
  const answer = await app.ask("/favicon.svg");
  expect(answer.status).toBe(200);
  expect(answer.headers).toMatchObject({ ...everywhere, "cache-control": "public, max-age=0" });
});

test("signed-in answers differ by cookie", async () => {
  for (const path of ["/today", "/today.data", "/uploads/templates/calibrations"]) {
    expect((await signedIn(path)).headers.vary, path).toContain("Cookie");
  }
});

function nonceOf(answer: Answer) {
  return /script-src 'self' 'nonce-([^']+)'/.exec(answer.headers["content-security-policy"]?.toString() ?? "")?.[1];
}

test("every script of a page bears the nonce of its policy, which is another each time", async () => {
  const answers = [];
  for (let turn = 0; turn < 20; turn++) answers.push(await signedIn(turn % 2 === 0 ? "/today" : "/fleet"));
  for (const answer of answers) {
    const nonce = nonceOf(answer);
    expect(nonce).toMatch(/^[A-Za-z0-9+/]{22}==$/);
    const scripts = [...answer.body.matchAll(/<script\b[^>]*>/g)].map(([tag]) => tag);
    expect(scripts.length).toBeGreaterThan(2);
    for (const tag of scripts) expect(tag).toContain(`nonce="${nonce ?? ""}"`);
    expect(answer.body).not.toMatch(/\son[a-z]+="/);
  }
  expect(new Set(answers.map(nonceOf)).size).toBe(20);
});

test("an error page has a nonce of its own", async () => {
  const answer = await app.ask("/nowhere");
  expect(answer.body).toContain(`nonce="${nonceOf(answer) ?? "none"}"`);
});

test("HEAD has the headers of GET and no body", async () => {
  const [head, get] = [await signedIn("/today", { method: "HEAD" }), await signedIn("/today")];
  expect(head.status).toBe(200);
  expect(head.bytes).toHaveLength(0);
  expect(head.headers["content-type"]).toBe(get.headers["content-type"]);
});

test("text has its encoding named", async () => {
  const types = {
    "/": /charset=utf-8/,
    "/uploads/templates/calibrations": /^text\/csv; charset=utf-8$/,
    "/healthz": /charset=utf-8/,
  };
  for (const [path, type] of Object.entries(types)) {
    expect((await signedIn(path, path === "/" ? { cookie: undefined } : {})).headers["content-type"], path).toMatch(
      type,
    );
  }
});

/** Bytes in chunks, for as long as the server takes them. */
function sendChunks(path: string, count: number): Promise<number> {
  const { hostname, port } = new URL(app.origin);
  return new Promise((resolve, reject) => {
    const headers = {
      cookie,
      origin: app.origin,
      "content-type": "multipart/form-data; boundary=b",
      "transfer-encoding": "chunked",
    };
    const sent = request({ hostname, port, path, method: "POST", headers, agent: false }, (response) => {
      resolve(response.statusCode ?? 0);
      sent.destroy();
    });
    // A refused sender may find the connection closed before it has read the refusal.
    sent.on("error", (error) => (sent.destroyed ? undefined : reject(error)));
    const piece = Buffer.alloc(64 * 1024, "x");
    for (let turn = 0; turn < count; turn++) sent.write(piece);
  });
}

test("a body that does not say how long it is is refused unread, long or short", async () => {
  expect(await sendChunks("/uploads", 1)).toBe(411);
  expect(await sendChunks("/uploads", 110)).toBe(411);
});

test.each([
  [
    "a length and chunks at once",
    "POST /uploads HTTP/1.1\r\nHost: %\r\nContent-Length: 4\r\nTransfer-Encoding: chunked\r\n\r\n0\r\n\r\n",
  ],
  ["two lengths", "POST /uploads HTTP/1.1\r\nHost: %\r\nContent-Length: 4\r\nContent-Length: 5\r\n\r\nabcde"],
  ["a broken head", "GET / HTTP/1.1\r\nHost: %\r\nno colon here\r\n\r\n"],
])("%s is answered by 400 and the end of the connection", async (_what, text) => {
  const { hostname, port, host } = new URL(app.origin);
  const answer = await new Promise<string>((resolve, reject) => {
    const socket = connectSocket(Number(port), hostname, () => socket.write(text.replace("%", host)));
    let received = "";
    socket.on("data", (piece) => (received += piece.toString()));
    socket.on("close", () => resolve(received)).on("error", reject);
  });
  expect(answer).toMatch(/^HTTP\/1\.1 400 /);
  expect(answer).toContain("Content-Security-Policy: default-src 'none'");
});

test.each(["x-react-router-spa-mode", "x-react-router-prerender-data", "x-remix-anything", "x-user-id"])(
  "the header %s changes nothing",
  async (name) => {
    const plain = await app.ask("/protection.data");
    const forged = await app.ask("/protection.data", { headers: { [name]: "1" } });
    expect(forged.status).toBe(200);
    expect(forged.body.length).toBe(plain.body.length);
  },
);
