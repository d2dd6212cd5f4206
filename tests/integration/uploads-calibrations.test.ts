import { afterAll, beforeAll, beforeEach, expect, test } from "vitest";
import { startApp, type TestApp } from "#tests/support/app.ts";
import { aCalibration, aMaterial, aPerson, aTown, aTruck, signIn, type Town } from "#tests/support/factories.ts";
import { countOf, rows } from "#tests/support/rows.ts";
import { acceptUpload, sendFile, uploadIdOf } from "#tests/support/upload-files.ts";

/* Files of calibrations: one reading a row, checked against the town's own trucks and materials. */

let app: TestApp;
let town: Town;
let cookie: string;
let truckId: number;
let materialId: number;

const heads = "truck,material,tested_on,gate_opening_in,reading,setting,revolutions,seconds,gross_lb,tare_lb";
const reading = (start: string, counts: string[], catches: string[]) =>
  [
    heads,
    ...counts.map((count) => `${start},count,${count},,`),
    ...catches.map((caught) => `${start},catch,,${caught}`),
  ].join("\r\n");
const at = "12,Salt,2024-10-09,1 7/8";
const counts = ["1,11.25,60", "2,19.5,60", "3,27,60"];
const catches = ["1,,9.4,1.6", "1,,9.5,1.6", "1,,9.3,1.6"];
const good = reading(at, counts, catches);

beforeAll(async () => {
  app = await startApp();
  const other = await aTown(app);
  await aTruck(app, other, { unitNumber: "77" });
  await aMaterial(app, other, { name: "Theirs" });
});

beforeEach(async () => {
  town = await aTown(app);
  truckId = await aTruck(app, town, { unitNumber: "12" });
  materialId = await aMaterial(app, town);
  cookie = await signIn(app, await aPerson(app, { role: "recorder", town }));
});

afterAll(async () => expect(await app.close()).toEqual([]));

async function sent(content: string) {
  const answer = await sendFile(app, cookie, { content, kind: "calibrations", fileName: "yard.csv" });
  expect(answer.status, answer.body.slice(0, 200)).toBe(302);
  const uploadId = uploadIdOf(answer);
  const { body } = await app.ask(`/uploads/${uploadId}/problems`, { cookie });
  const lines = body.trim().split("\r\n").slice(1);
  return { uploadId, lines };
}

async function storedParts() {
  const of = `WHERE calibration_id IN (SELECT id FROM calibration WHERE town_id = ${town.id})`;
  return [
    await countOf(app, `calibration WHERE town_id = ${town.id}`),
    await countOf(app, `calibration_count ${of}`),
    await countOf(app, `calibration_catch ${of}`),
  ];
}

test("a good file is stored whole once it is accepted, and waits for the director", async () => {
  const { uploadId, lines } = await sent(good);
  expect(lines).toEqual([]);
  expect(await storedParts()).toEqual([0, 0, 0]);
  expect((await acceptUpload(app, cookie, uploadId)).status).toBe(302);
  expect(await storedParts()).toEqual([1, 3, 3]);
  expect(
    await rows(app, "SELECT gate_opening_in, state, upload_id FROM calibration WHERE town_id = ?", [town.id]),
  ).toEqual([{ gate_opening_in: 1.875, state: "ready", upload_id: uploadId }]);
  expect(await countOf(app, `audit_entry WHERE town_id = ${town.id} AND action = 'calibration.store'`)).toBe(1);
});

const first = `${at},count,1,11.25,60,,`;
test.each<[string, string, string, string]>([
  ["an unknown truck", first.replace("12,", "99,"), "2,truck,99,", "No truck of this town"],
  ["another town's truck", first.replace("12,", "77,"), "2,truck,77,", "No truck of this town"],
  ["another town's material", first.replace("Salt", "Theirs"), "2,material,Theirs,", "no such material"],
  ["31 February", first.replace("2024-10-09", "2024-02-31"), "2,tested_on,2024-02-31,", "year-month-day"],
  [
    "29 February of a common year",
    first.replace("2024-10-09", "2023-02-29"),
    "2,tested_on,2023-02-29,",
    "year-month-day",
  ],
  [
    "a day written the other way",
    first.replace("2024-10-09", "10/09/2024"),
    "2,tested_on,10/09/2024,",
    "year-month-day",
  ],
  ["a spreadsheet's day number", first.replace("2024-10-09", "45574"), "2,tested_on,45574,", "year-month-day"],
  ["a day to come", first.replace("2024-10-09", "2999-01-01"), "2,tested_on,2999-01-01,", "has not come"],
  ["a gate of zero", first.replace("1 7/8", "0"), "2,gate_opening_in,0,", "inches"],
  ["a gate of ten feet", first.replace("1 7/8", "120"), "2,gate_opening_in,120,", "inches"],
  ["a reading that is neither", first.replace("count", "guess"), "2,reading,guess,", "Write count or catch"],
  ["revolutions of zero", first.replace("11.25", "0"), "2,revolutions,0,", "at least"],
  ["negative revolutions", first.replace("11.25", "-4"), "2,revolutions,'-4,", "at least"],
  ["seconds of zero", first.replace("60", "0"), "2,seconds,0,", "at least"],
  ["a setting of one and a half", first.replace("count,1,", "count,1.5,"), "2,setting,1.5,", "whole number"],
  ["tare above gross", `${at},catch,,1,,1.6,9.4`, "2,tare_lb,9.4,", "empty container"],
  ["tare equal to gross", `${at},catch,,1,,9.4,9.4`, "2,tare_lb,9.4,", "empty container"],
  ["negative gross weight", `${at},catch,,1,,-9.4,0`, "2,gross_lb,'-9.4,", "below zero"],
])("%s: told by row, column and value, and nothing can be accepted", async (_what, row, start, words) => {
  const { uploadId, lines } = await sent(`${heads}\r\n${row}\r\n${good.split("\r\n").slice(1).join("\r\n")}`);
  const line = lines.find((candidate) => candidate.startsWith(start));
  expect(line, lines.join("\n")).toContain(words);
  expect((await acceptUpload(app, cookie, uploadId)).status).toBe(409);
  expect(await storedParts()).toEqual([0, 0, 0]);
});

