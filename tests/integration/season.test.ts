import { randomUUID } from "node:crypto";
import { afterAll, beforeAll, expect, test } from "vitest";
import { startApp, type TestApp } from "#tests/support/app.ts";
import {
  aMaterial,
  aPerson,
  aSeason,
  aSeasonFigure,
  aTown,
  aTruck,
  countOf,
  type Person,
  rows,
  signIn,
  type Town,
} from "#tests/support/factories.ts";

let app: TestApp;

beforeAll(async () => {
  app = await startApp();
  await aSeason(app, 2024);
});

afterAll(async () => expect(await app.close()).toEqual([]));

type Place = {
  town: Town;
  director: Person;
  recorder: Person;
  cookie: string;
  directorCookie: string;
  saltId: number;
  truckId: number;
};

async function aPlace(): Promise<Place> {
  const town = await aTown(app);
  const [director, recorder] = [
    await aPerson(app, { role: "director", town }),
    await aPerson(app, { role: "recorder", town }),
  ];
  return {
    town,
    director,
    recorder,
    cookie: await signIn(app, recorder),
    directorCookie: await signIn(app, director),
    saltId: await aMaterial(app, town),
    truckId: await aTruck(app, town, { unitNumber: "12" }),
  };
}

type Line = { ref: string; id?: number; version?: number; cells: Record<string, string> };

async function saveLines(place: Place, lines: readonly Line[], year = 2024) {
  const answer = await app.ask(`/season/${year}/storms/save`, {
    method: "POST",
    cookie: place.cookie,
    headers: { origin: app.origin, "content-type": "application/json" },
    body: JSON.stringify({ lines: lines.map(({ id = null, version = null, ...line }) => ({ id, version, ...line })) }),
  });
  return {
    status: answer.status,
    body: (answer.status === 200 ? JSON.parse(answer.body) : {}) as {
      refusal?: string | null;
      replies?: { ref: string; state: string; id?: number; version?: number; errors?: Record<string, string> }[];
    },
  };
}

const storm = (day: string, more: Record<string, string> = {}) => ({
  startedAt: `${day} 04:00`,
  endedAt: `${day} 09:00`,
  kind: "snow",
  ...more,
});

test("a line sent twice is stored once, and a changed one only over the version it was typed over", async () => {
  const place = await aPlace();
  const ref = randomUUID();
  const cells = storm("2025-01-04", { [`material-${place.saltId}`]: "4.5", truck: "Truck 12" });
  const first = await saveLines(place, [{ ref, cells }]);
  const [saved] = first.body.replies ?? [];
  expect(saved).toMatchObject({ ref, state: "saved", version: 1 });
  expect((await saveLines(place, [{ ref, cells }])).body.replies).toEqual(first.body.replies);
  expect(await countOf(app, `storm WHERE town_id = ${place.town.id}`)).toBe(1);

  const change = (version: number, kind: string) =>
    saveLines(place, [{ ref, id: saved?.id ?? 0, version, cells: { ...cells, kind } }]);
  expect((await change(1, "sleet")).body.replies).toMatchObject([{ state: "saved", version: 2 }]);
  expect((await change(1, "frost")).body.replies).toMatchObject([{ state: "changed-meanwhile" }]);
  expect(await rows(app, `SELECT kind, version, truck_id FROM storm WHERE id = ${saved?.id}`)).toEqual([
    { kind: "sleet", version: 2, truck_id: place.truckId },
  ]);
  expect(await rows(app, `SELECT used_lb FROM storm_material WHERE storm_id = ${saved?.id}`)).toEqual([
    { used_lb: 9000 },
  ]);
  expect(await countOf(app, `audit_entry WHERE entity = 'storm' AND entity_id = ${saved?.id}`)).toBe(2);
});

test("good lines are stored and wrong ones come back by cell, in one answer", async () => {
  const place = await aPlace();
  const { body } = await saveLines(place, [
    { ref: "good", cells: storm("2025-01-04") },
    { ref: "wrong", cells: storm("2025-01-05", { kind: "hail", [`material-${place.saltId}`]: "4,5" }) },
  ]);
  expect(body.replies?.map(({ ref, state, errors }) => [ref, state, Object.keys(errors ?? {}).sort()])).toEqual([
    ["good", "saved", []],
    ["wrong", "wrong", ["kind", `material-${place.saltId}`]],
  ]);
  expect(await countOf(app, `storm WHERE town_id = ${place.town.id}`)).toBe(1);
});

