import { readFile } from "node:fs/promises";
import { join } from "node:path";
import type { Browser, Page } from "playwright-core";
import { afterAll, beforeAll, expect, test } from "vitest";
import { connect } from "#scripts/migrate.js";
import { type PassingSystem, startPassingSystem } from "#scripts/passing-system.js";
import { projectFolder } from "#scripts/settings.js";
import { openBrowser, openTab, settled, signIn, type Tab } from "#tests/support/browser.ts";

// The whole job once, on real parts: built application, MariaDB, identity provider, mail, Chromium. Every figure that a
// page shows is worked out here again by plain arithmetic from the file that was uploaded.

let system: PassingSystem;
let browser: Browser;
const tabs: Tab[] = [];

beforeAll(async () => {
  [system, browser] = await Promise.all([startPassingSystem(), openBrowser()]);
});
afterAll(async () => {
  await browser?.close();
  await system?.stop();
});

async function enter(subject: string): Promise<Page> {
  const tab = await openTab(browser, { origins: [system.origin, system.idpOrigin] });
  tabs.push(tab);
  await signIn(tab.page, system.origin, subject);
  return tab.page;
}

async function go(page: Page, path: string) {
  const response = await page.goto(`${system.origin}${path}`);
  expect(response?.status(), path).toBe(200);
  await settled(page);
}

/** Press a button that sends a form, and wait for the page that follows. */
async function send(page: Page, name: string | RegExp) {
  const answered = page.waitForResponse((response) => response.request().method() === "POST");
  await page.getByRole("button", { name }).click();
  await answered;
  await settled(page);
}

const sampleFile = (name: string) => join(projectFolder, "data", "demo", "files", name);

async function upload(page: Page, kind: string, file: string) {
  await go(page, `/uploads?kind=${kind}`);
  await page.setInputFiles("input[type=file]", sampleFile(file));
  await page.getByRole("button", { name: "Check the file" }).click();
  await page.waitForURL(/\/uploads\/\d+$/);
  await settled(page);
}

async function rowsOf(file: string): Promise<Record<string, string>[]> {
  const [heads = "", ...lines] = (await readFile(sampleFile(file), "utf8")).trim().split(/\r?\n/);
  return lines.map((line) =>
    Object.fromEntries(line.split(",").map((cell, at) => [heads.split(",")[at] ?? "", cell] as const)),
  );
}

/** A row of a table by its head, as its cells' words. */
async function cellsOf(page: Page, head: string): Promise<string[]> {
  const row = page.getByRole("row").filter({ has: page.getByRole("rowheader", { name: head, exact: true }) });
  return (await row.first().getByRole("cell").allInnerTexts()).map((text) => text.trim());
}

type Mail = { to: string; subject: string; text: string };

/** Wait until the catcher holds a mail; the worker sends within a few seconds. */
async function mailTo(address: RegExp, subject: RegExp): Promise<Mail> {
  for (const deadline = Date.now() + 60_000; Date.now() < deadline;) {
    const mails = (await (await fetch(`${system.mailOrigin}/mails.json`)).json()) as Mail[];
    const found = mails.find((mail) => address.test(mail.to) && subject.test(mail.subject));
    if (found) return found;
    await new Promise((resolve) => setTimeout(resolve, 300));
  }
  throw new Error(`No mail to ${String(address)} about ${String(subject)} has come.`);
}

async function rowsFromDatabase<Row>(sql: string): Promise<Row[]> {
  const connection = await connect(system.migrator);
  try {
    return await connection.query<Row[]>(sql);
  } finally {
    await connection.end();
  }
}

const grouped = (value: number) => Math.round(value).toLocaleString("en-US");

