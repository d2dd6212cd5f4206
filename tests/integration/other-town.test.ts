import { randomUUID } from "node:crypto";
import { afterAll, beforeAll, expect, test } from "vitest";
import type { TestApp } from "#tests/support/app.ts";
import { aPerson, aToken, signIn } from "#tests/support/factories.ts";
import { type Answer, type Asked, inParallel } from "#tests/support/http.ts";
import { type MatrixWorld, matrixWorld } from "#tests/support/matrix-world.ts";
import { countOf, rows } from "#tests/support/rows.ts";

/*
 * Another town's record answers as one that never was, byte for byte, and nothing that belongs to another town shows
 * up anywhere: planted words and figures are looked for in whatever comes back.
 */

let world: MatrixWorld;
let app: TestApp;
let cookies: Record<"recorder" | "director" | "coordinator" | "analyst", string>;
const neverId = 4_000_000_000;

beforeAll(async () => {
  world = await matrixWorld();
  app = world.app;
  const cookieFor = async (role: "coordinator" | "analyst") => signIn(app, await aPerson(app, { role }));
  cookies = {
    recorder: await signIn(app, world.recorder),
    director: await signIn(app, world.director),
    coordinator: await cookieFor("coordinator"),
    analyst: await cookieFor("analyst"),
  };
}, 120_000);

afterAll(async () => expect(await app.close()).toEqual([]));

