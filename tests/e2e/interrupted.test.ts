import { readFile } from "node:fs/promises";
import { join } from "node:path";
import type { Browser, Page } from "playwright-core";
import { afterAll, beforeAll, expect, test } from "vitest";
import { connect } from "#scripts/migrate.js";
import { type PassingSystem, startPassingSystem } from "#scripts/passing-system.js";
import { projectFolder } from "#scripts/settings.js";
import { openBrowser, openTab, settled, signIn, type Tab } from "#tests/support/browser.ts";

// What real days bring: a session that ends while one types, a button pressed twice, no mouse, no JavaScript.

let system: PassingSystem;
let browser: Browser;

beforeAll(async () => {
  [system, browser] = await Promise.all([startPassingSystem({ logLevel: "warn" }), openBrowser()]);
}, 180_000);
afterAll(async () => {
  await browser?.close();
  await system?.stop();
});

async function open(hasScript = true): Promise<Tab> {
  return openTab(browser, { origins: [system.origin, system.idpOrigin], hasScript });
}

async function go(page: Page, path: string) {
  await page.goto(`${system.origin}${path}`);
  await settled(page);
}

async function query<Row>(sql: string, values: unknown[] = []): Promise<Row[]> {
  const connection = await connect(system.migrator);
  try {
    return await connection.query<Row[]>(sql, values);
  } finally {
    await connection.end();
  }
}

async function count(sql: string, values: unknown[] = []): Promise<number> {
  const [row] = await query<{ count: number }>(sql, values);
  return Number(row?.count);
}

async function endSessionsOf(subject: string) {
  await query("DELETE s FROM session s JOIN user_account u ON u.id = s.user_id WHERE u.subject = ?", [subject]);
}

async function figureOf(town: string) {
  const [row] = await query<{ id: number; state: string; version: number }>(
    `SELECT f.id, f.state, f.version FROM season_figure f JOIN town t ON t.id = f.town_id
      WHERE t.name = ? AND f.season_start_year = 2025`,
    [town],
  );
  return row ?? null;
}

const sampleFile = (name: string) => join(projectFolder, "data", "demo", "files", name);

async function upload(page: Page, file: string) {
  await go(page, "/uploads?kind=season-figures");
  await page.setInputFiles("input[type=file]", sampleFile(file));
  await page.getByRole("button", { name: "Check the file" }).click();
  await page.waitForURL(/\/uploads\/\d+$/);
  await settled(page);
}

/** On the sign-in page after an interruption: press its button, and be whoever `name` says at the identity provider. */
async function signInAgain(page: Page, name: string) {
  await page.getByRole("button", { name: "Sign in" }).click();
  await page.waitForURL((url) => url.origin === system.idpOrigin || !url.pathname.startsWith("/login"));
  if (new URL(page.url()).origin === system.idpOrigin) {
    await page.getByRole("button", { name: new RegExp(`^${name}`) }).click();
  }
  await page.waitForURL((url) => url.origin === system.origin && !url.pathname.startsWith("/auth"));
  await settled(page);
}

const signedOut = "You have been signed out. Sign in, and the form is as you left it.";
const backAgain = "You had been signed out, so nothing was sent.";

test("a review note written while the session ends is back after signing in, and was not sent", async () => {
  const { page, context, problems } = await open();
  await signIn(page, system.origin, "ilse.tarrant");
  const figure = await figureOf("Marlsedge");
  await go(page, `/network/review/${figure?.id}`);
  const note = "Your lane miles grew by three tenths. Did a road come over from the county? “Yes” is enough.";
  await page.getByLabel("Question that goes back with it").fill(note);
  await endSessionsOf("ilse.tarrant");
  await page.getByRole("button", { name: "Send it back" }).click();
  await page.getByText(signedOut).waitFor();
  expect(await figureOf("Marlsedge")).toEqual(figure);

  await signInAgain(page, "Ilse Tarrant");
  await page.getByText(backAgain).waitFor();
  expect(await page.getByLabel("Question that goes back with it").inputValue()).toBe(note);
  await page.getByRole("button", { name: "Send it back" }).click();
  await page.waitForURL(/\/network\/review$/);
  expect((await figureOf("Marlsedge"))?.state).toBe("returned");
  const [stored] = await query<{ note: string }>("SELECT review_note AS note FROM season_figure WHERE id = ?", [
    figure?.id,
  ]);
  expect(stored?.note).toBe(note);
  expect(problems).toEqual([]);
  await context.close();
});