/** What the season file comes to, by the definitions of the dictionary: salt counts the salt inside the mix. */
async function seasonByHand() {
  const [row = {}] = await rowsOf("quillbrook-season-2025-26.csv");
  const number = (name: string) => Number(row[name]);
  const saltTons = number("salt_tons") + (number("mix_tons") * number("mix_salt_percent")) / 100;
  const laneMiles = number("lane_miles");
  return {
    tonsPerLaneMile: saltTons / laneMiles,
    lbPerLaneMileEvent: (saltTons * 2000) / laneMiles / number("events"),
    chlorideLbPerLaneMile: ((saltTons * 2000) / laneMiles) * (35.453 / 58.443),
    costPerLaneMile: number("material_cost_usd") / laneMiles,
  };
}

/** lb per lane mile of each truck of the calibration file at its working setting, 25 mph, one lane. */
async function ratesByHand() {
  const workingSettings: Record<string, string> = { "4": "3", "9": "4", "12": "3" };
  const rows = await rowsOf("quillbrook-calibrations-2026.csv");
  return Object.entries(workingSettings).map(([truck, setting]) => {
    const own = rows.filter((row) => row.truck === truck);
    const count = own.find((row) => row.reading === "count" && row.setting === setting);
    const perRev = own
      .filter(({ reading }) => reading === "catch")
      .map((row) => (Number(row.gross_lb) - Number(row.tare_lb)) / Number(row.revolutions));
    const lbPerRev = perRev.reduce((sum, lb) => sum + lb, 0) / perRev.length;
    const revPerMin = (Number(count?.revolutions) * 60) / Number(count?.seconds);
    return { truck, lbPerLaneMile: (lbPerRev * revPerMin * 60) / 25 };
  });
}

async function recorderPutsFiguresIn() {
  const page = await enter("dell.farrow");
  await expect(page.locator("h1").innerText()).resolves.toBe(
    "The figures of 2025–26 are missing. Four trucks are due for calibration.",
  );

  await upload(page, "season-figures", "quillbrook-season-2025-26-with-mistakes.csv");
  expect(await page.locator("h1").innerText()).toContain("Seven things are wrong in three rows");
  const told = (await page.getByRole("row").allInnerTexts()).map((text) => text.replaceAll(/\s*\t\s*/g, " | "));
  expect(told).toContain("2 | salt_tons | -604.0 | The tons of salt cannot be below zero.");
  expect(told).toContain("3 | season | 2025-27 | Write the season by its two years, as in 2025-26.");
  expect(told).toContain(
    "3 | mix_tons | n/a | The tons of sand and salt mix must be a plain number, without unit or words.",
  );
  expect(told).toContain("4 | lane_miles | nothing | Give the lane miles; write 0 if there was none.");
  await expect(page.getByRole("button", { name: /^Accept/ }).getAttribute("aria-disabled")).resolves.toBe("true");

  const byHand = await seasonByHand();
  await upload(page, "season-figures", "quillbrook-season-2025-26.csv");
  expect(await cellsOf(page, "Salt per lane mile and event, lb")).toEqual([grouped(byHand.lbPerLaneMileEvent)]);
  await send(page, /^Accept/);
  expect(await page.locator("h1").innerText()).toBe("Accepted: one season in your figures.");

  await upload(page, "calibrations", "quillbrook-calibrations-2026-with-mistakes.csv");
  expect(await page.locator("h1").innerText()).toContain("Eleven things are wrong in 13 rows");
  const inCalibrations = (await page.getByRole("row").allInnerTexts()).map((text) =>
    text.replaceAll(/\s*\t\s*/g, " | "),
  );
  expect(inCalibrations).toContain(
    "9 | 21 | No truck of this town has that number. Yours are: 4, 7, 9, 11, 12, 14, 15, 18.",
  );
  expect(inCalibrations).toContain(
    "7 | tare_lb | 32.3 | The empty container weighs as much as the full one. Check the two weights.",
  );
  await upload(page, "calibrations", "quillbrook-calibrations-2026.csv");
  expect(await page.locator("h1").innerText()).toBe("All 33 rows can be read: three calibrations.");
  await send(page, /^Accept/);
  expect(await page.locator("h1").innerText()).toBe("Accepted: three calibrations in your fleet.");

  await go(page, "/season/2025");
  expect(await page.getByRole("button", { name: /^Send/ }).count()).toBe(0);
}

