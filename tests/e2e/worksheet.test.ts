import type { Browser, Page } from "playwright-core";
import { launchChromium } from "#scripts/chromium.js";
import { afterAll, beforeAll, expect, test } from "vitest";
import { aPhone, type Database, expectNoAxeFindings, keepProgramOn, signInOn, systemDatabase } from "./phone.ts";

let browser: Browser;
let db: Database;

beforeAll(async () => {
  [browser, db] = await Promise.all([launchChromium(), systemDatabase()]);
});

afterAll(async () => {
  await browser.close();
  await db.end();
});

const counts = [
  { setting: "1", turns: "6.25" },
  { setting: "2", turns: "11" },
  { setting: "3", turns: "15.5" },
  { setting: "4", turns: "20" },
  { setting: "5", turns: "20" },
];
const catches = ["27.0", "26.2", "26.6"];

/** An auger truck of the demo town that carries salt, other than those already taken. */
async function anAugerTruck(place: number) {
  const trucks = await db.query<{ id: number; unit: string }[]>(
    `SELECT t.id, t.unit_number AS unit FROM truck t JOIN town w ON w.id = t.town_id
      WHERE w.name = 'Quillbrook' AND t.spreader_kind LIKE '%auger' AND t.is_in_service = 1 ORDER BY t.id`,
  );
  const truck = trucks[place % trucks.length];
  if (!truck) throw new Error("The demo town has no auger truck.");
  return truck;
}

const standing = (page: Page) => page.locator("header [role=status]");
const key = (page: Page, name: RegExp | string) => page.getByRole("button", { name });

async function begin(page: Page, unit: string) {
  await page.goto("/fleet/worksheets");
  await page.getByRole("link", { name: "Start a worksheet" }).click();
  await page.getByLabel("Truck").selectOption({ label: `Truck ${unit}` });
  await page.getByLabel("Material").selectOption({ label: "Salt" });
  await key(page, "Begin").click();
  await page.waitForURL(/worksheets\/[0-9a-f-]{36}/);
  await page.getByRole("heading", { name: /You calibrate truck/ }).waitFor();
  return new URL(page.url()).pathname.split("/").at(-1) ?? "";
}

async function cautionsAndGate(page: Page, opening: string) {
  await key(page, "Go on to the cautions").click();
  await page.getByLabel("we may count").check();
  await page.getByLabel("we may catch").check();
  await key(page, "Go on to the gate").click();
  await page.getByLabel("Measured opening").fill(opening);
  await key(page, "Count the turns").click();
}

async function typeCounts(page: Page, rows: typeof counts) {
  for (const { setting, turns } of rows) {
    await key(page, `Type setting ${setting}`).click();
    await page.getByLabel(`Count ${setting}, turns`).fill(turns);
  }
}

async function typeCatches(page: Page, weights: readonly string[], from = 0) {
  for (const [place, gross] of weights.entries()) {
    const name = `Catch ${from + place + 1}`;
    await key(page, /^Weigh (catch|one more)/).click();
    await page.getByLabel(`${name}, turns`).fill("2");
    await page.getByLabel(`${name}, gross weight in lb`).fill(gross);
    await page.getByLabel(`${name}, empty pail in lb`).fill("2.2");
  }
}

async function calibrationsOf(clientRef: string) {
  return db.query<{ id: number; gate: number; testedOn: string; state: string }[]>(
    "SELECT id, gate_opening_in AS gate, state FROM calibration WHERE client_ref = ?",
    [clientRef],
  );
}

async function readingsOf(id: number) {
  const of = (table: string, columns: string) =>
    db.query<Record<string, number>[]>(`SELECT ${columns} FROM ${table} WHERE calibration_id = ? ORDER BY id`, [id]);
  return {
    counts: await of("calibration_count", "setting, revolutions, seconds"),
    catches: await of("calibration_catch", "revolutions, gross_lb, tare_lb"),
  };
}

const typedReadings = {
  counts: counts.map(({ setting, turns }) => ({ setting: Number(setting), revolutions: Number(turns), seconds: 60 })),
  catches: catches.map((gross) => ({ revolutions: 2, gross_lb: Number(gross), tare_lb: 2.2 })),
};