test("another town's storm can be neither read, changed nor removed", async () => {
  const [ours, theirs] = [await aPlace(), await aPlace()];
  const { body } = await saveLines(theirs, [{ ref: randomUUID(), cells: storm("2025-01-04") }]);
  const id = body.replies?.[0]?.id ?? 0;
  const foreign = await saveLines(ours, [
    { ref: randomUUID(), id, version: 1, cells: storm("2025-01-04", { kind: "frost" }) },
  ]);
  expect(foreign.body.replies).toMatchObject([{ state: "changed-meanwhile" }]);
  expect((await app.ask(`/season/2024/storms/${id}`, { cookie: ours.cookie })).status).toBe(404);
  const removal = { intent: "remove", version: "1" };
  expect((await app.ask(`/season/2024/storms/${id}`, { cookie: ours.cookie, form: removal })).status).toBe(404);
  expect(await rows(app, `SELECT kind FROM storm WHERE id = ${id}`)).toEqual([{ kind: "snow" }]);
  const sameRef = await rows<{ client_ref: string }>(app, `SELECT client_ref FROM storm WHERE id = ${id}`);
  const stolen = await saveLines(ours, [{ ref: sameRef[0]?.client_ref ?? "", cells: storm("2025-02-04") }]);
  expect(stolen.status).toBe(404);
});

test("a season that was sent in, is closed or opens later takes no storm and no stock; one sent back does", async () => {
  const place = await aPlace();
  const line = () => saveLines(place, [{ ref: randomUUID(), cells: storm("2025-01-04") }]);
  await aSeasonFigure(app, place.town, { startYear: 2024, state: "sent" });
  expect((await line()).body.refusal).toContain("has been sent in");
  expect((await app.ask("/season/2024/stock", { cookie: place.cookie, form: stockOf(place) })).status).toBe(409);
  await app.db.query("UPDATE season_figure SET state = 'returned' WHERE town_id = ?", [place.town.id]);
  expect((await line()).body.replies).toMatchObject([{ state: "saved" }]);

  const other = await aPlace();
  await aSeason(app, 2019);
  const at = (change: string) => app.db.query(`UPDATE season SET ${change} WHERE start_year = 2019`);
  const old = () => saveLines(other, [{ ref: randomUUID(), cells: storm("2020-01-04") }], 2019);
  await at("closes_on = '2020-12-31'");
  expect((await old()).body.refusal).toContain("was closed on 31 December 2020");
  await at("closes_on = NULL, opens_on = '2099-09-01'");
  expect((await old()).body.refusal).toContain("opens on 1 September 2099");
  await at("opens_on = NULL");
  expect((await old()).body.replies).toMatchObject([{ state: "saved" }]);
  expect((await saveLines(other, [{ ref: randomUUID(), cells: storm("1995-01-04") }], 1994)).status).toBe(404);
});

function stockOf(place: Place, change: Record<string, string> = {}) {
  return {
    clientRef: randomUUID(),
    materialId: String(place.saltId),
    kind: "delivery",
    day: "2024-11-20",
    typedQuantity: "25.5",
    typedUnit: "ton",
    ...change,
  };
}

test("stock keeps what was typed and its unit, once however often it is sent, and never another town's material", async () => {
  const [place, other] = [await aPlace(), await aPlace()];
  const write = (form: Record<string, string>) => app.ask("/season/2024/stock", { cookie: place.cookie, form });
  const yards = stockOf(place, {
    kind: "closing",
    day: "2025-04-30",
    typedQuantity: "5",
    typedUnit: "cubic-yard",
    lbPerCubicYard: "2160",
  });
  expect((await write(yards)).status).toBe(302);
  expect((await write(yards)).status).toBe(302);
  expect((await write(stockOf(place, { materialId: String(other.saltId) }))).status).toBe(404);
  expect((await write(stockOf(place, { typedUnit: "cubic-yard" }))).status).toBe(400);
  const stored = await rows<{ id: number }>(
    app,
    `SELECT id, quantity_lb, typed_quantity, typed_unit, lb_per_cubic_yard FROM stock_entry WHERE town_id = ${place.town.id}`,
  );
  expect(stored).toEqual([
    {
      id: expect.any(Number) as number,
      quantity_lb: 10_800,
      typed_quantity: 5,
      typed_unit: "cubic-yard",
      lb_per_cubic_yard: 2160,
    },
  ]);
  const removal = { intent: "remove", entryId: String(stored[0]?.id) };
  expect((await app.ask("/season/2024/stock", { cookie: other.cookie, form: removal })).status).toBe(404);
  expect((await write(removal)).status).toBe(302);
  expect(await countOf(app, `stock_entry WHERE town_id = ${place.town.id}`)).toBe(0);
});

