import { afterAll, beforeAll, expect, test } from "vitest";
import { startApp, type TestApp } from "#tests/support/app.ts";
import { aCalibration, aMaterial, aPerson, aTown, aTruck, signIn } from "#tests/support/factories.ts";
import { inParallel } from "#tests/support/http.ts";
import { countOf, insert, rows } from "#tests/support/rows.ts";

/* A calibration's page, its approval, the bands it is read against, and the cards that follow. */

let app: TestApp;
let coordinator: string;

beforeAll(async () => {
  app = await startApp();
  coordinator = await signIn(app, await aPerson(app, { role: "coordinator" }));
}, 120_000);

afterAll(async () => expect(await app.close()).toEqual([]));

const day = (daysAgo: number) => new Date(Date.now() - daysAgo * 86_400_000).toISOString().slice(0, 10);

/** Eight turns a minute at each step and 5 lb a turn: setting 3 at 25 mph lays 24 × 5 × 2.4 = 288 lb per lane mile. */
async function aYard(given: { lbPerRev?: number; gateOpeningIn?: number; state?: string } = {}) {
  const town = await aTown(app);
  const recorder = await aPerson(app, { role: "recorder", town });
  const director = await aPerson(app, { role: "director", town });
  const [truckId, materialId] = [await aTruck(app, town, { unitNumber: "12" }), await aMaterial(app, town)];
  const calibrationId = await aCalibration(app, { town, truckId, materialId, testedOn: day(9), ...given });
  const cookies = { recorder: await signIn(app, recorder), director: await signIn(app, director) };
  return { town, truckId, materialId, calibrationId, cookies };
}

