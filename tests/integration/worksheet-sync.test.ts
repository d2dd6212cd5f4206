import { randomUUID } from "node:crypto";
import { afterAll, beforeAll, expect, test } from "vitest";
import { emptyWorksheet, type Worksheet } from "#app/domain/calibration/worksheet.ts";
import type { SyncRequest } from "#app/services/worksheets/sheet-schema.server.ts";
import { startApp, type TestApp } from "#tests/support/app.ts";
import { aCalibration, aMaterial, aPerson, aTown, aTruck, signIn } from "#tests/support/factories.ts";
import { inParallel } from "#tests/support/http.ts";
import { countOf, rows } from "#tests/support/rows.ts";

let app: TestApp;

beforeAll(async () => {
  app = await startApp();
});

afterAll(async () => expect(await app.close()).toEqual([]));

async function aYard() {
  const town = await aTown(app);
  const person = await aPerson(app, { role: "recorder", town });
  const [truckId, materialId, cookie] = [
    await aTruck(app, town),
    await aMaterial(app, town),
    await signIn(app, person),
  ];
  return { town, person, truckId, materialId, cookie, owner: `${person.id}:${town.id}` };
}
type Yard = Awaited<ReturnType<typeof aYard>>;

function aSheet({ truckId, materialId }: Yard, change: Partial<Worksheet> = {}): Worksheet {
  return {
    ...emptyWorksheet({ clientRef: randomUUID(), truckId, materialId, testedOn: "2026-10-09" }),
    cautions: { counting: true, catching: true },
    gate: { scaleMark: "4", openingText: "1 7/8" },
    counts: ["6.25", "11", "15.5"].map((revolutions, place) => ({
      id: `c${place}`,
      setting: String(place + 1),
      revolutions,
      seconds: "60",
      rpm: place === 0 ? "" : "1600",
    })),
    catches: ["27", "26.2", "26.6"].map((grossLb, place) => ({
      id: `k${place}`,
      revolutions: "2",
      grossLb,
      tareLb: "2.2",
    })),
    ...change,
  };
}

function aMessage(yard: Yard, sheet: Worksheet, change: Partial<SyncRequest> = {}): SyncRequest {
  return {
    opId: randomUUID(),
    owner: yard.owner,
    clientRef: sheet.clientRef,
    baseVersion: 0,
    sheet,
    device: "Android",
    isFinish: false,
    settles: [],
    ...change,
  };
}

async function send(yard: Pick<Yard, "cookie">, message: unknown) {
  const answer = await app.ask("/fleet/worksheets/sync", {
    method: "POST",
    cookie: yard.cookie,
    body: JSON.stringify(message),
    headers: { "content-type": "application/json", origin: app.origin },
  });
  return { status: answer.status, body: JSON.parse(answer.body) as Record<string, unknown> };
}

test("a message sent twenty times at once is one worksheet, one calibration and one answer", async () => {
  const yard = await aYard();
  const message = aMessage(yard, aSheet(yard), { isFinish: true });
  const answers = await inParallel(
    Array.from({ length: 20 }, () => message),
    20,
    (one) => send(yard, one),
  );
  const [first] = answers;
  expect(first).toMatchObject({ status: 200, body: { outcome: "finished", version: 1 } });
  for (const answer of answers) expect(answer).toEqual(first);
  expect(await countOf(app, `worksheet WHERE town_id = ${yard.town.id}`)).toBe(1);
  expect(await countOf(app, `calibration WHERE town_id = ${yard.town.id}`)).toBe(1);
  expect(await countOf(app, `audit_entry WHERE town_id = ${yard.town.id} AND action = 'worksheet.finish'`)).toBe(1);
});