test("with the network cut in the middle and the page reloaded twice, an auger truck's calibration arrives once, as typed", async () => {
  const { context, page, faults } = await aPhone(browser, db, "Dell Farrow");
  await keepProgramOn(page);
  await expectNoAxeFindings(page, "list");
  const truck = await anAugerTruck(0);
  const clientRef = await begin(page, truck.unit);
  await expectNoAxeFindings(page, "truck");
  await key(page, "Go on to the cautions").click();
  await expectNoAxeFindings(page, "cautions");
  await page.getByLabel("we may count").check();
  await page.getByLabel("we may catch").check();
  await key(page, "Go on to the gate").click();
  await page.getByLabel("Measured opening").fill("1 7/8");
  await expectNoAxeFindings(page, "gate");
  await key(page, "Count the turns").click();

  await context.setOffline(true);
  await typeCounts(page, counts.slice(0, 3));
  await standing(page).getByText("on this phone only, no signal").waitFor();
  await page.reload();
  await page.getByLabel("Count 3, turns").waitFor();
  expect(await page.getByLabel("Count 3, turns").inputValue()).toBe("15.5");
  await typeCounts(page, counts.slice(3));
  await page.getByRole("heading", { name: /Setting 5 turns no faster than setting 4/ }).waitFor();
  await expectNoAxeFindings(page, "counts");
  await key(page, "Catch and weigh").click();
  await typeCatches(page, catches.slice(0, 2));
  await page.reload();
  await page.getByLabel("Catch 2, gross weight in lb").waitFor();
  expect(await page.getByLabel("Catch 2, gross weight in lb").inputValue()).toBe("26.2");
  await typeCatches(page, catches.slice(2), 2);
  await page.getByRole("heading", { name: "12.2 lb a turn, give or take 0.5. Three catches agree." }).waitFor();
  await expectNoAxeFindings(page, "catches");
  await key(page, "See the rates").click();
  await page.getByRole("table", { name: "Pounds per lane mile by setting and speed" }).first().waitFor();
  await expectNoAxeFindings(page, "rates");
  await key(page, "Decide on the gate").click();
  await expectNoAxeFindings(page, "decision");
  await key(page, "See the card").click();
  await expectNoAxeFindings(page, "card");
  await key(page, "Finish the sheet").click();
  await page.getByRole("heading", { name: /Finished on this phone/ }).waitFor();
  expect(await calibrationsOf(clientRef)).toEqual([]);

  await context.setOffline(false);
  await page.getByRole("heading", { name: /The calibration has arrived/ }).waitFor({ timeout: 20_000 });
  const stored = await calibrationsOf(clientRef);
  expect(stored).toMatchObject([{ gate: 1.875, state: "ready" }]);
  expect(await readingsOf(stored[0]?.id ?? 0)).toEqual(typedReadings);
  expect(await page.getByRole("link", { name: "Cab card" }).getAttribute("href")).toBe(
    `/fleet/calibrations/${stored[0]?.id ?? 0}/card`,
  );
  await expectNoAxeFindings(page, "finished");
  expect(faults).toEqual([]);
  await context.close();
});