test("the sentence about an unknown truck names the town's own trucks only", async () => {
  const { lines } = await sent(`${heads}\r\n${first.replace("12,", "77,")}`);
  expect(lines[0]).toContain("Yours are: 12.");
});

test.each<[string, string, string]>([
  ["counts without a catch", reading(at, counts, []), "a catch missing"],
  ["a catch without counts", reading(at, [], catches), "counts missing"],
  ["a count that falls", reading(at, ["1,20,60", "2,12,60"], catches), "count falls"],
  ["a setting counted twice", reading(at, ["1,11,60", "1,12,60"], catches), "counted twice"],
])("%s is refused for the calibration as a whole", async (_what, content, words) => {
  const { uploadId, lines } = await sent(content);
  expect(lines.join("\n")).toContain(words);
  expect((await acceptUpload(app, cookie, uploadId)).status).toBe(409);
  expect(await storedParts()).toEqual([0, 0, 0]);
});

test("a calibration that is stored already is refused, and one at another gate is taken", async () => {
  await aCalibration(app, { town, truckId, materialId, testedOn: "2024-10-09", gateOpeningIn: 1.875 });
  expect((await sent(good)).lines.join()).toContain("stored already");
  const other = await sent(good.replaceAll("1 7/8", "2"));
  expect(other.lines).toEqual([]);
  expect((await acceptUpload(app, cookie, other.uploadId)).status).toBe(302);
});

test("a calibration stored between checking and accepting makes the whole file wait", async () => {
  const { uploadId } = await sent(
    `${good}\r\n${reading("12,Salt,2024-10-10,2", counts, catches).split("\r\n").slice(1).join("\r\n")}`,
  );
  await aCalibration(app, { town, truckId, materialId, testedOn: "2024-10-10", gateOpeningIn: 2 });
  const before = await storedParts();
  const answer = await acceptUpload(app, cookie, uploadId);
  expect(answer.status).toBe(409);
  expect(answer.body).toContain("Upload the file again");
  expect(await storedParts()).toEqual(before);
  expect(await countOf(app, `upload WHERE id = ${uploadId} AND state = 'checked'`)).toBe(1);
  expect(await countOf(app, `audit_entry WHERE town_id = ${town.id} AND action = 'calibration.store'`)).toBe(0);
});

test("a truck that left the town between checking and accepting makes the file wait", async () => {
  const { uploadId } = await sent(good);
  const other = await aTown(app);
  await app.db.query("UPDATE truck SET town_id = ? WHERE id = ?", [other.id, truckId]);
  expect((await acceptUpload(app, cookie, uploadId)).status).toBe(409);
  expect(await storedParts()).toEqual([0, 0, 0]);
});

test("the recorder's approval is refused, the director's holds and is written down once", async () => {
  const { uploadId } = await sent(good);
  await acceptUpload(app, cookie, uploadId);
  const [calibration] = await rows<{ id: number }>(app, "SELECT id FROM calibration WHERE town_id = ?", [town.id]);
  const form = { calibrationId: String(calibration?.id) };
  expect((await app.ask("/fleet", { cookie, form })).status).toBe(403);
  const director = await signIn(app, await aPerson(app, { role: "director", town }));
  await Promise.all([1, 2, 3].map(() => app.ask("/fleet", { cookie: director, form })));
  expect(await countOf(app, `calibration WHERE town_id = ${town.id} AND state = 'approved'`)).toBe(1);
  expect(
    await countOf(app, `audit_entry WHERE action = 'calibration.approve' AND entity_id = ${calibration?.id}`),
  ).toBe(1);
});