test("the calibration holds exactly the figures that were typed, ready for approval", async () => {
  const yard = await aYard();
  const sheet = aSheet(yard, {
    note: "damp",
    verification: [
      { id: "v", speedMph: "25", commandedLbPerLaneMile: "300", seconds: "30", grossLb: "64.5", tareLb: "" },
    ],
    liquids: [
      { id: "p", kind: "prewet", gallons: "1.5", seconds: "45", speedMph: "", lanes: "", dryLbPerMin: "200" },
      { id: "d", kind: "direct", gallons: "20", seconds: "60", speedMph: "30", lanes: "1", dryLbPerMin: "" },
    ],
  });
  const { body } = await send(yard, aMessage(yard, sheet, { isFinish: true }));
  const id = Number(body.calibrationId);
  expect(
    await rows(
      app,
      "SELECT client_ref, gate_opening_in, gate_scale_mark, method, note, state, same_day_number FROM calibration WHERE id = ?",
      [id],
    ),
  ).toEqual([
    {
      client_ref: sheet.clientRef,
      gate_opening_in: 1.875,
      gate_scale_mark: "4",
      method: "counts",
      note: "damp",
      state: "ready",
      same_day_number: 1,
    },
  ]);
  const of = (table: string, columns: string) =>
    rows(app, `SELECT ${columns} FROM ${table} WHERE calibration_id = ? ORDER BY id`, [id]);
  expect(await of("calibration_count", "setting, revolutions, seconds, rpm")).toEqual([
    { setting: 1, revolutions: 6.25, seconds: 60, rpm: null },
    { setting: 2, revolutions: 11, seconds: 60, rpm: 1600 },
    { setting: 3, revolutions: 15.5, seconds: 60, rpm: 1600 },
  ]);
  expect(await of("calibration_catch", "revolutions, gross_lb, tare_lb")).toEqual([
    { revolutions: 2, gross_lb: 27, tare_lb: 2.2 },
    { revolutions: 2, gross_lb: 26.2, tare_lb: 2.2 },
    { revolutions: 2, gross_lb: 26.6, tare_lb: 2.2 },
  ]);
  expect(
    await of("calibration_verification", "speed_mph, commanded_lb_per_lane_mile, seconds, gross_lb, tare_lb"),
  ).toEqual([{ speed_mph: 25, commanded_lb_per_lane_mile: 300, seconds: 30, gross_lb: 64.5, tare_lb: 0 }]);
  expect(await of("calibration_liquid", "kind, gallons, seconds, speed_mph, lanes, dry_lb_per_min")).toEqual([
    { kind: "prewet", gallons: 1.5, seconds: 45, speed_mph: null, lanes: null, dry_lb_per_min: 200 },
    { kind: "direct", gallons: 20, seconds: 60, speed_mph: 30, lanes: 1, dry_lb_per_min: null },
  ]);
});

test("liquid alone is finished without a gate, and its calibration shows what it lays", async () => {
  const yard = await aYard();
  await app.db.query("UPDATE truck SET spreader_kind = 'liquid-tanks' WHERE id = ?", [yard.truckId]);
  const aTankSheet = () =>
    aSheet(yard, {
      gate: { scaleMark: "", openingText: "" },
      counts: [],
      catches: [],
      liquids: [{ id: "d", kind: "direct", gallons: "20", seconds: "60", speedMph: "30", lanes: "1", dryLbPerMin: "" }],
    });
  const answers = await inParallel([aTankSheet(), aTankSheet()], 2, (sheet) =>
    send(yard, aMessage(yard, sheet, { isFinish: true })),
  );
  for (const answer of answers) expect(answer).toMatchObject({ status: 200, body: { outcome: "finished" } });
  expect(
    await rows(
      app,
      "SELECT gate_opening_in, same_day_number FROM calibration WHERE truck_id = ? ORDER BY same_day_number",
      [yard.truckId],
    ),
  ).toEqual([
    { gate_opening_in: null, same_day_number: 1 },
    { gate_opening_in: null, same_day_number: 2 },
  ]);
  const id = Number(answers[0]?.body.calibrationId);
  await app.db.query("UPDATE calibration SET state = 'approved', approved_at = created_at WHERE id = ?", [id]);
  // 20 gal a minute at 30 mph, a mile in two minutes: 40 gal on each lane mile.
  const page = await app.ask(`/fleet/calibrations/${id}`, { cookie: yard.cookie });
  expect(page.status).toBe(200);
  expect(page.body).toContain("40.0 gal per lane mile at 30 mph, one lane in a pass");
  expect(page.body).toContain("no gate");
  for (const path of ["/fleet", `/fleet/${yard.truckId}`]) {
    const list = await app.ask(path, { cookie: yard.cookie });
    expect(list.status).toBe(200);
    expect(list.body).toContain("40.0 gal per lane mile");
  }
  const card = await app.ask(`/fleet/calibrations/${id}/card`, { cookie: yard.cookie });
  expect(card.status).toBe(200);
  expect(card.body).toContain("There is no cab card of this calibration.");
  expect((await app.ask("/fleet/cards", { cookie: yard.cookie })).status).toBe(200);
  const kit = await app.ask("/fleet/worksheets/kit", { cookie: yard.cookie });
  expect(JSON.parse(kit.body)).toMatchObject({ kit: { calibrations: [] } });
});