/** An answer without what differs between any two: request ids, nonces and dates. */
function comparable({ status, headers, body }: Answer) {
  const plain = (text: string) =>
    text
      .replace(/[0-9a-f]{8}-[0-9a-f]{4}-4[0-9a-f]{3}-[0-9a-f]{4}-[0-9a-f]{12}/g, "UUID")
      .replace(/nonce(-|=")[A-Za-z0-9+/=]{24}/g, "NONCE");
  const { date: _date, ...kept } = headers;
  return { status, headers: plain(JSON.stringify(kept)), body: plain(body) };
}

type IdCase = [
  path: (id: number) => string,
  kind: "truckId" | "uploadId" | "calibrationId",
  form: Record<string, string> | null,
];

test.each<IdCase>([
  [(id) => `/fleet/${id}`, "truckId", null],
  [(id) => `/fleet/${id}.data`, "truckId", null],
  [(id) => `/fleet/${id}.data?_routes=routes/fleet/truck`, "truckId", null],
  [(id) => `/fleet/${id}/edit`, "truckId", null],
  [(id) => `/fleet/${id}/work`, "truckId", null],
  [(id) => `/fleet/${id}/work`, "truckId", { clientRef: randomUUID(), part: "gate", doneOn: "2025-10-20" }],
  [(id) => `/fleet/calibrations/${id}`, "calibrationId", null],
  [(id) => `/fleet/calibrations/${id}.data`, "calibrationId", null],
  [(id) => `/fleet/calibrations/${id}/card`, "calibrationId", null],
  [(id) => `/uploads/${id}`, "uploadId", null],
  [(id) => `/uploads/${id}.data`, "uploadId", null],
  [(id) => `/uploads/${id}/problems`, "uploadId", null],
  [(id) => `/uploads/${id}`, "uploadId", {}],
  [(id) => `/uploads/${id}.data`, "uploadId", {}],
])("case %#: another town's id answers as an id that never was", async (pathOf, kind, form) => {
  for (const role of ["recorder", "director"] as const) {
    const asked: Asked = { cookie: cookies[role], ...(form ? { form } : {}) };
    const theirs = await app.ask(pathOf(world.other[kind]), asked);
    const nobodys = await app.ask(pathOf(neverId), asked);
    expect(theirs.status, role).toBe(404);
    expect(comparable(theirs)).toEqual(comparable(nobodys));
  }
});

test.each(["0", "-1", "1.5", "1e3", "0x10", "٣", "4294967296", "99999999999999999999", "1%00", "1'--", "%F0%9F%98%80"])(
  "the malformed id %s answers as one that never was",
  async (text) => {
    for (const path of [`/fleet/${text}`, `/uploads/${text}`, `/uploads/${text}/problems`]) {
      const address = encodeURI(path).replaceAll("%25", "%");
      expect((await app.ask(address, { cookie: cookies.director })).status, path).toBe(404);
    }
  },
);

test("another town's calibration in the form is passed over, and stays as it is", async () => {
  const { calibrationId } = world.other;
  const answer = await app.ask("/fleet", { cookie: cookies.director, form: { calibrationId: String(calibrationId) } });
  expect(answer.status).toBe(302);
  expect(await countOf(app, `calibration WHERE id = ${calibrationId} AND state = 'ready'`)).toBe(1);
});

test("another person's session and token in a form answer as ones that never were", async () => {
  const other = await aPerson(app, { role: "analyst" });
  await signIn(app, other);
  await aToken(app, other);
  const [session] = await rows<{ id: number }>(app, "SELECT id FROM session WHERE user_id = ?", [other.id]);
  const [token] = await rows<{ id: number }>(app, "SELECT id FROM api_token WHERE user_id = ?", [other.id]);
  const ends = (id: number) => app.ask("/account", { cookie: cookies.analyst, form: { sessionId: String(id) } });
  const revokes = (id: number) =>
    app.ask("/dataset/tokens", { cookie: cookies.analyst, form: { intent: "revoke", tokenId: String(id) } });
  expect((await ends(session?.id ?? 0)).status).toBe(404);
  expect((await ends(neverId)).status).toBe(404);
  expect((await revokes(token?.id ?? 0)).status).toBe(404);
  expect((await revokes(neverId)).status).toBe(404);
  expect(await countOf(app, `session WHERE user_id = ${other.id}`)).toBe(1);
  expect(await countOf(app, `api_token WHERE user_id = ${other.id} AND revoked_at IS NULL`)).toBe(1);
});

/** What a form could try to set beside its own fields. */
const forged = {
  townId: "1",
  town_id: "1",
  role: "coordinator",
  state: "accepted",
  userId: "1",
  createdById: "1",
  approvedAt: "2020-01-01",
  ["__proto__"]: "x",
  "constructor.prototype.polluted": "x",
  "a[__proto__][polluted]": "x",
};

test("columns named in a form change nothing, and no prototype", async () => {
  const draft = "SELECT state, version, town_id FROM season_figure WHERE season_start_year = 2024 AND state = 'draft'";
  const before = await rows(app, draft);
  await app.ask("/season/2024", { cookie: cookies.director, form: { ...forged, version: "77" } });
  expect(await rows(app, draft)).toEqual(before);
  const invited = {
    ...forged,
    clientRef: randomUUID(),
    name: "New Person",
    email: "new@sample.example",
    role: "analyst",
  };
  await app.ask("/network/people", { cookie: cookies.coordinator, form: { ...invited, townId: "1" } });
  expect(await rows(app, "SELECT role, town_id FROM invitation WHERE name = 'New Person'")).toEqual([
    { role: "analyst", town_id: null },
  ]);
  expect(Object.prototype).not.toHaveProperty("polluted");
});

test("a field sent twice counts as its first, and never as a list", async () => {
  const figure = "season_figure WHERE season_start_year = 2024 AND state = 'sent'";
  const before = await countOf(app, figure);
  const form = [
    ["version", "77"],
    ["version", "1"],
  ] as const;
  expect((await app.ask("/season/2024", { cookie: cookies.director, form })).status).toBe(409);
  expect(await countOf(app, figure)).toBe(before);
});

const strangePaths = [
  "/FLEET",
  "/Fleet/{truck}",
  "/fleet/{truck}/",
  "//fleet/{truck}",
  "/fleet//{truck}",
  "/%66leet/{truck}",
  "/fleet/{truck}%2F",
  "/fleet/{truck}.DATA",
  "/fleet/{truck}/_.data",
  "/fleet/{truck}/.data",
  "/fleet/{truck}.data.data",
  "/fleet/{truck};a=b",
  "/peers/../fleet/{truck}",
  "/peers/%2e%2e/fleet/{truck}",
  "/UPLOADS/{upload}/PROBLEMS",
  "/uploads/{upload}/problems/",
  "/uploads/{upload}/problems.csv",
  "/Network",
  "/NETWORK/Review/{figure}",
  "/network/review/{figure}/",
  "/network/review/{figure}.data?_routes=routes/network/people",
  "/network/people.data?_routes=root",
  "/today.data?_routes=routes/network/people",
  "/fleet.data?_routes=routes/network/people,root",
  "/API/V1/Editions",
  "/api/v1/editions/",
  "/api/v1/editions.data",
  "/Internal/Tick",
  "/no/such/page",
  "/no/such/page.data",
  "/__manifest?paths=/network/people",
  "/.git/config",
  "/.env",
  "/build/server/index.js",
  "/server/index.js",
  "/assets/../../server/index.js",
  "/assets/%2e%2e/%2e%2e/server/index.js",
  "/assets/..%2f..%2fserver%2findex.js",
  "/assets/",
  "/metrics",
  "/.data",
  "/_root.data",
];

test("addresses written in other ways open no other doors", async () => {
  const { truckId, uploadId, figureId } = world.other;
  const paths = strangePaths.map((path) =>
    path
      .replace("{truck}", String(truckId))
      .replace("{upload}", String(uploadId))
      .replace("{figure}", String(figureId)),
  );
  const people = [undefined, cookies.recorder, cookies.director, cookies.analyst];
  const cells = paths.flatMap((path) =>
    people.flatMap((cookie) => ["GET", "POST"].map((method) => ({ path, cookie, method }))),
  );
  const wrong: string[] = [];
  await inParallel(cells, 8, async ({ path, cookie, method }) => {
    const answer = await app.ask(path, method === "GET" ? { cookie } : { cookie, form: {} });
    for (const value of world.planted)
      if (`${JSON.stringify(answer.headers)}${answer.body}`.includes(value))
        wrong.push(`${method} ${path} shows ${value}`);
    const isOpen = answer.status === 200 && !answer.headers["content-type"]?.startsWith("image/");
    const isForbidden = /network|internal|api|git|env|server|metrics|manifest|fleet\/|uploads/i.test(
      path.split("?")[0] ?? "",
    );
    if (isOpen && isForbidden) wrong.push(`${method} ${path} is open`);
  });
  expect(wrong).toEqual([]);
});

/** Every page that a person may read, with the queries they know. */
function readablePages(editionId: number) {
  const table = (indicator: string) => `/peers/table?indicator=${indicator}&edition=${editionId}&group=all`;
  return {
    town: [
      "/today",
      "/account",
      "/fleet",
      "/season/2023",
      "/season/2024",
      "/uploads",
      "/peers",
      `/peers?edition=${editionId}&group=all`,
      table("salt-per-event"),
      table("rate-at-working-setting"),
      "/workshops",
    ],
    everyone: [
      "/",
      "/protection",
      "/login",
      "/dataset",
      `/dataset/editions/${editionId}/cells.csv`,
      `/dataset/editions/${editionId}/rows.csv`,
      `/dataset/editions/${editionId}/datapackage.json`,
    ],
  };
}

test("no page, datum or file shows what belongs to another town, but to the coordinator", async () => {
  const [edition] = await rows<{ id: number }>(app, "SELECT id FROM edition");
  const { town, everyone } = readablePages(edition?.id ?? 0);
  for (const role of ["recorder", "director", "analyst"] as const)
    await app.ask("/dataset", { cookie: cookies[role], form: {} });
  const cells = [
    ...everyone.map((path) => ({ path, cookie: undefined as string | undefined })),
    ...[...everyone, "/today", "/dataset/tokens"].map((path) => ({ path, cookie: cookies.analyst })),
    ...[...everyone, ...town].flatMap((path) =>
      [cookies.recorder, cookies.director].map((cookie) => ({ path, cookie })),
    ),
  ];
  const dataOf = (path: string) => (path === "/" ? "/_.data" : path.replace(/^([^?]*)/, "$1.data"));
  const shown: string[] = [];
  let opened = 0;
  await inParallel(
    cells.flatMap((cell) => [cell, { ...cell, path: dataOf(cell.path) }]),
    8,
    async ({ path, cookie }) => {
      const answer = await app.ask(path, { cookie });
      if (answer.status === 200) opened++;
      for (const value of world.planted)
        if (`${JSON.stringify(answer.headers)}${answer.body}`.includes(value)) shown.push(`${path} shows ${value}`);
    },
  );
  expect(shown).toEqual([]);
  expect(opened).toBeGreaterThan(cells.length);
});

test("the planted words are there to be found: the coordinator sees them", async () => {
  const pages = ["/network/people", `/network/review/${world.other.figureId}`].map((path) =>
    app.ask(path, { cookie: cookies.coordinator }),
  );
  const text = (await Promise.all(pages)).map(({ body }) => body).join("\n");
  for (const value of ["Quaggywater", "Zebulon Quagg", "zebulon.quagg@", "Zephyr question", "246913578", "777.77"])
    expect(text).toContain(value);
});
