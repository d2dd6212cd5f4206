import { readFile } from "node:fs/promises";
import type { Browser, BrowserContext, Page } from "playwright-core";
import { afterAll, beforeAll, expect, inject, test } from "vitest";
import { aCalibration } from "#tests/support/factories.ts";
import { pdfText } from "#tests/support/pdf-text.ts";
import { openBrowser } from "#tests/support/browser.ts";
import { type Database, expectNoAxeFindings, signInOn, systemDatabase } from "./phone.ts";

/* The fleet's pages in a browser, on the demo town of Fallowmere; Quillbrook is left to the walk through the whole job. */

type Truck = { id: number; unit: string; mph: number; setting: number; lanes: number; townId: number; saltId: number };

let browser: Browser;
let db: Database;
let truck: Truck;
/** Weighed and waiting: 8 turns a minute at each step of the setting, 5 lb a turn. */
let calibrationId: number;
let foreign: { truckId: number; calibrationId: number };

beforeAll(async () => {
  [browser, db] = await Promise.all([openBrowser(), systemDatabase()]);
  const [found] = await db.query<Truck[]>(
    `SELECT t.id, t.unit_number AS unit, t.working_speed_mph AS mph, t.working_setting AS setting,
            t.lanes_per_pass AS lanes, t.town_id AS townId, m.id AS saltId
       FROM truck t JOIN town w ON w.id = t.town_id JOIN material m ON m.town_id = w.id AND m.kind = 'salt'
      WHERE w.name = 'Fallowmere' AND t.is_in_service = 1 AND t.spreader_kind <> 'liquid-tanks' AND t.working_setting <= 3
      ORDER BY t.id LIMIT 1`,
  );
  if (!found) throw new Error("Fallowmere has no truck that works at setting 3 or below.");
  truck = found;
  const town = { id: truck.townId, name: "Fallowmere" };
  const testedOn = dayBefore(1);
  const given = { town, truckId: truck.id, materialId: truck.saltId, testedOn, state: "ready", gateOpeningIn: 2.125 };
  calibrationId = await aCalibration({ db, issuer: "" }, given);
  const [other] = await db.query<(typeof foreign)[]>(
    `SELECT c.truck_id AS truckId, c.id AS calibrationId FROM calibration c JOIN town w ON w.id = c.town_id
      WHERE w.name = 'Quillbrook' ORDER BY c.id LIMIT 1`,
  );
  if (!other) throw new Error("Quillbrook has no calibration.");
  foreign = other;
}, 120_000);

afterAll(async () => {
  await browser.close();
  await db.end();
});

function dayBefore(days: number) {
  return new Date(Date.now() - days * 86_400_000).toISOString().slice(0, 10);
}

/** lb per lane mile by plain arithmetic: rev/min × lb/rev × 60/mph over the lanes. */
function rate(setting: number, mph: number) {
  return (8 * setting * 5 * 60) / mph / truck.lanes;
}

type Given = { widthPx?: number; hasScript?: boolean; scheme?: "light" | "dark" };

async function aDesk(personName: string, { widthPx = 1280, hasScript = true, scheme = "light" }: Given = {}) {
  const context = await browser.newContext({
    viewport: { width: widthPx, height: 900 },
    baseURL: inject("wholeSystem").origin,
    javaScriptEnabled: hasScript,
    colorScheme: scheme,
    acceptDownloads: true,
  });
  await signInOn(context, db, personName);
  const page = await context.newPage();
  const faults: string[] = [];
  page.on("pageerror", (error) => faults.push(error.message));
  page.on("console", (message) => {
    if (message.type() === "error") faults.push(message.text());
  });
  return { context, page, faults };
}

async function open(page: Page, path: string) {
  const answer = await page.goto(path);
  await page.waitForLoadState("networkidle");
  expect(answer?.status(), path).toBe(200);
}