test("timed catches are stored in place of counts", async () => {
  const yard = await aYard();
  const timedCatches = [{ id: "t", setting: "3", seconds: "30", grossLb: "37", tareLb: "2" }];
  const { body } = await send(
    yard,
    aMessage(yard, aSheet(yard, { method: "timed-catch", timedCatches }), { isFinish: true }),
  );
  expect(body.outcome).toBe("finished");
  expect(
    await rows(
      app,
      "SELECT setting, seconds, gross_lb, tare_lb FROM calibration_timed_catch WHERE calibration_id = ?",
      [Number(body.calibrationId)],
    ),
  ).toEqual([{ setting: 3, seconds: 30, gross_lb: 37, tare_lb: 2 }]);
  expect(await countOf(app, `calibration_count WHERE calibration_id = ${Number(body.calibrationId)}`)).toBe(0);
});

test("a second phone that has not seen the first one's version gets both, and its own is kept until it is settled", async () => {
  const yard = await aYard();
  const mine = aSheet(yard);
  const theirs = { ...mine, gate: { scaleMark: "4", openingText: "2" } };
  await send(yard, aMessage(yard, theirs));
  const met = await send(yard, aMessage(yard, mine));
  expect(met).toMatchObject({ status: 409, body: { outcome: "conflict", theirs, version: 1, calibrationId: null } });
  const kept = "worksheet_version v JOIN worksheet w ON w.id = v.worksheet_id";
  const open = `${kept} WHERE w.town_id = ${yard.town.id} AND v.settled_at IS NULL`;
  expect(await countOf(app, open)).toBe(1);
  const settled = { ...mine, note: "both looked at" };
  const settles = [Number(met.body.keptVersionId)];
  expect(await send(yard, aMessage(yard, settled, { baseVersion: 1, settles }))).toMatchObject({
    status: 200,
    body: { outcome: "saved", version: 2 },
  });
  expect(await countOf(app, open)).toBe(0);
  expect(await countOf(app, `${kept} WHERE w.town_id = ${yard.town.id}`)).toBe(1);
});

test("two phones that say the same have nothing to settle", async () => {
  const yard = await aYard();
  const sheet = aSheet(yard);
  await send(yard, aMessage(yard, sheet));
  expect(await send(yard, aMessage(yard, sheet))).toMatchObject({
    status: 200,
    body: { outcome: "saved", version: 1 },
  });
});

test("finishing again answers with the same calibration; another version of it changes nothing and is kept", async () => {
  const yard = await aYard();
  const sheet = aSheet(yard);
  const first = await send(yard, aMessage(yard, sheet, { isFinish: true }));
  const again = await send(yard, aMessage(yard, sheet, { isFinish: true, baseVersion: 1 }));
  expect(again.body).toEqual(first.body);
  const late = await send(yard, aMessage(yard, { ...sheet, note: "late" }, { isFinish: true, baseVersion: 1 }));
  expect(late).toMatchObject({ status: 409, body: { outcome: "conflict", calibrationId: first.body.calibrationId } });
  expect(await countOf(app, `calibration WHERE town_id = ${yard.town.id}`)).toBe(1);
});

test("a message id that was used for something else is refused", async () => {
  const yard = await aYard();
  const message = aMessage(yard, aSheet(yard));
  await send(yard, message);
  const other = { ...message, sheet: { ...message.sheet, note: "something else" } };
  expect(await send(yard, other)).toMatchObject({ status: 422, body: { outcome: "refused" } });
});

test("a sheet with errors is saved as typed and is not made a calibration", async () => {
  const yard = await aYard();
  const wrong = aSheet(yard, {
    catches: [{ id: "k", revolutions: "0", grossLb: "12 lbs", tareLb: "99999999999999999999" }],
  });
  const answer = await send(yard, aMessage(yard, wrong, { isFinish: true }));
  expect(answer).toMatchObject({ status: 422, body: { outcome: "not-finished", version: 1 } });
  const problems = answer.body.problems as { field: string; message: string }[];
  expect(problems.map(({ field }) => field)).toEqual(
    expect.arrayContaining(["catches.k.revolutions", "catches.k.grossLb", "catches.k.tareLb"]),
  );
  expect(await countOf(app, `calibration WHERE town_id = ${yard.town.id}`)).toBe(0);
  const [stored] = await rows<{ content: unknown }>(app, "SELECT content FROM worksheet WHERE client_ref = ?", [
    wrong.clientRef,
  ]);
  const content: unknown = typeof stored?.content === "string" ? JSON.parse(stored.content) : stored?.content;
  expect(content).toEqual(wrong);
});