async function directorSendsIt(page: Page) {
  await go(page, "/fleet");
  for (const { truck, lbPerLaneMile } of await ratesByHand()) {
    expect((await cellsOf(page, truck)).join(" "), `truck ${truck}`).toContain(grouped(lbPerLaneMile));
  }
  await send(page, "Approve three calibrations");
  expect(await page.getByText("Waiting for your approval").count()).toBe(0);
  for (const { truck, lbPerLaneMile } of await ratesByHand()) {
    const cells = await cellsOf(page, truck);
    expect(cells.join(" "), `truck ${truck}`).toContain(grouped(lbPerLaneMile));
    expect(cells.at(-1)).toBe("in date");
  }

  const byHand = await seasonByHand();
  await go(page, "/season/2025");
  expect(await page.locator("h1").innerText()).toBe(
    `In 2025–26 you used ${byHand.tonsPerLaneMile.toFixed(1)} tons of salt on each lane mile, ${grouped(byHand.lbPerLaneMileEvent)} lb in each of 26 events.`,
  );
  expect((await cellsOf(page, "Chloride per lane mile, lb"))[0]).toBe(grouped(byHand.chlorideLbPerLaneMile));
  expect((await cellsOf(page, "Cost per lane mile"))[0]).toBe(`$${grouped(byHand.costPerLaneMile)}`);
  await send(page, "Send 2025–26 in");
  expect(await page.locator("main").innerText()).toContain("the coordinator reviews it");
  expect(await page.getByRole("button", { name: /^Send/ }).count()).toBe(0);

  const mail = await mailTo(/ilse\.tarrant/, /Quillbrook/);
  expect(mail.subject).toContain("2025–26");
  const mailPage = await fetch(system.mailOrigin);
  expect(await mailPage.text()).toContain(mail.subject);
}

async function coordinatorReviews(page: Page) {
  const question = "Your salt is about ten times that of earlier seasons. Was a decimal point lost?";
  await go(page, "/network/review");
  await page.getByRole("link", { name: "Look closer at Fallowmere" }).click();
  await page.waitForURL(/\/network\/review\/\d+$/);
  await settled(page);
  await page.getByLabel("Question that goes back with it").fill(question);
  await send(page, "Send it back");
  const returned = await mailTo(/fallowmere/, /2025–26/);
  expect(returned.text).toContain(question);

  await page.getByRole("link", { name: "Quillbrook" }).click();
  await page.waitForURL(/\/network\/review\/\d+$/);
  await settled(page);
  expect(await page.locator("h1").innerText()).toBe(
    "Quillbrook’s 2025–26 waits for your review; it passed every check.",
  );
  await send(page, "Accept it as it is");
  await page.waitForURL(/\/network\/review$/);
  await send(page, /^Accept these \d together$/);
  expect(await page.locator("main").innerText()).not.toContain("Passed every check");

  await go(page, "/network/editions");
  await send(page, "Publish 2025–26, edition 1");
  await page.getByText(/^2025–26, edition 1 is out, from \d+ contributors\.$/).waitFor({ timeout: 60_000 });
  const told = await mailTo(/maren\.oake/, /2025–26, edition 1/);
  expect(told.text).toContain(`${system.origin}/peers`);
}

