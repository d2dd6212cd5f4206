import { afterAll, beforeAll, expect, test } from "vitest";
import { startApp, type TestApp } from "#tests/support/app.ts";
import {
  acceptsTerms,
  aPerson,
  aSeasonFigure,
  aTown,
  aToken,
  digest,
  type Person,
  reportingTowns,
  signIn,
  type Town,
} from "#tests/support/factories.ts";
import type { Answer } from "#tests/support/http.ts";
import { countOf, insert, minutesFromNow, rows } from "#tests/support/rows.ts";

/* An edition is computed once, frozen, and all that anybody sees of another town. */

let app: TestApp;
let towns: Town[];
let coordinator: string;
let analyst: Person;
let editionId: number;

const publish = (number: number) =>
  app.ask("/network/editions", { cookie: coordinator, form: { season: "2024", number: String(number) } });

beforeAll(async () => {
  app = await startApp();
  towns = await reportingTowns(app, 16);
  // A district of three: too few to be shown to anybody.
  for (const laneMiles of [90, 110, 130]) {
    const town = await aTown(app, { district: "Cove" });
    await aSeasonFigure(app, town, { state: "accepted", laneMiles, saltLb: 1_111_111 });
  }
  for (const town of towns.slice(0, 3)) await aPerson(app, { role: "director", town });
  coordinator = await signIn(app, await aPerson(app, { role: "coordinator" }));
  analyst = await aPerson(app, { role: "analyst" });
});

afterAll(async () => expect(await app.close()).toEqual([]));

test("asked for six times at once, an edition is queued once", async () => {
  const statuses = (await Promise.all([1, 2, 3, 4, 5, 6].map(() => publish(1)))).map(({ status }) => status);
  expect(statuses).toEqual(Array(6).fill(302));
  expect(await countOf(app, "job WHERE kind = 'publish-edition'")).toBe(1);
  expect(await countOf(app, "audit_entry WHERE action = 'edition.request'")).toBe(1);
  expect((await publish(2)).status).toBe(409);
});

test("published by three workers at once, it is there once, and each director is told once", async () => {
  await Promise.all([app.tick(), app.tick(), app.tick()]);
  expect(await rows(app, "SELECT season_start_year, number, town_count FROM edition")).toEqual([
    { season_start_year: 2024, number: 1, town_count: 19 },
  ]);
  expect(await rows(app, "SELECT state, attempts, last_error FROM job")).toEqual([
    { state: "done", attempts: 1, last_error: null },
  ]);
  expect(await countOf(app, "outbox_mail WHERE dedupe_key LIKE 'edition:%'")).toBe(3);
  expect(await countOf(app, "audit_entry WHERE action = 'edition.publish'")).toBe(1);
  const [edition] = await rows<{ id: number }>(app, "SELECT id FROM edition");
  editionId = edition?.id ?? 0;
});

test("asked for again under the same number it is refused, and a job run again publishes nothing more", async () => {
  expect((await publish(1)).status).toBe(409);
  await app.db.query("UPDATE job SET state = 'running', locked_until = ?", [minutesFromNow(-1)]);
  expect((await app.tick()).body).toContain('"jobs":1');
  expect(await countOf(app, "edition")).toBe(1);
  expect(await countOf(app, "outbox_mail WHERE dedupe_key LIKE 'edition:%'")).toBe(3);
});

test("a job whose worker lives is left alone, one nobody can do is tried three times and then given up", async () => {
  await app.db.query("UPDATE job SET state = 'running', locked_until = ?", [minutesFromNow(2)]);
  await insert(app, "job", {
    kind: "make-coffee",
    payload: "{}",
    dedupe_key: "coffee",
    run_after: minutesFromNow(-1),
    created_at: minutesFromNow(0),
  });
  for (let turn = 1; turn <= 3; turn++) {
    expect((await app.tick()).body).toContain('"jobs":0');
    expect(await rows(app, "SELECT attempts, state FROM job WHERE kind = 'make-coffee'")).toEqual([
      { attempts: turn, state: turn < 3 ? "ready" : "failed" },
    ]);
    await app.tick();
    await app.db.query("UPDATE job SET run_after = ? WHERE kind = 'make-coffee'", [minutesFromNow(-1)]);
  }
  expect(await rows(app, "SELECT attempts, last_error FROM job WHERE kind = 'make-coffee'")).toEqual([
    { attempts: 3, last_error: "Nobody does jobs of the kind make-coffee." },
  ]);
  expect(await countOf(app, "job WHERE kind = 'publish-edition' AND state = 'running'")).toBe(1);
  await app.db.query("UPDATE job SET state = 'done' WHERE kind = 'publish-edition'");
});