test("a workshop typed in while the session ends is back, and is made once", async () => {
  const { page, context, problems } = await open();
  await signIn(page, system.origin, "ilse.tarrant");
  await go(page, "/workshops");
  await page.getByLabel("Title").fill("Winter talk at Ridge");
  await page.getByLabel("Day").fill("2027-01-14");
  await page.getByLabel("Edition its boards are drawn from").selectOption({ index: 1 });
  const edition = await page.getByLabel("Edition its boards are drawn from").inputValue();
  await endSessionsOf("ilse.tarrant");
  await page.getByRole("button", { name: "Put it on the calendar" }).click();
  await page.getByText(signedOut).waitFor();
  await signInAgain(page, "Ilse Tarrant");
  await page.getByText(backAgain).waitFor();
  expect(await page.getByLabel("Title").inputValue()).toBe("Winter talk at Ridge");
  expect(await page.getByLabel("Day").inputValue()).toBe("2027-01-14");
  expect(await page.getByLabel("Edition its boards are drawn from").inputValue()).toBe(edition);
  await page.getByRole("button", { name: "Put it on the calendar" }).click();
  await page.waitForURL(/\/workshops\/\d+$/);
  expect(await count("SELECT COUNT(*) AS count FROM workshop WHERE title = 'Winter talk at Ridge'")).toBe(1);
  expect(problems).toEqual([]);
  await context.close();
});

test("what one person typed does not come back for the next one in the same browser", async () => {
  const { page, context } = await open();
  await signIn(page, system.origin, "ilse.tarrant");
  await go(page, "/workshops");
  await page.getByLabel("Title").fill("Only for Ilse’s eyes");
  await page.getByLabel("Day").fill("2027-02-02");
  await endSessionsOf("ilse.tarrant");
  await page.getByRole("button", { name: "Put it on the calendar" }).click();
  await page.getByText(signedOut).waitFor();

  // Another coordinator of the same network, let in for this test.
  await query(`UPDATE user_account SET role = 'coordinator', town_id = NULL WHERE subject = 'hester.lund'`);
  await context.clearCookies();
  await signIn(page, system.origin, "hester.lund", "/workshops");
  expect(await page.locator("main").innerText()).not.toContain(backAgain);
  expect(await page.getByLabel("Title").inputValue()).toBe("");
  expect(await page.content()).not.toContain("Only for Ilse’s eyes");
  await context.close();
});

test("the first click on a corrected form sends it", async () => {
  const { page, context } = await open();
  await signIn(page, system.origin, "ilse.tarrant");
  await go(page, "/workshops");
  await page.getByLabel("Day").fill("2027-03-03");
  await page.getByRole("button", { name: "Put it on the calendar" }).click();
  await page.getByText("Give the workshop a title.").waitFor();
  await page.getByLabel("Title").fill("Corrected at once");
  await page.getByRole("button", { name: "Put it on the calendar" }).click();
  await page.waitForURL(/\/workshops\/\d+$/);
  expect(await count("SELECT COUNT(*) AS count FROM workshop WHERE title = 'Corrected at once'")).toBe(1);
  await context.close();
});

/** Two presses as fast as a hand can; whatever the first one has set off, the second one falls into it. */
async function pressTwice(page: Page, name: string | RegExp) {
  await page.getByRole("button", { name }).dblclick();
  await page.waitForTimeout(300);
  await settled(page);
}

test("a file accepted twice counts once, and a season sent twice is sent once", async () => {
  const recorder = await open();
  await signIn(recorder.page, system.origin, "dell.farrow");
  await upload(recorder.page, "quillbrook-season-2025-26.csv");
  await pressTwice(recorder.page, /^Accept/);
  expect((await figureOf("Quillbrook"))?.version).toBe(1);
  expect(await count("SELECT COUNT(*) AS count FROM audit_entry WHERE action = 'upload.accept'")).toBe(1);

  const director = await open();
  await signIn(director.page, system.origin, "maren.oake");
  await go(director.page, "/season/2025");
  await pressTwice(director.page, "Send 2025–26 in");
  expect((await figureOf("Quillbrook"))?.state).toBe("sent");
  expect(await count("SELECT COUNT(*) AS count FROM audit_entry WHERE action = 'season-figure.send'")).toBe(1);
  expect(
    await count(
      "SELECT COUNT(*) AS count FROM outbox_mail WHERE subject LIKE '%Quillbrook%' AND to_address LIKE 'ilse%'",
    ),
  ).toBe(1);
  expect([...recorder.problems, ...director.problems]).toEqual([]);
  await recorder.context.close();
  await director.context.close();
});

