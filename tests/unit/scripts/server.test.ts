import { type IncomingHttpHeaders, request, type Server } from "node:http";
import { connect } from "node:net";
import type { ServerBuild } from "react-router";
import { afterAll, beforeAll, expect, test } from "vitest";
import { freePort } from "#scripts/ports.js";
import { createServer } from "#scripts/server.js";

let server: Server;
let port = 0;

function resource(id: string, path: string, loader: (request: Request) => Response) {
  return { id, path, module: { default: undefined, loader: (given: { request: Request }) => loader(given.request) } };
}

const routes = {
  echo: resource("echo", "echo", (given) =>
    Response.json({ url: given.url, names: [...given.headers.keys()] }, { headers: { "Cache-Control": "max-age=5" } }),
  ),
  health: resource("health", "healthz", () => new Response("ok")),
  broken: resource("broken", "broken", () => {
    throw new Error("secret detail");
  }),
  nowhere: resource("nowhere", "*", () => new Response("not here", { status: 404 })),
};
// As little of a build as the framework needs to route a request.
const build = {
  routes,
  entry: {
    module: {
      default: (_request: Request, status: number, headers: Headers) => new Response("page", { status, headers }),
    },
  },
  assets: { version: "1", url: "", entry: { module: "", imports: [] }, routes: {} },
  future: {},
  publicPath: "/",
  assetsBuildDirectory: "build/client",
  basename: "/",
  isSpaMode: false,
  ssr: true,
  prerender: [],
  routeDiscovery: { mode: "initial", manifestPath: "/__manifest" },
  allowedActionOrigins: false,
} as unknown as ServerBuild;

beforeAll(async () => {
  port = await freePort();
  server = createServer({ build, origin: `http://127.0.0.1:${port}` });
  await new Promise<void>((resolve) => server.listen(port, "127.0.0.1", resolve));
});

afterAll(() => new Promise((resolve) => server.close(resolve)));

type Answer = { status: number; headers: IncomingHttpHeaders; body: string };

function ask(path: string, method = "GET", headers: Record<string, string> = {}): Promise<Answer> {
  return new Promise((resolve, reject) => {
    const asked = request({ host: "127.0.0.1", port, path, method, headers, agent: false }, (response) => {
      let body = "";
      response.setEncoding("utf8").on("data", (chunk: string) => (body += chunk));
      response.on("end", () => resolve({ status: response.statusCode ?? 0, headers: response.headers, body }));
    });
    asked.on("error", reject).end();
  });
}

const everywhere = {
  "x-content-type-options": "nosniff",
  "referrer-policy": "same-origin",
  "x-frame-options": "DENY",
  "cross-origin-opener-policy": "same-origin",
  "cross-origin-resource-policy": "same-origin",
  "content-security-policy": "default-src 'none'; frame-ancestors 'none'",
};

test.each([
  ["a page that is found", "GET", "/healthz", {}, 200],
  ["a page that is not", "GET", "/nowhere", {}, 404],
  ["an asset that is not there", "GET", "/assets/none.js", {}, 404],
  ["an error of the application", "GET", "/broken", {}, 500],
  ["a method nobody serves", "OPTIONS", "/echo", {}, 405],
  ["TRACE", "TRACE", "/echo", {}, 405],
  ["another host", "GET", "/echo", { host: "elsewhere.example" }, 421],
  ["a body over the limit", "POST", "/echo", { "content-length": "6000001" }, 413],
  ["an address that cannot be decoded", "GET", "/%E0%A4%A", {}, 400],
  ["an address with a host of its own", "GET", "http://elsewhere.example/echo", {}, 400],
])("%s carries the security headers", async (_what, method, path, headers, status) => {
  const answer = await ask(path, method, headers);
  expect(answer.status).toBe(status);
  expect(answer.headers).toMatchObject({ ...everywhere, "cache-control": "private, no-store" });
  expect(answer.headers).not.toHaveProperty("x-powered-by");
  expect(answer.headers).not.toHaveProperty("strict-transport-security");
  expect(answer.body).not.toContain("secret detail");
});

test("a request that Node cannot read is answered with the security headers too", async () => {
  const answer = await new Promise<string>((resolve, reject) => {
    const socket = connect(port, "127.0.0.1", () => socket.write("NONSENSE\r\n\r\n"));
    let text = "";
    socket.on("data", (chunk) => (text += chunk.toString()));
    socket.on("close", () => resolve(text)).on("error", reject);
  });
  expect(answer).toMatch(/^HTTP\/1\.1 400 Bad Request\r\n/);
  expect(answer).toContain("X-Frame-Options: DENY");
});

test("a refused method is told which ones are served", async () => {
  expect((await ask("/echo", "OPTIONS")).headers.allow).toBe("GET, HEAD, POST, PUT, PATCH, DELETE");
});

test("a health check may come under any name", async () => {
  expect((await ask("/healthz", "GET", { host: "10.0.0.7" })).status).toBe(200);
});

test("an answer's own header is sent once and replaces the default", async () => {
  expect((await ask("/echo")).headers["cache-control"]).toBe("max-age=5");
});

test("the application sees the configured address and none of the framework's inner headers", async () => {
  const forged = { "x-forwarded-host": "evil.example", "x-forwarded-proto": "https", "x-react-router-inner": "1" };
  const seen = JSON.parse((await ask("/echo?a=1", "GET", forged)).body) as { url: string; names: string[] };
  expect(seen.url).toBe(`http://127.0.0.1:${port}/echo?a=1`);
  expect(seen.names).not.toContain("x-react-router-inner");
  expect(seen.names).not.toContain("x-forwarded-host");
});
