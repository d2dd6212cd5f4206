import { randomUUID } from "node:crypto";
import { afterAll, beforeAll, expect, test } from "vitest";
import { startApp, type TestApp } from "#tests/support/app.ts";
import { aCalibration, aMaterial, aPerson, aTown, aTruck, signIn } from "#tests/support/factories.ts";
import { inParallel } from "#tests/support/http.ts";
import { countOf, rows } from "#tests/support/rows.ts";

/* Trucks put in and changed, work entered, fleets exported and imported: over the built server, in a real database. */

let app: TestApp;

beforeAll(async () => {
  app = await startApp();
}, 120_000);

afterAll(async () => expect(await app.close()).toEqual([]));

async function aFleet() {
  const town = await aTown(app);
  const [recorder, director] = [
    await aPerson(app, { role: "recorder", town }),
    await aPerson(app, { role: "director", town }),
  ];
  const materialId = await aMaterial(app, town);
  const cookies = { recorder: await signIn(app, recorder), director: await signIn(app, director) };
  return { town, materialId, cookies };
}

const truckForm = {
  unitNumber: "21",
  body: "8-yard hopper",
  spreaderKind: "hopper-auger",
  control: "manual",
  lanesPerPass: "1",
  workingSpeedMph: "25",
  workingSetting: "3",
  workingRpm: "1,600",
  gateMaxIn: "4 1/2",
  capacityTons: "",
};

type TruckRow = { id: number; unit_number: string; gate_max_in: number | null; is_in_service: number };

async function trucksOf(townId: number) {
  return rows<TruckRow>(app, "SELECT * FROM truck WHERE town_id = ? ORDER BY id", [townId]);
}

test("a truck sent five times at once is one truck, with its materials and one audit row", async () => {
  const { town, materialId, cookies } = await aFleet();
  const form = { ...truckForm, [`material-${materialId}`]: "yes" };
  const answers = await inParallel([1, 2, 3, 4, 5], 5, () =>
    app.ask("/fleet/trucks/new", { cookie: cookies.recorder, form }),
  );
  const trucks = await trucksOf(town.id);
  expect(trucks).toHaveLength(1);
  expect(trucks[0]).toMatchObject({ unit_number: "21", gate_max_in: 4.5, is_in_service: 1 });
  for (const { status, headers } of answers) {
    expect(status).toBe(302);
    expect(headers.location).toBe(`/fleet/${trucks[0]?.id}`);
  }
  expect(await countOf(app, `truck_material WHERE truck_id = ${trucks[0]?.id}`)).toBe(1);
  expect(await countOf(app, `audit_entry WHERE action = 'truck.add' AND town_id = ${town.id}`)).toBe(1);
});

test("another truck of the same number is refused beside the field, with what was typed kept", async () => {
  const { town, cookies } = await aFleet();
  await aTruck(app, town, { unitNumber: "21" });
  const { status, body } = await app.ask("/fleet/trucks/new", { cookie: cookies.recorder, form: truckForm });
  expect(status).toBe(409);
  expect(body).toContain("Truck 21 is in the fleet already");
  expect(body).toContain('value="4 1/2"');
  expect(await trucksOf(town.id)).toHaveLength(1);
});

test.each([
  ["unitNumber", "", "Give the unit number."],
  ["workingSpeedMph", "0", "must lie between 3 and 60"],
  ["workingSpeedMph", "fast", "plain number"],
  ["workingSetting", "12345678901234567890", "plain number"],
  ["lanesPerPass", "1.5", "whole number"],
  ["gateMaxIn", "-2", "must lie between 0.25 and 24"],
  ["spreaderKind", "catapult", "Choose the spreader."],
])("%s of %j is refused with a sentence and nothing is stored", async (field, text, sentence) => {
  const { town, cookies } = await aFleet();
  const form = { ...truckForm, [field]: text };
  const { status, body } = await app.ask("/fleet/trucks/new", { cookie: cookies.recorder, form });
  expect(status).toBe(400);
  expect(body).toContain(sentence);
  expect(await trucksOf(town.id)).toHaveLength(0);
});