test("an edition asked for twice is published once, and each director is told once", async () => {
  const { page, context, problems } = await open();
  await signIn(page, system.origin, "ilse.tarrant");
  await go(page, "/network/editions");
  await pressTwice(page, "Publish 2025–26, edition 1");
  await page.getByText(/^2025–26, edition 1 is out/).waitFor({ timeout: 60_000 });
  expect(await count("SELECT COUNT(*) AS count FROM edition WHERE season_start_year = 2025")).toBe(1);
  const [told] = await query<{ mails: number; people: number }>(
    "SELECT COUNT(*) AS mails, COUNT(DISTINCT to_address, to_name) AS people FROM outbox_mail WHERE subject LIKE '%2025–26, edition 1%'",
  );
  expect(Number(told?.mails)).toBeGreaterThan(50);
  expect(Number(told?.mails)).toBe(Number(told?.people));
  expect(problems).toEqual([]);
  await context.close();
});

/** Tab until the control with that name has the focus; then the key is pressed. Fails when the road is too long. */
async function reach(page: Page, name: RegExp, key = "Enter") {
  for (let step = 0; step < 60; step += 1) {
    await page.keyboard.press("Tab");
    const words = await page.evaluate(() => document.activeElement?.textContent?.trim() ?? "");
    const isSeen = await page.evaluate(() => document.activeElement?.matches(":focus-visible") ?? false);
    if (!name.test(words)) continue;
    expect(isSeen, `the focus on ${words} shows`).toBe(true);
    await page.keyboard.press(key);
    return;
  }
  throw new Error(`${String(name)} cannot be reached by the Tab key.`);
}

test("from the front page to a sent season with the keyboard alone", async () => {
  const town = "Fallowmere";
  const before = await figureOf(town);
  // The season lies with the director again, as after a question of the coordinator.
  await query("UPDATE season_figure SET state = 'draft', sent_at = NULL, sent_by_id = NULL WHERE id = ?", [before?.id]);
  await query(
    "UPDATE user_account SET role = 'director', town_id = (SELECT id FROM town WHERE name = ?) WHERE subject = 'hester.lund'",
    [town],
  );
  const { page, context, problems } = await open();
  await go(page, "/");
  await reach(page, /^Sign in$/);
  await page.waitForURL(/\/login/);
  await settled(page);
  await reach(page, /^Sign in$/);
  await page.waitForURL((url) => url.origin === system.idpOrigin);
  await reach(page, /^Hester Lund/);
  await page.waitForURL(`${system.origin}/today`);
  await settled(page);
  await reach(page, /^Look it over$/);
  await page.waitForURL(/\/season\/2025$/);
  await settled(page);
  await reach(page, /^Send 2025–26 in$/);
  await page.getByText("the coordinator reviews it").waitFor();
  expect((await figureOf(town))?.state).toBe("sent");
  expect(problems).toEqual([]);
  await context.close();
});

test("without JavaScript a file is uploaded, accepted and sent in", async () => {
  await query("UPDATE season_figure SET state = 'draft', sent_at = NULL, sent_by_id = NULL WHERE id = ?", [
    (await figureOf("Quillbrook"))?.id,
  ]);
  const recorder = await open(false);
  await signIn(recorder.page, system.origin, "dell.farrow");
  await go(recorder.page, "/uploads?kind=season-figures");
  await recorder.page.setInputFiles("input[type=file]", sampleFile("quillbrook-season-2025-26-with-mistakes.csv"));
  await recorder.page.getByRole("button", { name: "Check the file" }).click();
  await recorder.page.getByText("Seven things are wrong in three rows").waitFor();
  // Another figure than the file that was accepted before: the same file twice would be recognised.
  const good = await readFile(sampleFile("quillbrook-season-2025-26.csv"), "utf8");
  await go(recorder.page, "/uploads?kind=season-figures");
  await recorder.page.setInputFiles("input[type=file]", {
    name: "corrected.csv",
    mimeType: "text/csv",
    buffer: Buffer.from(good.replace("604.0", "605.5")),
  });
  await recorder.page.getByRole("button", { name: "Check the file" }).click();
  await recorder.page.getByText("The row can be read: one season.").waitFor();
  await recorder.page.getByRole("button", { name: /^Accept/ }).click();
  await recorder.page.getByText("Accepted: one season in your figures.").waitFor();
  const director = await open(false);
  await signIn(director.page, system.origin, "maren.oake");
  await go(director.page, "/season/2025");
  await director.page.getByRole("button", { name: "Send 2025–26 in" }).click();
  await director.page.getByText("the coordinator reviews it").waitFor();
  expect((await figureOf("Quillbrook"))?.state).toBe("sent");
  await recorder.context.close();
  await director.context.close();
});