test("the director approves, and the card prints on one page of either paper with the figures of the yard", async () => {
  const { context, page, faults } = await aDesk("Hester Lund");
  await open(page, `/fleet/calibrations/${calibrationId}`);
  expect(await page.getByText("It waits for the director’s approval").count()).toBe(1);
  await page.getByRole("button", { name: "Approve it" }).click();
  await page.getByText("it is in force for this truck and material").waitFor();
  await page.getByRole("link", { name: /cab card$/i }).click();
  await page.waitForURL("**/card");
  await page.getByRole("article").waitFor();
  for (const format of ["Letter", "A4"]) {
    const { pageCount, words } = pdfText(await page.pdf({ format }));
    expect(pageCount, format).toBe(1);
    expect(words).toContain(`Truck${truck.unit}`);
    expect(words).toContain("gate21/8in");
    expect(words).toMatch(/Notvalidafter30Jun20\d\d/);
    for (const setting of [1, 2, 3]) expect(words).toContain(String(Math.round(rate(setting, truck.mph))));
  }
  expect(faults).toEqual([]);
  await context.close();
});

test("the batch prints one card a page, and nothing of the page around them", async () => {
  const { context, page } = await aDesk("Hester Lund");
  await open(page, "/fleet/cards");
  const cards = await page.getByRole("article").count();
  expect(cards).toBeGreaterThan(0);
  const { pageCount, words } = pdfText(await page.pdf({ format: "A4" }));
  expect(pageCount).toBe(cards);
  expect(words).not.toContain("Withoutacard");
  expect(words.split("Notvalidafter").length - 1).toBe(cards);
  await context.close();
});

test("the rate fan is drawn without script, and alive reads any speed off by the arrow keys", async () => {
  const still = await aDesk("Tobin Ashe", { hasScript: false });
  await still.page.goto(`/fleet/calibrations/${calibrationId}?step=10`);
  expect(await still.page.locator("figure svg[role=img] title").first().textContent()).toContain(
    "Rates fall as the truck",
  );
  expect(await still.page.getByRole("slider").count()).toBe(0);
  await still.page.getByRole("link", { name: "SI units" }).click();
  expect(await still.page.getByRole("heading", { name: "Rates, kg per lane km" }).count()).toBe(1);
  await still.context.close();

  const { context, page, faults } = await aDesk("Tobin Ashe");
  await open(page, `/fleet/calibrations/${calibrationId}`);
  const slider = page.getByRole("slider");
  await slider.focus();
  await page.keyboard.press("Home");
  await page.keyboard.press("ArrowRight");
  expect(await slider.getAttribute("aria-valuetext")).toBe("6 mph");
  const figures = await page.locator("figure li").allInnerTexts();
  for (const [place, setting] of [1, 2, 3].entries()) {
    expect(figures[place]?.replace(/\D/g, "")).toContain(String(Math.round(rate(setting, 6))));
  }
  expect(faults).toEqual([]);
  await context.close();
});

test("work entered makes the truck due at once, and the day can be found again", async () => {
  const { context, page, faults } = await aDesk("Tobin Ashe", { widthPx: 360 });
  await db.query("UPDATE calibration SET tested_on = ? WHERE id = ?", [dayBefore(5), calibrationId]);
  await open(page, `/fleet/${truck.id}/work`);
  await page.getByLabel("Worked on").selectOption("hydraulics");
  await page.getByLabel("On", { exact: true }).fill(dayBefore(1));
  await page.getByLabel(/What was done/).fill("pump rebuilt");
  await page.getByRole("button", { name: "Enter the work" }).click();
  await page.waitForURL(`**/fleet/${truck.id}`);
  expect(await page.getByText("pump rebuilt").count()).toBe(1);
  await open(page, "/fleet/due");
  const row = page.getByRole("row").filter({ has: page.getByRole("link", { name: truck.unit, exact: true }) });
  expect(await row.innerText()).toMatch(/due/);
  expect(await row.innerText()).toContain("worked on");
  await open(page, "/fleet/cards");
  expect(await page.getByRole("article", { name: new RegExp(`truck ${truck.unit} for salt`, "i") }).count()).toBe(0);
  expect(faults).toEqual([]);
  await context.close();
});