/** The edition's rate for Quillbrook: the median of its trucks' newest salt calibrations up to the season's end. */
async function ownRateByHand() {
  type Line = { truck: number; calibration: number; rev: number; seconds: number; mph: number; lanes: number };
  const lines = await rowsFromDatabase<Line>(`
    SELECT t.id AS truck, c.id AS calibration, k.revolutions AS rev, k.seconds, t.working_speed_mph AS mph,
           t.lanes_per_pass AS lanes
      FROM calibration c JOIN truck t ON t.id = c.truck_id JOIN town w ON w.id = t.town_id
      JOIN material m ON m.id = c.material_id AND m.kind = 'salt'
      JOIN calibration_count k ON k.calibration_id = c.id AND k.setting = t.working_setting
     WHERE w.name = 'Quillbrook' AND c.state = 'approved' AND t.is_in_service = 1
       AND c.tested_on BETWEEN '2024-07-01' AND '2026-06-30'
     ORDER BY c.tested_on DESC`);
  const catches = await rowsFromDatabase<{ id: number; rev: number; lb: number }>(
    "SELECT calibration_id AS id, revolutions AS rev, gross_lb - tare_lb AS lb FROM calibration_catch",
  );
  const newest = lines.filter(({ truck }, at) => lines.findIndex((line) => line.truck === truck) === at);
  const rates = newest
    .map(({ calibration, rev, seconds, mph, lanes }) => {
      const own = catches.filter(({ id }) => id === calibration).map(({ lb, rev: turns }) => lb / turns);
      const lbPerRev = own.reduce((sum, lb) => sum + lb, 0) / own.length;
      return (((lbPerRev * rev * 60) / seconds) * 60) / mph / lanes;
    })
    .sort((one, other) => one - other);
  const middle = rates.length / 2;
  return ((rates[Math.ceil(middle) - 1] ?? NaN) + (rates[Math.floor(middle)] ?? NaN)) / 2;
}

async function directorCompares(page: Page) {
  const rate = await ownRateByHand();
  const byHand = await seasonByHand();
  await go(page, "/peers");
  const sentence = await page.locator("h1").innerText();
  expect(sentence).toContain(`a median of ${grouped(rate)} lb per lane mile`);
  expect(sentence.replaceAll(/\s+/g, " ")).toContain(`${grouped(rate - 300)} above the band`);
  expect(await page.locator("main").innerText()).toContain(
    `Your town laid ${grouped(byHand.lbPerLaneMileEvent)} lb of salt on a lane mile in each event`,
  );

  const lane = page.getByRole("slider", { name: /^Application rate at the working setting/ });
  await lane.focus();
  await page.keyboard.press("ArrowRight");
  const first = await lane.getAttribute("aria-valuetext");
  await page.keyboard.press("ArrowRight");
  const second = await lane.getAttribute("aria-valuetext");
  expect(first).toMatch(/and less lb per lane mile: \d+ towns$/);
  expect(second).toMatch(/^\d+ to \d+ lb per lane mile: \d+ towns$/);
  expect(await page.getByText(second ?? "", { exact: true }).isVisible()).toBe(true);

  await page
    .getByRole("link", { name: /^50–149 lane miles/ })
    .filter({ visible: true })
    .click();
  await page.waitForURL(/group=size-50-149/);
  await settled(page);
  await page.locator("summary").filter({ hasText: "Table: Application rate" }).click();
  const table = page.getByRole("table", { name: "Application rate at the working setting: towns by range" });
  const towns = await table.filter({ visible: true }).getByRole("cell").allInnerTexts();
  const shown = towns.flatMap((text) => text.match(/^\d+/)?.map(Number) ?? []);
  const download = page.waitForEvent("download");
  await page.getByRole("link", { name: "Download these figures (CSV)" }).filter({ visible: true }).first().click();
  const csv = await readFile(await (await download).path(), "utf8");
  const inFile = csv
    .split(/\r?\n/)
    .filter((line) => line.includes(",towns_in_bin,"))
    .map((line) => Number(line.split(",").at(-1)));
  expect(inFile.length).toBeGreaterThanOrEqual(3);
  expect(shown).toEqual(inFile);
}

/** With JavaScript off, both strips are there: the server drew them. */
async function strippedOfScript(signedIn: Page) {
  const tab = await openTab(browser, { origins: [system.origin], hasScript: false });
  tabs.push(tab);
  await tab.context.addCookies(await signedIn.context().cookies());
  await go(tab.page, "/peers");
  const drawings = tab.page.locator("figure svg[role=img]").filter({ visible: true });
  expect(await drawings.count()).toBe(2);
  for (const drawing of await drawings.all()) expect(await drawing.locator("text").count()).toBeGreaterThan(5);
  expect(await tab.page.getByText("Table", { exact: true }).count()).toBeGreaterThan(0);
}