test("a test day that has not come yet makes no calibration", async () => {
  const yard = await aYard();
  const answer = await send(yard, aMessage(yard, aSheet(yard, { testedOn: "2099-01-01" }), { isFinish: true }));
  expect(answer).toMatchObject({ status: 422, body: { problems: [{ field: "testedOn" }] } });
});

test("the same truck and gate weighed twice on a day are two calibrations", async () => {
  const yard = await aYard();
  const finish = (sheet: Worksheet) => send(yard, aMessage(yard, sheet, { isFinish: true }));
  await inParallel([aSheet(yard), aSheet(yard), aSheet(yard)], 3, finish);
  const numbers = await rows<{ n: number }>(
    app,
    "SELECT same_day_number AS n FROM calibration WHERE truck_id = ? ORDER BY n",
    [yard.truckId],
  );
  expect(numbers.map(({ n }) => n)).toEqual([1, 2, 3]);
});

test("trucks, materials and calibrations of another town are not there, and nothing is stored", async () => {
  const [yard, other] = [await aYard(), await aYard()];
  const calibrationId = await aCalibration(app, {
    town: other.town,
    truckId: other.truckId,
    materialId: other.materialId,
  });
  for (const change of [
    { truckId: other.truckId },
    { materialId: other.materialId },
    { countsFromCalibrationId: calibrationId },
  ]) {
    expect((await send(yard, aMessage(yard, aSheet(yard, change)))).status).toBe(404);
  }
  expect(await countOf(app, `worksheet WHERE town_id = ${yard.town.id}`)).toBe(0);
  expect(await countOf(app, `worksheet_op WHERE town_id = ${yard.town.id}`)).toBe(0);
});

test("a worksheet of another town is neither read nor changed by its number", async () => {
  const [yard, other] = [await aYard(), await aYard()];
  const sheet = aSheet(yard, { note: "ours alone" });
  await send(yard, aMessage(yard, sheet));
  const theirs = await app.ask(`/fleet/worksheets/kit?worksheet=${sheet.clientRef}`, { cookie: other.cookie });
  expect(theirs.body).not.toContain("ours alone");
  expect((JSON.parse(theirs.body) as { copy: unknown }).copy).toBeNull();
  const ours = await app.ask(`/fleet/worksheets/kit?worksheet=${sheet.clientRef}`, { cookie: yard.cookie });
  expect(JSON.parse(ours.body)).toMatchObject({ copy: { version: 1, sheet: { note: "ours alone" } } });
});

test("a draft of one person does not travel under another's name", async () => {
  const yard = await aYard();
  const colleague = await aPerson(app, { role: "director", town: yard.town });
  const answer = await send({ cookie: await signIn(app, colleague) }, aMessage(yard, aSheet(yard)));
  expect(answer.status).toBe(403);
  expect(await countOf(app, `worksheet WHERE town_id = ${yard.town.id}`)).toBe(0);
});

test.each([
  ["nothing", null],
  [
    "a sheet with a reading twice",
    (yard: Yard) => {
      const sheet = aSheet(yard);
      return aMessage(yard, { ...sheet, catches: [...sheet.catches, ...sheet.catches] });
    },
  ],
  [
    "a sheet of another number than the message",
    (yard: Yard) => aMessage(yard, aSheet(yard), { clientRef: randomUUID() }),
  ],
  ["a field that is no part of it", (yard: Yard) => ({ ...aMessage(yard, aSheet(yard)), isApproved: true })],
  ["a day that is none", (yard: Yard) => aMessage(yard, aSheet(yard, { testedOn: "2026-02-30" }))],
])("%s is refused whole", async (_what, make) => {
  const yard = await aYard();
  expect((await send(yard, typeof make === "function" ? make(yard) : make)).status).toBe(400);
  expect(await countOf(app, `worksheet WHERE town_id = ${yard.town.id}`)).toBe(0);
});

test("the page that phones keep holds nobody's data, whoever asks for it", async () => {
  const yard = await aYard();
  const signedOut = await app.ask("/fleet/worksheets/shell");
  expect(signedOut.status).toBe(200);
  expect(signedOut.body).not.toContain(yard.town.name);
  expect((await app.ask("/fleet/worksheets/kit")).status).toBe(302);
});