test("the fleet is downloaded, one truck changed in the file, and uploaded again", async () => {
  const { context, page, faults } = await aDesk("Hester Lund");
  await open(page, "/fleet");
  const [download] = await Promise.all([
    page.waitForEvent("download"),
    page.getByRole("link", { name: "Download the fleet (CSV)" }).click(),
  ]);
  const before = await readFile(await download.path(), "utf8");
  const lines = before.split("\r\n");
  const own = lines.findIndex((line) => line.startsWith(`${truck.unit},`));
  const changed = lines.map((line, place) =>
    place === own ? line.replace(/^([^,]*),[^,]*,/, "$1,Repainted body,") : line,
  );
  await open(page, "/uploads?kind=trucks");
  await page.getByLabel("The file").setInputFiles({
    name: "trucks.csv",
    mimeType: "text/csv",
    buffer: Buffer.from(changed.join("\r\n")),
  });
  await page.getByRole("button", { name: "Check the file" }).click();
  await page.getByRole("heading", { level: 1, name: /rows can be read/ }).waitFor();
  await page.getByRole("button", { name: /^Accept/ }).click();
  await page.getByRole("heading", { level: 1, name: /^Accepted/ }).waitFor();
  const after = await (await context.request.get("/fleet/export")).text();
  expect(after).toBe(changed.join("\r\n"));
  await open(page, "/fleet?q=repainted");
  expect(await page.getByRole("link", { name: truck.unit, exact: true }).count()).toBe(1);
  expect(faults).toEqual([]);
  await context.close();
});

test("another town's truck, calibration and card are not there", async () => {
  const { context } = await aDesk("Hester Lund");
  const { truckId, calibrationId: id } = foreign;
  const paths = [`/fleet/${truckId}`, `/fleet/${truckId}/edit`, `/fleet/${truckId}/work`, `/fleet/calibrations/${id}`];
  for (const path of [...paths, `/fleet/calibrations/${id}/card`]) {
    const answer = await context.request.get(path);
    expect(answer.status(), path).toBe(404);
    expect(await answer.text()).not.toContain("Quillbrook");
  }
  await context.close();
});

async function look(context: BrowserContext, page: Page, paths: readonly string[], where: string) {
  for (const path of paths) {
    await open(page, path);
    await expectNoAxeFindings(page, `${path} ${where}`);
    const tooWide = await page.evaluate(() => document.documentElement.scrollWidth - window.innerWidth);
    expect(tooWide, `${path} ${where}`).toBeLessThanOrEqual(0);
  }
  await context.close();
}

test.each([
  [1280, "light"],
  [360, "light"],
  [360, "dark"],
] as const)(
  "axe finds nothing on the fleet's pages at %i px, %s, and nothing is wider than the window",
  async (widthPx, scheme) => {
    const where = `${widthPx} ${scheme}`;
    const { context, page, faults } = await aDesk("Hester Lund", { widthPx, scheme });
    const own = `/fleet/calibrations/${calibrationId}`;
    const paths = [
      "/fleet",
      "/fleet?q=nothing-like-it",
      "/fleet/due",
      "/fleet/cards",
      "/fleet/bands",
      "/fleet/trucks/new",
    ];
    const ofTruck = [`/fleet/${truck.id}`, `/fleet/${truck.id}/edit`, `/fleet/${truck.id}/work`];
    await look(context, page, [...paths, ...ofTruck, own, `${own}?units=si&basis=mile`, `${own}/card`], where);
    expect(faults).toEqual([]);
    const network = await aDesk("Ilse Tarrant", { widthPx, scheme });
    await look(network.context, network.page, ["/network/bands"], where);
    expect(network.faults).toEqual([]);
  },
);