test("two phones that changed the same worksheet see both versions, and what they settle on arrives once", async () => {
  const truck = await anAugerTruck(1);
  const first = await aPhone(browser, db, "Dell Farrow");
  const second = await aPhone(browser, db, "Maren Oake");
  await keepProgramOn(first.page);
  await keepProgramOn(second.page);
  const clientRef = await begin(first.page, truck.unit);
  await cautionsAndGate(first.page, "1 7/8");
  await typeCounts(first.page, counts);
  await key(first.page, "Catch and weigh").click();
  await typeCatches(first.page, catches.slice(0, 1));
  await standing(first.page).getByText("has arrived").waitFor();

  await second.page.goto(`/fleet/worksheets/${clientRef}#catches`);
  await second.page.getByLabel("Catch 1, gross weight in lb").waitFor();
  await first.context.setOffline(true);
  await second.context.setOffline(true);
  await first.page.getByLabel("Catch 1, gross weight in lb").fill("27.4");
  await typeCatches(first.page, ["26.2"], 1);
  await second.page.getByLabel("Catch 1, gross weight in lb").fill("27.0");
  await second.page.getByLabel("Catch 1, gross weight in lb").fill("27.8");
  await typeCatches(second.page, ["26.6"], 1);

  await first.context.setOffline(false);
  await standing(first.page).getByText("has arrived").waitFor({ timeout: 20_000 });
  await second.context.setOffline(false);
  const page = second.page;
  await page.getByRole("heading", { name: /met another version/ }).waitFor({ timeout: 20_000 });
  await page.getByText("1 still to decide.").waitFor();
  await expectNoAxeFindings(page, "settle");
  await page.reload();
  await page.getByText("1 still to decide.").waitFor();
  await page.getByRole("radio", { name: /^Both/ }).check();
  await key(page, "Go on with this").click();
  await standing(page).getByText("has arrived").waitFor({ timeout: 20_000 });
  await page.goto(`/fleet/worksheets/${clientRef}#card`);
  await key(page, "Finish the sheet").click();
  await page.getByRole("heading", { name: /The calibration has arrived/ }).waitFor({ timeout: 20_000 });

  const stored = await calibrationsOf(clientRef);
  expect(stored).toHaveLength(1);
  const { counts: storedCounts, catches: storedCatches } = await readingsOf(stored[0]?.id ?? 0);
  expect(storedCounts).toEqual(typedReadings.counts);
  // Both corrections of the first catch, and the one that each phone added: nothing lost, nothing doubled.
  expect(storedCatches.map(({ gross_lb }) => gross_lb).sort()).toEqual([26.2, 26.6, 27.4, 27.8]);
  expect([...first.faults, ...second.faults].filter((fault) => !fault.includes("409"))).toEqual([]);
  await first.context.close();
  await second.context.close();
});

/** Tab on until the wanted control has the focus: nothing but the keyboard. */
async function tabTo(page: Page, name: string | RegExp, role: "button" | "textbox" | "checkbox" | "combobox" | "link") {
  const wanted = page.getByRole(role, { name }).first();
  await wanted.waitFor();
  for (let presses = 0; presses < 80; presses++) {
    if (await wanted.evaluate((element) => element === document.activeElement)) return;
    await page.keyboard.press("Tab");
  }
  throw new Error(`The keyboard does not reach ${String(name)}.`);
}

async function press(page: Page, name: string | RegExp) {
  await tabTo(page, name, "button");
  await page.keyboard.press("Enter");
}

test("every step works by the keyboard alone, the turns counted with the space bar", async () => {
  const { context, page, faults } = await aPhone(browser, db, "Dell Farrow");
  const truck = await anAugerTruck(2);
  await page.goto(`/fleet/worksheets/new?truck=${truck.id}`);
  await tabTo(page, "Material", "combobox");
  await page.keyboard.type("Salt");
  await press(page, "Begin");
  await page.waitForURL(/worksheets\/[0-9a-f-]{36}/);
  const clientRef = new URL(page.url()).pathname.split("/").at(-1) ?? "";
  await press(page, "Go on to the cautions");
  await tabTo(page, /we may count/, "checkbox");
  await page.keyboard.press("Space");
  await tabTo(page, /we may catch/, "checkbox");
  await page.keyboard.press("Space");
  await press(page, "Go on to the gate");
  await tabTo(page, "Measured opening", "textbox");
  await page.keyboard.type("2");
  await press(page, "Count the turns");

  await press(page, "Start the clock at setting 1");
  await tabTo(page, /^Turn/, "button");
  for (let turn = 0; turn < 4; turn++) await page.keyboard.press("Space");
  await press(page, "Stop here");
  await press(page, "half a turn");
  await press(page, "Keep 4.5 turns");
  await page.getByLabel("Count 1, turns").waitFor();
  expect(await page.getByLabel("Count 1, turns").inputValue()).toBe("4.5");
  await page.waitForFunction(() => document.activeElement?.id === "step-heading");
  await press(page, "Catch and weigh");
  for (const gross of ["14.1", "14.3"]) {
    await press(page, /^Weigh catch/);
    await page.waitForFunction(() => document.activeElement?.id.endsWith("grossLb"));
    await page.keyboard.type(gross);
  }
  await press(page, "See the rates");
  await press(page, "Decide on the gate");
  await press(page, "See the card");
  await press(page, "Finish the sheet");
  await page.getByRole("heading", { name: /The calibration has arrived/ }).waitFor({ timeout: 20_000 });
  const [stored] = await calibrationsOf(clientRef);
  const {
    counts: [count],
  } = await readingsOf(stored?.id ?? 0);
  expect(count).toMatchObject({ setting: 1, revolutions: 4.5 });
  expect(faults).toEqual([]);
  await context.close();
});