test("a recorder changes a truck but not whether it is in service; the director does", async () => {
  const { town, cookies } = await aFleet();
  const truckId = await aTruck(app, town, { unitNumber: "7" });
  const change = async (cookie: string, form: Record<string, string>) => {
    const { body } = await app.ask(`/fleet/${truckId}/edit`, { cookie });
    const version = /name="version" value="([0-9a-f]{16})"/.exec(body)?.[1] ?? "";
    return app.ask(`/fleet/${truckId}/edit`, { cookie, form: { ...form, version } });
  };
  expect((await change(cookies.recorder, { ...truckForm, unitNumber: "7" })).status).toBe(302);
  expect((await trucksOf(town.id))[0]).toMatchObject({ gate_max_in: 4.5, is_in_service: 1 });
  expect((await change(cookies.director, { ...truckForm, unitNumber: "7" })).status).toBe(302);
  expect((await trucksOf(town.id))[0]?.is_in_service).toBe(0);
  expect((await change(cookies.recorder, { ...truckForm, unitNumber: "7", isInService: "yes" })).status).toBe(302);
  expect((await trucksOf(town.id))[0]?.is_in_service).toBe(0);
});

test("a form that has grown old overwrites nothing, and says so", async () => {
  const { town, cookies } = await aFleet();
  const truckId = await aTruck(app, town, { unitNumber: "7" });
  const { body } = await app.ask(`/fleet/${truckId}/edit`, { cookie: cookies.director });
  const version = /name="version" value="([0-9a-f]{16})"/.exec(body)?.[1] ?? "";
  const send = (workingSetting: string) =>
    app.ask(`/fleet/${truckId}/edit`, {
      cookie: cookies.director,
      form: { ...truckForm, unitNumber: "7", isInService: "yes", workingSetting, version },
    });
  expect((await send("5")).status).toBe(302);
  const late = await send("6");
  expect(late.status).toBe(409);
  expect(late.body).toContain("Somebody changed this truck since you opened the form");
  const [truck] = await rows<{ working_setting: number }>(app, "SELECT working_setting FROM truck WHERE id = ?", [
    truckId,
  ]);
  expect(truck?.working_setting).toBe(5);
  // The same change sent twice is the same change.
  expect((await send("5")).status).toBe(302);
});

test("a material of another town is not carried", async () => {
  const [{ town, cookies }, other] = [await aFleet(), await aFleet()];
  const form = { ...truckForm, [`material-${other.materialId}`]: "yes" };
  expect((await app.ask("/fleet/trucks/new", { cookie: cookies.recorder, form })).status).toBe(302);
  const [truck] = await trucksOf(town.id);
  expect(await countOf(app, `truck_material WHERE truck_id = ${truck?.id}`)).toBe(0);
});

test("work makes a calibration due at once, and counts once however often it is sent", async () => {
  const { town, materialId, cookies } = await aFleet();
  const truckId = await aTruck(app, town, { unitNumber: "7" });
  const testedOn = new Date(Date.now() - 3 * 86_400_000).toISOString().slice(0, 10);
  await aCalibration(app, { town, truckId, materialId, testedOn });
  const stateOf = async () => {
    const { body } = await app.ask("/fleet/due", { cookie: cookies.recorder });
    return body.includes("Every truck that was ever weighed is in date.");
  };
  expect(await stateOf()).toBe(true);
  const doneOn = new Date(Date.now() - 86_400_000).toISOString().slice(0, 10);
  const form = { clientRef: randomUUID(), part: "hydraulics", doneOn, note: "new pump" };
  const send = () => app.ask(`/fleet/${truckId}/work`, { cookie: cookies.recorder, form });
  const answers = await inParallel([1, 2, 3], 3, send);
  expect(answers.map(({ status }) => status)).toEqual([302, 302, 302]);
  expect(await countOf(app, `truck_work WHERE truck_id = ${truckId}`)).toBe(1);
  expect(await countOf(app, `audit_entry WHERE action = 'truck.work' AND town_id = ${town.id}`)).toBe(1);
  expect(await stateOf()).toBe(false);
  const today = await app.ask("/today", { cookie: cookies.recorder });
  expect(today.body).toContain("Calibrate truck 7 for salt");
});