type Cell = { audience: string; indicator: string; group_key: string; cell: Record<string, unknown> };
async function cells() {
  const found = await rows<Omit<Cell, "cell"> & { cell: string | Cell["cell"] }>(
    app,
    "SELECT audience, indicator, group_key, cell FROM edition_cell",
  );
  return found.map((one): Cell => ({
    ...one,
    cell: typeof one.cell === "string" ? (JSON.parse(one.cell) as Cell["cell"]) : one.cell,
  }));
}

test("a withheld figure carries nothing but its reason, for no audience", async () => {
  const all = await cells();
  const withheld = all.filter(({ cell }) => cell.state === "withheld");
  const audiences = ["member", "wall", "download"];
  expect(audiences.map((audience) => withheld.filter((cell) => cell.audience === audience).length > 0)).toEqual([
    true,
    true,
    true,
  ]);
  for (const { audience, cell } of withheld) {
    const { axis, ...rest } = cell;
    expect(Object.keys(rest).sort()).toEqual(["groupLabel", "reason", "state"]);
    expect(axis === undefined).toBe(audience === "download");
  }
  // One axis for an indicator, whatever the group: it says nothing of the group.
  for (const indicator of new Set(all.map((cell) => cell.indicator))) {
    const axes = all
      .filter((cell) => cell.indicator === indicator && cell.audience !== "download")
      .map(({ cell }) => JSON.stringify(cell.axis));
    expect(new Set(axes).size).toBe(1);
  }
});

function withoutNonces({ body }: Answer) {
  return body
    .replace(/nonce="[^"]+"/g, "")
    .replace(/[0-9a-f]{8}-[0-9a-f]{4}-4[0-9a-f]{3}-[0-9a-f]{4}-[0-9a-f]{12}/g, "");
}

const peersPages = () => [
  `/peers?edition=${editionId}`,
  "/peers",
  `/peers/table?edition=${editionId}&indicator=salt-per-event&group=all`,
];

test("Peers reads the edition alone: whatever becomes of the figures, the page does not move", async () => {
  const [town, other] = towns;
  if (!town || !other) throw new Error("no towns");
  const cookie = await signIn(app, await aPerson(app, { role: "director", town }));
  const look = async () =>
    Promise.all(peersPages().map(async (path) => withoutNonces(await app.ask(path, { cookie }))));
  const before = await look();
  await app.db.query("UPDATE season_figure SET salt_lb = salt_lb * 3");
  await app.db.query("UPDATE calibration_catch SET gross_lb = gross_lb + 4");
  await app.db.query("UPDATE truck SET working_speed_mph = 10");
  await app.db.query("UPDATE town SET district = 'Elsewhere' WHERE id = ?", [other.id]);
  expect(await look()).toEqual(before);
  expect(before[0]).toContain(town.name);
});

test("each town finds its own figure, and none of another's", async () => {
  const places = await rows<{ town_id: number; own_value: number }>(
    app,
    "SELECT town_id, own_value FROM edition_place WHERE edition_id = ?",
    [editionId],
  );
  const valuesOf = (town: Town) =>
    places.filter((place) => place.town_id === town.id).map((place) => String(place.own_value));
  for (const town of towns.slice(0, 3)) {
    const cookie = await signIn(app, await aPerson(app, { role: "recorder", town }));
    const texts = await Promise.all(
      peersPages()
        .flatMap((path) => [path, path.replace(/^([^?]*)/, "$1.data")])
        .map(async (path) => (await app.ask(path, { cookie })).body),
    );
    const text = texts.join("\n");
    for (const value of valuesOf(town)) expect(text).toContain(value);
    for (const other of towns.filter(({ id }) => id !== town.id)) {
      for (const value of valuesOf(other)) expect(text).not.toContain(value);
      expect(text).not.toContain(`${other.name}<`);
      expect(text).not.toContain(`"${other.name}"`);
    }
  }
});

