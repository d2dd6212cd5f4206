import { afterAll, beforeAll, expect, test } from "vitest";
import { rulesByPattern } from "#app/middleware/access.ts";
import type { TestApp } from "#tests/support/app.ts";
import { type Answer, inParallel } from "#tests/support/http.ts";
import { contentDigest } from "#tests/support/rows.ts";
import { type MatrixWorld, type Visitor, matrixWorld } from "#tests/support/matrix-world.ts";
import { pagesOf } from "#tests/support/pages.ts";

/*
 * Who may open and who may change what, asked of the built application itself: every page × every method × every kind
 * of visitor × every form in which the framework serves a page. The access table says what has to come out.
 */

let world: MatrixWorld;
let app: TestApp;
const width = 8;
const methods = ["GET", "HEAD", "POST", "PUT", "PATCH", "DELETE"] as const;
type Method = (typeof methods)[number];

beforeAll(async () => {
  world = await matrixWorld();
  app = world.app;
}, 120_000);

afterAll(async () => expect(await app.close()).toEqual([]));

type Cell = { visitor: Visitor; method: Method; path: string };

function isAllowed(pattern: string, visitor: Visitor, method: Method) {
  const rule = rulesByPattern.get(pattern);
  if (rule === undefined) return false;
  if (rule === "public") return true;
  if (visitor.reader === null || visitor.door !== rule.door) return false;
  return (method === "GET" || method === "HEAD" ? rule.read : rule.write).includes(visitor.reader);
}

/** Turned away: to sign in, as not for this role, or without a valid token. */
function isRefused({ status, headers, body }: Answer) {
  const target = status === 202 ? body : (headers.location ?? "");
  return (
    status === 401 || status === 403 || ((status === 302 || status === 202) && target.includes("/login?returnTo="))
  );
}

async function askCell({ visitor, method, path }: Cell, form: Record<string, string> | null): Promise<Answer> {
  const { cookie, token } = await visitor.open();
  const headers: Record<string, string> =
    form === null ? {} : { origin: app.origin, "content-type": "application/x-www-form-urlencoded" };
  const body = form === null ? {} : { body: new URLSearchParams(form).toString() };
  return app.ask(path, { method, cookie, token, headers, ...body });
}

function nameOf({ visitor, method, path }: Cell) {
  return `${visitor.name}: ${method} ${path}`;
}

function plantedIn(answer: Answer) {
  const text = `${JSON.stringify(answer.headers)}\n${answer.body}`;
  return world.planted.filter((value) => text.includes(value));
}

const patterns = [...rulesByPattern.keys()];

test.each(patterns)("%s: each visitor and method as the access table says", async (pattern) => {
  const page = pagesOf(app.build).find((candidate) => candidate.pattern === pattern);
  if (!page) throw new Error(`The build has no page ${pattern}.`);
  const own = world.pathOf(pattern);
  const forms = [own, `${own === "/" ? "/_" : own}.data`, `${own === "/" ? "/_" : own}.data?_routes=${page.routeId}`];
  const cells = world.visitors.flatMap((visitor) =>
    methods.flatMap((method) => forms.map((path): Cell => ({ visitor, method, path }))),
  );
  const wrong: string[] = [];
  const check = async (cell: Cell, isExpected: boolean, form: Record<string, string> | null) => {
    const answer = await askCell(cell, form);
    // A redirect of the page's data says where to in its body, which HEAD leaves out.
    const isSilent = cell.method === "HEAD" && answer.status === 202;
    const telling = isSilent ? await askCell({ ...cell, method: "GET" }, null) : answer;
    if (isRefused(telling) === isExpected)
      wrong.push(`${nameOf(cell)} → ${answer.status}, though ${isExpected ? "allowed" : "not allowed"}`);
    if (cell.visitor.reader !== "coordinator")
      for (const value of plantedIn(answer)) wrong.push(`${nameOf(cell)} shows ${value}`);
  };

  const isChange = ({ method }: Cell) => method !== "GET" && method !== "HEAD";
  const denied = cells.filter(({ visitor, method }) => !isAllowed(pattern, visitor, method));
  const before = await contentDigest(app);
  await inParallel(denied, width, (cell) => check(cell, false, isChange(cell) ? world.formOf(pattern) : null));
  expect(await contentDigest(app)).toEqual(before);

  const allowed = cells.filter((cell) => !denied.includes(cell));
  await inParallel(allowed, width, (cell) => check(cell, true, isChange(cell) ? {} : null));
  expect(wrong).toEqual([]);
});

test("every page of the build stands in the access table, and every line of the table is a page", () => {
  expect(new Set(pagesOf(app.build).map(({ pattern }) => pattern))).toEqual(new Set(patterns));
});

test("every signed-in page has a loader, so that turning to it in the browser meets the access table", () => {
  const without = pagesOf(app.build).filter(
    ({ pattern, module }) =>
      rulesByPattern.get(pattern) !== "public" && module.default !== undefined && module.loader === undefined,
  );
  expect(without.map(({ pattern }) => pattern)).toEqual([]);
});

test("a page that can be changed by somebody has an action, and one with an action can be changed by somebody", () => {
  const withAction = pagesOf(app.build).filter(({ module }) => module.action !== undefined);
  const writable = patterns.filter((pattern) => {
    const rule = rulesByPattern.get(pattern);
    return rule !== undefined && rule !== "public" && rule.write.length > 0;
  });
  const changing = withAction.filter(({ pattern }) => rulesByPattern.get(pattern) !== "public");
  expect(changing.map(({ pattern }) => pattern).sort()).toEqual(writable.sort());
});

test("route modules export the framework's names only", () => {
  const known = [
    "default",
    "loader",
    "action",
    "meta",
    "handle",
    "headers",
    "links",
    "middleware",
    "shouldRevalidate",
    "ErrorBoundary",
    "HydrateFallback",
    "clientLoader",
    "clientAction",
    "clientMiddleware",
  ];
  const strange = pagesOf(app.build).flatMap(({ routeId, module }) =>
    Object.keys(module)
      .filter((name) => !known.includes(name))
      .map((name) => `${routeId}: ${name}`),
  );
  expect(strange).toEqual([]);
});