/** The words of a page, as they are read one after the other. */
function wordsOf(body: string) {
  return body
    .replace(/<(style|script)[^>]*>.*?<\/\1>/gs, " ")
    .replace(/<!-- -->/g, "")
    .replace(/<[^>]+>/g, " ")
    .replace(/&#x27;/g, "'")
    .replace(/\s+/g, " ")
    .replace(/ ([.,:])/g, "$1");
}

async function page(path: string, cookie: string) {
  const { status, body } = await app.ask(path, { cookie });
  expect(status).toBe(200);
  return wordsOf(body);
}

test("the page says what the rates mean, per lane mile and per mile, in US and SI units", async () => {
  const { calibrationId, cookies } = await aYard();
  const path = `/fleet/calibrations/${calibrationId}`;
  const us = await page(path, cookies.recorder);
  expect(us).toContain("At 25 mph setting 3 lands in the band: from 24 to 28 mph.");
  expect(us).toContain("Leave the gate at 2 in.");
  // 288 lb per lane mile × 0.45359237 / 1.609344 = 81.17 kg per lane km.
  const si = await page(`${path}?units=si&step=10`, cookies.recorder);
  expect(si).toContain("At 40.2 km/h setting 3 lands in the band");
  expect(si).toContain("in the band: 81");
  expect(si).toContain("Rates, kg per lane km");
  const { body } = await app.ask(path, { cookie: cookies.recorder });
  expect(body).toMatch(/<svg[^>]*class="strip"/);
});

test("the director approves once; the recorder not at all; a second click says so", async () => {
  const { town, calibrationId, cookies } = await aYard({ state: "ready" });
  const path = `/fleet/calibrations/${calibrationId}`;
  expect((await app.ask(path, { cookie: cookies.recorder, form: {} })).status).toBe(403);
  const answers = await inParallel([1, 2, 3, 4, 5], 5, () => app.ask(path, { cookie: cookies.director, form: {} }));
  expect(answers.map(({ status }) => status).sort()).toEqual([302, 409, 409, 409, 409]);
  expect(answers.find(({ status }) => status === 409)?.body).toContain("approved already; it counts once");
  const [stored] = await rows<{ state: string; by: number | null }>(
    app,
    "SELECT state, approved_by_id AS `by` FROM calibration WHERE id = ?",
    [calibrationId],
  );
  expect(stored?.state).toBe("approved");
  expect(stored?.by).not.toBeNull();
  expect(await countOf(app, `audit_entry WHERE action = 'calibration.approve' AND town_id = ${town.id}`)).toBe(1);
  expect(await page(path, cookies.recorder)).toContain("it is in force for this truck and material");
});

test("an earlier calibration becomes history, with its drift in percent", async () => {
  const yard = await aYard({ lbPerRev: 5 });
  const later = await aCalibration(app, { ...yard, testedOn: day(2), lbPerRev: 5.5, state: "ready" });
  const approved = await app.ask(`/fleet/calibrations/${later}`, { cookie: yard.cookies.director, form: {} });
  expect(approved.status).toBe(302);
  const now = await page(`/fleet/calibrations/${later}`, yard.cookies.recorder);
  // From 288 to 316.8 lb per lane mile: a tenth more. Equal catches leave the count's own ± alone, which is less.
  expect(now).toContain(
    "Against the calibration before, it lays +10.0 %. That is more than the two measurements can be wrong",
  );
  const before = await page(`/fleet/calibrations/${yard.calibrationId}`, yard.cookies.recorder);
  expect(before).toContain("It is history: the one in force was weighed");
});

test("from one opening the gate is advised in proportion, from two of the same season by a line", async () => {
  const yard = await aYard({ lbPerRev: 8, gateOpeningIn: 3 });
  const path = `/fleet/calibrations/${yard.calibrationId}`;
  // 24 turns at 25 mph: the band's middle of 275 takes 275 / 57.6 = 4.774 lb a turn; 3 in × 4.774 / 8 = 1.79 in.
  const one = await page(path, yard.cookies.director);
  expect(one).toContain("Close the gate to about 1 13/16 in");
  expect(one).toContain("in proportion from one opening");
  await aCalibration(app, { ...yard, testedOn: day(8), lbPerRev: 5, gateOpeningIn: 2 });
  // 3 lb an inch: 2 in − (5 − 4.774) / 3 = 1.92 in, just under the narrower of the two.
  const two = await page(path, yard.cookies.director);
  expect(two).toContain("Close the gate to about 1 15/16 in");
  expect(two).toContain("from 2 to 3 in. This one lies outside them, so it is a guess");
});

test("a gate that was changed shows before and after, with the salt and the money saved", async () => {
  const yard = await aYard({ lbPerRev: 8, gateOpeningIn: 3 });
  await app.db.query("UPDATE material SET price_cents_per_ton = 7000 WHERE id = ?", [yard.materialId]);
  const after = await aCalibration(app, { ...yard, testedOn: day(7), lbPerRev: 5, gateOpeningIn: 2 });
  await app.db.query("UPDATE calibration SET counts_from_calibration_id = ? WHERE id = ?", [yard.calibrationId, after]);
  const words = await page(`/fleet/calibrations/${after}`, yard.cookies.director);
  // 24 × 2.4 × (8 − 5) = 172.8 lb of the 460.8, at $70 a ton $6.05.
  expect(words).toContain("What the new gate changed");
  expect(words).toContain("173 (38 %)");
  expect(words).toContain("$6.05");
});

test("a controller outside the tolerance is told, and the tolerance is the network's", async () => {
  const yard = await aYard();
  // 100 lb in a minute at 20 mph on one lane is 300 lb per lane mile, told 280: 7.1 % over.
  await insert(app, "calibration_verification", {
    calibration_id: yard.calibrationId,
    position: 1,
    speed_mph: 20,
    commanded_lb_per_lane_mile: 280,
    seconds: 60,
    gross_lb: 140,
    tare_lb: 40,
  });
  await insert(app, "calibration_liquid", {
    calibration_id: yard.calibrationId,
    position: 1,
    kind: "prewet",
    gallons: 1,
    seconds: 60,
    dry_lb_per_min: 200,
  });
  const path = `/fleet/calibrations/${yard.calibrationId}`;
  const strict = await page(path, yard.cookies.recorder);
  expect(strict).toContain("The controller does not lay what it is told to. The network’s tolerance is 5.0 %.");
  expect(strict).toContain("10.0 gal per ton");
  const set = await app.ask("/network/bands", { cookie: coordinator, form: { tolerance: "10" } });
  expect(set.status).toBe(302);
  const loose = await page(path, yard.cookies.recorder);
  expect(loose).toContain("The controller lays what it is told to. The network’s tolerance is 10.0 %.");
  await app.ask("/network/bands", { cookie: coordinator, form: { tolerance: "5" } });
});

test("a town's own band goes before the network's, and that before common practice", async () => {
  const yard = await aYard();
  const other = await aYard();
  const path = `/fleet/calibrations/${yard.calibrationId}`;
  const isIn = async (cookie = yard.cookies.recorder, at = path) =>
    (await page(at, cookie)).includes("setting 3 lands in the band");
  expect(await isIn()).toBe(true);
  const network = { "salt-low": "200", "salt-high": "250", tolerance: "5" };
  expect((await app.ask("/network/bands", { cookie: coordinator, form: network })).status).toBe(302);
  expect(await isIn()).toBe(false);
  const own = { "salt-low": "280", "salt-high": "290" };
  expect((await app.ask("/fleet/bands", { cookie: yard.cookies.recorder, form: own })).status).toBe(403);
  expect((await app.ask("/fleet/bands", { cookie: yard.cookies.director, form: own })).status).toBe(302);
  expect(await isIn()).toBe(true);
  expect(await isIn(other.cookies.recorder, `/fleet/calibrations/${other.calibrationId}`)).toBe(false);
  expect(await page("/fleet/bands", yard.cookies.recorder)).toContain("280–290 your town");
  expect((await app.ask("/fleet/bands", { cookie: yard.cookies.director, form: {} })).status).toBe(302);
  expect(await isIn()).toBe(false);
  expect((await app.ask("/network/bands", { cookie: coordinator, form: { tolerance: "5" } })).status).toBe(302);
  expect(await isIn()).toBe(true);
  expect(await countOf(app, `audit_entry WHERE action = 'band.set' AND town_id = ${yard.town.id}`)).toBe(2);
});

test("a band that ends below where it begins is refused beside its field, with what was typed kept", async () => {
  const { town, cookies } = await aYard();
  const form = { "salt-low": "300", "salt-high": "250" };
  const { status, body } = await app.ask("/fleet/bands", { cookie: cookies.director, form });
  expect(status).toBe(400);
  expect(body).toContain("The band must end above where it begins.");
  expect(body).toMatch(/name="salt-low"[^>]*value="300"|value="300"[^>]*name="salt-low"/);
  expect(await countOf(app, `band WHERE town_id = ${town.id}`)).toBe(0);
});

test("two first saves of a town's band at once leave one row", async () => {
  const { town, cookies } = await aYard();
  const form = { "salt-low": "240", "salt-high": "280" };
  await inParallel([1, 2, 3, 4], 4, () => app.ask("/fleet/bands", { cookie: cookies.director, form }));
  expect(await countOf(app, `band WHERE town_id = ${town.id}`)).toBe(1);
});

test("cards are printed for what is in force and in date, and name what is left out", async () => {
  const yard = await aYard();
  const oldTruck = await aTruck(app, yard.town, { unitNumber: "15" });
  await aCalibration(app, { ...yard, truckId: oldTruck, testedOn: "2024-10-09" });
  const words = await page("/fleet/cards", yard.cookies.recorder);
  expect(words).toContain("One cab card is ready to print");
  expect(words).toContain("In the band at 25 mph: setting 3");
  expect(words).toMatch(/Without a card .*15 Salt overdue/);
  const ready = await aCalibration(app, { ...yard, testedOn: day(1), state: "ready" });
  expect(await page(`/fleet/calibrations/${ready}/card`, yard.cookies.recorder)).toContain("Not approved: not for use");
});