test("a withheld group's table is not there, nor one of another edition or of no indicator", async () => {
  const [town] = towns;
  if (!town) throw new Error("no town");
  const cookie = await signIn(app, await aPerson(app, { role: "director", town }));
  const withheld = (await cells()).find(({ audience, cell }) => audience === "member" && cell.state === "withheld");
  const addresses = [
    `indicator=${withheld?.indicator ?? ""}&edition=${editionId}&group=${withheld?.group_key ?? ""}`,
    `indicator=salt-per-event&edition=${editionId + 99}&group=all`,
    `indicator=salt-per-event&edition=${editionId}&group=__proto__`,
    `indicator=constructor&edition=${editionId}&group=all`,
    "indicator=salt-per-event",
  ];
  for (const query of addresses) expect((await app.ask(`/peers/table?${query}`, { cookie })).status, query).toBe(404);
  for (const query of ["edition=999", "edition=x", `edition=${editionId}&group=nobody`, "group="])
    expect((await app.ask(`/peers?${query}`, { cookie })).status, query).toBe(404);
});

const files = ["cells.csv", "datapackage.json"];

test("without the terms nothing is handed out, by hand or by program", async () => {
  const [cookie, token] = [await signIn(app, analyst), await aToken(app, analyst)];
  for (const file of files) {
    const byHand = await app.ask(`/dataset/editions/${editionId}/${file}`, { cookie });
    expect([byHand.status, byHand.headers.location]).toEqual([302, "/dataset"]);
    expect((await app.ask(`/api/v1/editions/${editionId}/${file}`, { token })).status).toBe(403);
  }
  expect((await app.ask("/api/v1/editions", { token })).status).toBe(403);
});

test("a program gets the same bytes as a person, and the description tells their checksum", async () => {
  await acceptsTerms(app, analyst);
  const [cookie, token] = [await signIn(app, analyst), await aToken(app, analyst)];
  for (const file of files) {
    const byHand = await app.ask(`/dataset/editions/${editionId}/${file}`, { cookie });
    const byProgram = await app.ask(`/api/v1/editions/${editionId}/${file}`, { token });
    expect([byHand.status, byProgram.status]).toEqual([200, 200]);
    expect(byProgram.bytes.equals(byHand.bytes)).toBe(true);
    expect(byProgram.headers["content-disposition"]).toBe(`attachment; filename="commonweigh-2024-1-${file}"`);
  }
  const list = JSON.parse((await app.ask("/api/v1/editions", { token })).body) as {
    editions: { id: number; files: string[] }[];
  };
  expect(list.editions.map(({ id }) => id)).toEqual([editionId]);
  expect(list.editions[0]?.files[0]).toBe(`${app.origin}/api/v1/editions/${editionId}/cells.csv`);

  const csv = await app.ask(`/api/v1/editions/${editionId}/cells.csv`, { token });
  const description = JSON.parse((await app.ask(`/api/v1/editions/${editionId}/datapackage.json`, { token })).body) as {
    resources: { hash: string; bytes: number }[];
  };
  expect(description.resources).toHaveLength(1);
  expect(description.resources[0]).toMatchObject({ hash: `sha256:${digest(csv.bytes)}`, bytes: csv.bytes.length });
});

test("in the file a hidden figure is empty and says why in one word", async () => {
  const token = await aToken(app, analyst);
  const { body } = await app.ask(`/api/v1/editions/${editionId}/cells.csv`, { token });
  const lines = body
    .trim()
    .split("\r\n")
    .slice(1)
    .map((line) => line.split(","));
  const hidden = lines.filter((line) => line.at(-1) !== "");
  expect(hidden.length).toBeGreaterThan(0);
  for (const line of hidden)
    expect(line.slice(-5)).toEqual(["", "", "", "", expect.stringMatching(/^(few|similar|close)$/)]);
  const shown = lines.filter((line) => line.at(-1) === "");
  expect(shown.length).toBeGreaterThan(0);
  for (const line of shown) expect(Number(line.at(-3)) % 10).toBe(0);
});