test("work on a day that has not come, or on no part, is refused with what was typed kept", async () => {
  const { town, cookies } = await aFleet();
  const truckId = await aTruck(app, town);
  const send = (form: Record<string, string>) => app.ask(`/fleet/${truckId}/work`, { cookie: cookies.recorder, form });
  const base = { clientRef: randomUUID(), part: "gate", doneOn: "2026-02-30", note: "bent & straightened" };
  for (const [form, sentence] of [
    [base, "Write the day as year-month-day"],
    [{ ...base, doneOn: "2190-01-01" }, "This day has not come yet."],
    [{ ...base, doneOn: "2025-01-01", part: "paint" }, "Choose what was worked on."],
  ] as const) {
    const { status, body } = await send(form);
    expect(status).toBe(400);
    expect(body).toContain(sentence);
    expect(body).toContain("bent &amp; straightened");
  }
  expect(await countOf(app, `truck_work WHERE truck_id = ${truckId}`)).toBe(0);
});

async function importFile(cookie: string, content: string) {
  const received = await app.ask("/uploads", { cookie, upload: { kind: "trucks", fileName: "trucks.csv", content } });
  const address = received.headers.location ?? "";
  const page = await app.ask(address, { cookie });
  return { address, page, accept: () => app.ask(address, { cookie, form: {} }) };
}

test("a fleet exported from one town is imported by another, truck for truck", async () => {
  const [from, to] = [await aFleet(), await aFleet()];
  for (const unitNumber of ["4", "=7", "12"]) {
    const truckId = await aTruck(app, from.town, { unitNumber });
    await app.db.query("INSERT INTO truck_material (truck_id, material_id) VALUES (?, ?)", [truckId, from.materialId]);
  }
  const exported = await app.ask("/fleet/export", { cookie: from.cookies.recorder });
  expect(exported.headers["content-type"]).toContain("text/csv");
  expect(exported.body).toContain("'=7");
  const { page, accept } = await importFile(to.cookies.director, exported.body);
  expect(page.body).toContain("All three rows can be read: three trucks.");
  expect((await accept()).status).toBe(302);
  const again = await app.ask("/fleet/export", { cookie: to.cookies.recorder });
  expect(again.body).toBe(exported.body);
  expect(await countOf(app, `truck WHERE town_id = ${to.town.id}`)).toBe(3);
  expect(await countOf(app, `audit_entry WHERE action = 'truck.add' AND town_id = ${to.town.id}`)).toBe(3);
});

test("a file changes the trucks that are there, keeps since when a material is new, and leaves the others alone", async () => {
  const { town, materialId, cookies } = await aFleet();
  const truckId = await aTruck(app, town, { unitNumber: "12" });
  const otherId = await aTruck(app, town, { unitNumber: "14" });
  await app.db.query("INSERT INTO truck_material VALUES (?, ?, '2024-09-01')", [truckId, materialId]);
  const { body } = await app.ask("/fleet/export", { cookie: cookies.director });
  const [head = "", row = ""] = body.split("\r\n");
  const { accept } = await importFile(cookies.director, `${head}\r\n${row.replace("tailgate-auger", "conveyor")}\r\n`);
  expect((await accept()).status).toBe(302);
  const kinds = await rows<{ id: number; kind: string }>(
    app,
    "SELECT id, spreader_kind AS kind FROM truck WHERE town_id = ? ORDER BY id",
    [town.id],
  );
  expect(kinds.map(({ id, kind }) => [id, kind])).toEqual([
    [truckId, "conveyor"],
    [otherId, "tailgate-auger"],
  ]);
  const [carried] = await rows<{ since: string }>(
    app,
    "SELECT CAST(since_on AS CHAR) AS since FROM truck_material WHERE truck_id = ?",
    [truckId],
  );
  expect(carried?.since).toBe("2024-09-01");
});

test("a recorder's file cannot take a truck out of service, and a file with one bad row stores nothing", async () => {
  const { town, cookies } = await aFleet();
  await aTruck(app, town, { unitNumber: "12" });
  const { body } = await app.ask("/fleet/export", { cookie: cookies.recorder });
  const [head = "", row = ""] = body.split("\r\n");
  const out = await importFile(cookies.recorder, `${head}\r\n${row.replace(",yes,", ",no,")}\r\n`);
  expect(out.page.body).toContain("Only the director takes a truck in or out of service.");
  const bad = await importFile(
    cookies.recorder,
    `${head}\r\n${row.replace("12,", "15,")}\r\n${row.replace(",25,", ",-25,")}\r\n`,
  );
  expect((await bad.accept()).status).toBe(409);
  expect(await countOf(app, `truck WHERE town_id = ${town.id}`)).toBe(1);
});