test("a worksheet begun without signal is on the phone's own list, and arrives when there is signal", async () => {
  const { context, page } = await aPhone(browser, db, "Dell Farrow");
  await keepProgramOn(page);
  await page.waitForTimeout(1000);
  await context.setOffline(true);
  await page.goto("/fleet/worksheets");
  await page.waitForURL(/worksheets\/phone/);
  await expectNoAxeFindings(page, "the phone's list");
  await key(page, "Start a worksheet").click();
  const truck = await anAugerTruck(3);
  await page.getByLabel("Truck").selectOption({ label: `Truck ${truck.unit}` });
  await page.getByLabel("Material").selectOption({ label: "Salt" });
  await expectNoAxeFindings(page, "new");
  await key(page, "Begin").click();
  await page.waitForURL(/worksheets\/[0-9a-f-]{36}/);
  const clientRef = new URL(page.url()).pathname.split("/").at(-1) ?? "";
  await page.goto("/fleet/worksheets");
  await page.getByRole("link", { name: new RegExp(`Truck ${truck.unit}, salt`) }).waitFor();
  await context.setOffline(false);
  await expect
    .poll(() => db.query("SELECT version FROM worksheet WHERE client_ref = ?", [clientRef]), { timeout: 20_000 })
    .toEqual([{ version: 1 }]);
  await context.close();
});

test("somebody else who signs in on the same phone sees none of it, and sends none of it", async () => {
  const { context, page } = await aPhone(browser, db, "Dell Farrow");
  await keepProgramOn(page);
  const truck = await anAugerTruck(0);
  const clientRef = await begin(page, truck.unit);
  await standing(page).getByText("has arrived").waitFor();
  await context.setOffline(true);
  await page.getByLabel("Note").fill("for Dell alone");
  await standing(page).getByText("no signal").waitFor();

  await signInOn(context, db, "Hester Lund");
  await page.goto("about:blank");
  await context.setOffline(false);
  await page.goto("/fleet/worksheets");
  await page.getByText("None is on this phone.").waitFor();
  await page.goto(`/fleet/worksheets/${clientRef}`);
  await page.getByRole("heading", { name: "There is no such worksheet here." }).waitFor();
  expect(await page.content()).not.toContain("for Dell alone");

  await signInOn(context, db, "Dell Farrow");
  await page.goto("about:blank");
  await page.goto(`/fleet/worksheets/${clientRef}#truck`);
  await expect.poll(() => page.getByLabel("Note").inputValue()).toBe("for Dell alone");
  await standing(page).getByText("has arrived").waitFor({ timeout: 20_000 });
  await context.close();
});

test("figures that are none say so beside the field, and what was typed stays", async () => {
  const { context, page } = await aPhone(browser, db, "Dell Farrow");
  const truck = await anAugerTruck(1);
  await begin(page, truck.unit);
  await cautionsAndGate(page, "two inches");
  await page.getByText("Write the gate opening in inches, as in 1 7/8 or 1.875.").waitFor();
  await page.getByLabel("Measured opening").fill("2");
  await key(page, "Count the turns").click();
  await typeCounts(page, [{ setting: "1", turns: "12345678901234567890" }]);
  await key(page, "Catch and weigh").click();
  const turns = page.getByLabel("Count 1, turns");
  expect(await turns.getAttribute("aria-invalid")).toBe("true");
  expect(await turns.evaluate((element) => element === document.activeElement)).toBe(true);
  await page.reload();
  expect(await turns.inputValue()).toBe("12345678901234567890");
  await context.close();
});