const typed = {
  laneMiles: "100",
  eventCount: "20",
  saltLb: "600",
  mixLb: "0",
  mixSaltShare: "",
  sandLb: "0",
  brineGal: "",
  wettedSaltLb: "",
  materialCostCents: "42000",
};

async function version(place: Place) {
  const [figure] = await rows<{ id: number; version: number; state: string }>(
    app,
    `SELECT id, version, state FROM season_figure WHERE town_id = ${place.town.id} AND season_start_year = 2024`,
  );
  return figure ?? { id: 0, version: 0, state: "none" };
}

test("figures are saved over the version one looked at, sent by the director alone, kept as sent, and then stand", async () => {
  const place = await aPlace();
  const save = (seen: string, change = {}) =>
    app.ask("/season/2024/figures", { cookie: place.cookie, form: { ...typed, ...change, version: seen } });
  expect((await save("")).status).toBe(302);
  expect((await save("")).status).toBe(409);
  expect((await save("1", { saltLb: "610" })).status).toBe(302);
  expect((await save("1", { saltLb: "620" })).status).toBe(409);
  expect((await save("2", { saltLb: "x" })).status).toBe(400);

  const send = (cookie: string, seen: string) => app.ask("/season/2024", { cookie, form: { version: seen } });
  expect((await send(place.cookie, "2")).status).toBe(403);
  expect((await send(place.directorCookie, "1")).status).toBe(409);
  expect((await send(place.directorCookie, "2")).status).toBe(302);
  const figure = await version(place);
  expect(figure).toMatchObject({ version: 3, state: "sent" });
  const sent = await rows<{ content: { saltLb: number; materialCostCents: number } }>(
    app,
    `SELECT content FROM figure_version WHERE figure_id = ${figure.id} AND version = 3`,
  );
  expect(sent[0]?.content).toMatchObject({ saltLb: 1_220_000, materialCostCents: 4_200_000, brineGal: null });
  expect((await save("3", { saltLb: "1" })).status).toBe(409);
  expect((await send(place.directorCookie, "3")).status).toBe(409);
});

test("what was sent is out of the application's reach: no update, no delete", async () => {
  const { DB_USER, DB_PASSWORD } = app.database.env;
  const { connect } = await import("#scripts/migrate.js");
  const own = await connect({ ...app.database.migrator, user: DB_USER, password: DB_PASSWORD });
  await expect(own.query("UPDATE figure_version SET content = '{}'")).rejects.toMatchObject({ errno: 1142 });
  await expect(own.query("DELETE FROM figure_note")).rejects.toMatchObject({ errno: 1142 });
  await own.end();
});

async function aSentPlace() {
  const place = await aPlace();
  await app.ask("/season/2024/figures", { cookie: place.cookie, form: { ...typed, version: "" } });
  await app.ask("/season/2024", { cookie: place.directorCookie, form: { version: "1" } });
  return { place, figure: await version(place) };
}

async function mailsTo(person: Person) {
  return rows<{ subject: string; text: string }>(
    app,
    "SELECT subject, text FROM outbox_mail WHERE to_address = ? ORDER BY id",
    [person.email],
  );
}