async function coordinatorShowsBoards(page: Page) {
  await go(page, "/workshops");
  await page.getByLabel("Title").fill("Autumn workshop");
  await page.getByLabel("Day").fill("2026-12-10");
  await send(page, "Put it on the calendar");
  await page.waitForURL(/\/workshops\/\d+$/);
  const questions = ["What keeps the working setting above the band?", "Where would one pass less be noticed?"];
  for (const [at, shows] of ["rate-at-working-setting|all", "salt-per-event|all"].entries()) {
    await page.getByLabel("What it shows").selectOption(shows);
    await page.getByLabel("Question to discuss").fill(questions[at] ?? "");
    await send(page, "Add the board");
    await page.getByRole("cell", { name: questions[at] }).waitFor();
  }
  await page.getByRole("link", { name: "Show the first board" }).click();
  await page.waitForURL(/boards\/1$/);
  await settled(page);
  expect(await page.getByRole("banner").count()).toBe(0);
  expect(await page.getByText(questions[0] ?? "").isVisible()).toBe(true);
  await page.keyboard.press("f");
  await page.waitForFunction(() => document.fullscreenElement !== null);
  await page.keyboard.press("ArrowRight");
  await page.waitForURL(/boards\/2$/);
  expect(await page.getByText(questions[1] ?? "").isVisible()).toBe(true);

  const names = (await rowsFromDatabase<{ name: string }>("SELECT name FROM town")).map(({ name }) => name);
  expect(names.length).toBeGreaterThanOrEqual(60);
  for (const board of [1, 2]) {
    const address = page.url().replace(/\d+$/, String(board));
    const html = await (await page.request.get(address)).text();
    const data = await (await page.request.get(`${address}.data`)).text();
    expect(html).toContain("<svg");
    for (const name of names) expect(`${html}${data}`.includes(name), `${name} on board ${board}`).toBe(false);
  }
  await page.keyboard.press("PageUp");
  await page.waitForURL(/boards\/1$/);
  await page.keyboard.press("Escape");
  await page.waitForURL(/\/workshops\/\d+$/);
}

async function analystDownloads() {
  const page = await enter("ruben.vale");
  await go(page, "/dataset");
  expect(await page.getByRole("link", { name: "cells (CSV)" }).count()).toBe(0);
  await send(page, "Accept the terms");
  const download = page.waitForEvent("download");
  await page.getByRole("link", { name: "cells (CSV)" }).first().click();
  const byHand = await readFile(await (await download).path());
  expect(byHand.toString("utf8")).toContain("salt-per-event");

  await go(page, "/dataset/tokens");
  await page.getByLabel("What it is for").fill("The yearly report");
  await send(page, "Make the token");
  const token = (await page.locator("code").first().innerText()).trim();
  const headers = { Authorization: `Bearer ${token}` };
  const list = (await (await fetch(`${system.origin}/api/v1/editions`, { headers })).json()) as {
    editions: { season: string; number: number; files: string[] }[];
  };
  const newest = list.editions.find(({ season, number }) => season === "2025–26" && number === 1);
  const cells = newest?.files.find((file) => file.endsWith("cells.csv")) ?? "";
  const byProgram = await fetch(cells, { headers });
  expect(byProgram.status).toBe(200);
  expect(Buffer.from(await byProgram.arrayBuffer()).equals(byHand)).toBe(true);
  expect((await fetch(cells)).status).toBe(401);
}

test("from a spreadsheet to a workshop and a dataset, in the hands of four people", { timeout: 420_000 }, async () => {
  await recorderPutsFiguresIn();
  const maren = await enter("maren.oake");
  await directorSendsIt(maren);
  const ilse = await enter("ilse.tarrant");
  await coordinatorReviews(ilse);
  await directorCompares(maren);
  await strippedOfScript(maren);
  await coordinatorShowsBoards(ilse);
  await analystDownloads();
  expect(tabs.flatMap(({ problems }) => problems)).toEqual([]);
});