test("the row file is not there for a network this small, and no other file ever", async () => {
  const [cookie, token] = [await signIn(app, analyst), await aToken(app, analyst)];
  for (const file of ["rows.csv", "members.csv", "..%2fcells.csv", "cells.CSV", "constructor", "%00"]) {
    expect((await app.ask(`/dataset/editions/${editionId}/${file}`, { cookie })).status, file).toBe(404);
    expect((await app.ask(`/api/v1/editions/${editionId}/${file}`, { token })).status, file).toBe(404);
  }
});

test("another site cannot have a person's browser fetch a file", async () => {
  const cookie = await signIn(app, analyst);
  const answer = await app.ask(`/dataset/editions/${editionId}/cells.csv`, {
    cookie,
    headers: { "sec-fetch-site": "cross-site" },
  });
  expect(answer.status).toBe(403);
});

test("a token is good in its header alone, as it was given, until it is revoked or over", async () => {
  const token = await aToken(app, analyst);
  const bearer = (authorization: string) => app.ask("/api/v1/editions", { headers: { authorization } });
  expect((await bearer(`Bearer ${token}`)).status).toBe(200);
  expect((await app.ask(`/api/v1/editions?token=${token}&access_token=${token}`)).status).toBe(401);
  expect((await app.ask("/api/v1/editions", { cookie: `token=${token}` })).status).toBe(401);
  for (const wrong of [
    `Basic ${token}`,
    `Bearer  ${token}`,
    `Bearer ${token}x`,
    `Bearer ${token.slice(0, -1)}`,
    `Bearer ${token.toUpperCase()}`,
    "Bearer",
    `Bearer ${"x".repeat(5000)}`,
  ]) {
    const answer = await bearer(wrong);
    expect(answer.status, wrong.slice(0, 60)).toBe(401);
    expect(JSON.parse(answer.body)).toMatchObject({ code: "unauthenticated" });
  }
  await app.db.query("UPDATE api_token SET expires_at = ? WHERE lookup_id = ?", [
    minutesFromNow(-1),
    token.slice(4, 12),
  ]);
  expect((await bearer(`Bearer ${token}`)).status).toBe(401);
});

test("a token made on the page is shown once, stored as its hash, and dead once it is revoked there", async () => {
  const cookie = await signIn(app, analyst);
  const clientRef = "0b6f2f0e-6b4e-4f0e-9d2a-3c1f5a7b9d11";
  const make = () => app.ask("/dataset/tokens", { cookie, form: { clientRef, name: "yearly report" } });
  const [first, again] = [await make(), await make()];
  const token = /cwt_[0-9a-f]{8}_[\w-]{43}/.exec(first.body)?.[0] ?? "";
  expect(token).not.toBe("");
  expect(again.body).not.toMatch(/cwt_[0-9a-f]{8}_[\w-]{43}/);
  const [stored] = await rows<{ id: number; secret_sha256: string }>(
    app,
    "SELECT id, secret_sha256 FROM api_token WHERE client_ref = ?",
    [clientRef],
  );
  expect(stored?.secret_sha256).toBe(digest(token.slice(13)));
  expect((await app.ask("/dataset/tokens", { cookie })).body).not.toContain(token.slice(13));
  expect((await app.ask("/api/v1/editions", { token })).status).toBe(200);
  await app.ask("/dataset/tokens", { cookie, form: { intent: "revoke", tokenId: String(stored?.id) } });
  expect((await app.ask("/api/v1/editions", { token })).status).toBe(401);
});

test("accepting the terms many times at once is accepting once", async () => {
  const person = await aPerson(app, { role: "analyst" });
  const cookie = await signIn(app, person);
  const answers = await Promise.all([1, 2, 3, 4, 5].map(() => app.ask("/dataset", { cookie, form: {} })));
  expect(answers.map(({ status }) => status)).toEqual(Array(5).fill(302));
  expect(await countOf(app, `terms_acceptance WHERE user_id = ${person.id}`)).toBe(1);
});