test("a season goes back with notes by field, is corrected and sent again, asked about, answered and accepted; all in the trail", async () => {
  const coordinator = await signIn(app, await aPerson(app, { role: "coordinator" }));
  const { place, figure } = await aSentPlace();
  const review = (form: Record<string, string>) =>
    app.ask(`/network/review/${figure.id}`, { cookie: coordinator, form });
  const note = { verdict: "return", note: "", "note-saltLb": "600 or 60.0?", "note-stock": "No closing is measured." };
  expect((await review({ ...note, version: "1" })).status).toBe(409);
  expect((await review({ verdict: "return", note: "hm", version: "2" })).status).toBe(400);
  expect((await review({ ...note, version: "2" })).status).toBe(302);
  expect(
    await rows(app, `SELECT version, field, note FROM figure_note WHERE figure_id = ${figure.id} ORDER BY field`),
  ).toEqual([
    { version: 2, field: "saltLb", note: "600 or 60.0?" },
    { version: 2, field: "stock", note: "No closing is measured." },
  ]);
  for (const person of [place.director, place.recorder]) {
    expect((await mailsTo(person)).at(-1)?.text).toContain("Salt, tons: 600 or 60.0?");
  }
  const page = (await app.ask("/season/2024", { cookie: place.cookie })).body;
  expect(page).toContain("600 or 60.0?");
  expect(page).toContain("it has not been changed");

  const save = { ...typed, saltLb: "590", version: "3" };
  expect((await app.ask("/season/2024/figures", { cookie: place.cookie, form: save })).status).toBe(302);
  expect((await app.ask("/season/2024", { cookie: place.directorCookie, form: { version: "4" } })).status).toBe(302);
  expect((await app.ask(`/network/review/${figure.id}`, { cookie: coordinator })).body).toContain(
    "Salt, tons from 600.0 to 590.0",
  );

  expect((await review({ verdict: "ask", ask: "Is the north yard in it?", version: "5" })).status).toBe(302);
  const [question] = await rows<{ id: number }>(app, `SELECT id FROM figure_question WHERE figure_id = ${figure.id}`);
  const answer = { intent: "answer", questionId: String(question?.id), answer: "Yes, it is." };
  const other = await aPlace();
  expect((await app.ask("/season/2024", { cookie: other.directorCookie, form: answer })).status).toBe(404);
  expect((await app.ask("/season/2024", { cookie: place.directorCookie, form: answer })).status).toBe(302);
  expect((await app.ask("/season/2024", { cookie: place.directorCookie, form: answer })).status).toBe(409);
  expect((await version(place)).state).toBe("sent");

  expect((await review({ verdict: "accept", version: "5" })).status).toBe(302);
  expect((await review({ verdict: "accept", version: "5" })).status).toBe(409);
  expect(await version(place)).toMatchObject({ state: "accepted", version: 6 });
  expect((await mailsTo(place.director)).map(({ subject }) => subject)).toEqual([
    expect.stringContaining("comes back with a question"),
    expect.stringContaining("A question about"),
    expect.stringContaining("is accepted"),
  ]);
  const trail = await rows<{ action: string }>(
    app,
    `SELECT action FROM audit_entry WHERE entity = 'season_figure' AND entity_id = ${figure.id} ORDER BY id`,
  );
  expect(trail.map(({ action }) => action.replace("season-figure.", ""))).toEqual([
    "fill",
    "send",
    "return",
    "fill",
    "send",
    "ask",
    "answer",
    "accept",
  ]);
});

test("a season the checks doubt is accepted with a reason only; sound ones are accepted together, doubtful ones left", async () => {
  const coordinator = await signIn(app, await aPerson(app, { role: "coordinator" }));
  await aSeason(app, 2018);
  const [sound, doubtful] = [await aTown(app), await aTown(app)];
  const soundId = await aSeasonFigure(app, sound, { startYear: 2018, state: "sent" });
  const doubtfulId = await aSeasonFigure(app, doubtful, { startYear: 2018, state: "sent", saltLb: 6_000_000 });
  const queue = (await app.ask("/network/review?season=2018", { cookie: coordinator })).body;
  expect(queue).toContain("30.0 tons of salt on each lane mile");
  expect((await app.ask("/network/review", { cookie: coordinator, form: { season: "2018" } })).status).toBe(302);
  const states = await rows<{ id: number; state: string }>(
    app,
    `SELECT id, state FROM season_figure WHERE id IN (${soundId}, ${doubtfulId}) ORDER BY id`,
  );
  expect(states.map(({ state }) => state)).toEqual(["accepted", "sent"]);
  const accept = (reason: string) =>
    app.ask(`/network/review/${doubtfulId}`, {
      cookie: coordinator,
      form: { verdict: "accept", version: "1", reason },
    });
  expect((await accept("")).status).toBe(400);
  expect((await accept("The pile was sold on, see the invoice.")).status).toBe(302);
  expect(await countOf(app, `season_figure WHERE id = ${doubtfulId} AND review_note LIKE 'The pile was sold%'`)).toBe(
    1,
  );
});
