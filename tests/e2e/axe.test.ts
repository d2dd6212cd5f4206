import { AxeBuilder } from "@axe-core/playwright";
import { join } from "node:path";
import type { Browser, Page } from "playwright-core";
import { afterAll, beforeAll, expect, test } from "vitest";
import { connect } from "#scripts/migrate.js";
import { type PassingSystem, startPassingSystem } from "#scripts/passing-system.js";
import { projectFolder } from "#scripts/settings.js";
import { openBrowser, openTab, settled, signIn, type Tab } from "#tests/support/browser.ts";
import { newNetwork } from "#tests/support/new-network.ts";

// Every page that a person can open, as each who may, on a desk and on a phone, light and dark: no finding of axe, no
// error in the console, nothing asked of another host, no sideways scrolling, no small print, no small target.

let demo: PassingSystem;
let fresh: PassingSystem;
let browser: Browser;

beforeAll(async () => {
  browser = await openBrowser();
  demo = await startPassingSystem({ logLevel: "warn" });
  fresh = await startPassingSystem({ hasDemo: false, prepare: newNetwork, logLevel: "warn" });
}, 240_000);
afterAll(async () => {
  await browser?.close();
  await demo?.stop();
  await fresh?.stop();
});

/** The smallest print there may be on any page, and the smallest thing to hit with a finger, both in px. */
const smallestPrintPx = 13.3;
const smallestTargetPx = 24;

type Fault = { what: string; where: string };

/** What a page does wrong at the width it has, besides what axe knows. */
async function faultsOf(page: Page): Promise<Fault[]> {
  return page.evaluate(
    ({ printPx, targetPx }) => {
      const faults: Fault[] = [];
      const where = (element: Element) => element.outerHTML.slice(0, 120);
      const isShown = (element: Element) =>
        element.checkVisibility({ visibilityProperty: true }) && element.closest(".sr-only") === null;
      if (document.documentElement.scrollWidth > window.innerWidth) {
        faults.push({ what: `scrolls sideways, ${document.documentElement.scrollWidth} px`, where: location.pathname });
      }
      for (const element of document.querySelectorAll("body *")) {
        const hasWords = [...element.childNodes].some(
          (node) => node.nodeType === Node.TEXT_NODE && (node.textContent ?? "").trim() !== "",
        );
        if (!hasWords || !isShown(element)) continue;
        // A drawing may be scaled: what counts is the size on the screen.
        const drawing = element.closest("svg");
        const scale = drawing?.viewBox.baseVal.width
          ? drawing.getBoundingClientRect().width / drawing.viewBox.baseVal.width
          : 1;
        const printed = Number.parseFloat(getComputedStyle(element).fontSize) * scale;
        if (printed < printPx) faults.push({ what: `print of ${printed.toFixed(1)} px`, where: where(element) });
      }
      for (const element of document.querySelectorAll(
        "a[href], button, input:not([type=hidden]), select, summary, [role=slider]",
      )) {
        if (!isShown(element)) continue;
        const { width, height } = element.getBoundingClientRect();
        // Links inside a sentence are as high as their line; the rule excepts them.
        const isInSentence = getComputedStyle(element).display === "inline";
        if (!isInSentence && (width < targetPx || height < targetPx)) {
          faults.push({ what: `target of ${width.toFixed(0)} by ${height.toFixed(0)} px`, where: where(element) });
        }
      }
      return faults;
    },
    { printPx: smallestPrintPx, targetPx: smallestTargetPx },
  );
}

/** Look at the page that is open, in all four guises; the faults found are returned, not thrown, so that all are seen. */
async function look({ page }: Tab, name: string): Promise<string[]> {
  const found: string[] = [];
  for (const widthPx of [1280, 360]) {
    await page.setViewportSize({ width: widthPx, height: widthPx === 360 ? 740 : 900 });
    for (const colorScheme of ["light", "dark"] as const) {
      await page.emulateMedia({ colorScheme });
      await settled(page);
      const axe = new AxeBuilder({ page });
      // The themes differ in nothing but colour.
      if (colorScheme === "dark") axe.withRules(["color-contrast"]);
      const { violations } = await axe.analyze();
      for (const { id, nodes } of violations) {
        found.push(
          `${name} at ${widthPx}, ${colorScheme}: ${id}: ${nodes.map(({ html }) => html.slice(0, 160)).join(" | ")}`,
        );
      }
    }
    for (const { what, where } of await faultsOf(page)) found.push(`${name} at ${widthPx}: ${what}: ${where}`);
  }
  return found;
}

async function visit(tab: Tab, system: PassingSystem, path: string, status = 200): Promise<string[]> {
  const response = await tab.page.goto(`${system.origin}${path}`);
  expect(response?.status(), path).toBe(status);
  await settled(tab.page);
  return look(tab, path);
}

async function enter(system: PassingSystem, subject: string | null): Promise<Tab> {
  const tab = await openTab(browser, { origins: [system.origin, system.idpOrigin] });
  if (subject !== null) await signIn(tab.page, system.origin, subject);
  return tab;
}

async function visitAll(system: PassingSystem, subject: string | null, paths: readonly (string | [string, number])[]) {
  const tab = await enter(system, subject);
  const found: string[] = [];
  for (const each of paths) {
    const [path, status] = typeof each === "string" ? [each, 200] : each;
    found.push(...(await visit(tab, system, path, status)));
  }
  await tab.context.close();
  return [...found, ...tab.problems];
}

async function oneNumber(sql: string): Promise<number> {
  const connection = await connect(demo.migrator);
  try {
    const [row] = await connection.query<{ id: number }[]>(sql);
    return Number(row?.id);
  } finally {
    await connection.end();
  }
}

test(
  "pages that need no sign-in, every sign-in problem and the component page are clean",
  { timeout: 400_000 },
  async () => {
    const problems = ["provider-away", "start-again", "refused", "no-account", "shut-out", "invitation-spent"];
    const found = await visitAll(demo, null, [
      "/",
      "/protection",
      "/login",
      ...problems.map((problem) => `/login?problem=${problem}`),
      "/login?expired=1&returnTo=/uploads",
      ["/no-such-page", 404],
      [`/invitations/${"x".repeat(43)}`, 404],
      "/components",
    ]);
    expect(found).toEqual([]);
  },
);

test(
  "a recorder's pages are clean, with files that are wrong and files that are right",
  { timeout: 400_000 },
  async () => {
    const tab = await enter(demo, "dell.farrow");
    const found: string[] = [];
    const files = [
      ["season-figures", "quillbrook-season-2025-26-with-mistakes.csv"],
      ["calibrations", "quillbrook-calibrations-2026-with-mistakes.csv"],
      ["calibrations", "quillbrook-calibrations-2026.csv"],
      ["season-figures", "quillbrook-season-2025-26.csv"],
    ] as const;
    for (const [kind, file] of files) {
      await tab.page.goto(`${demo.origin}/uploads?kind=${kind}`);
      await settled(tab.page);
      await tab.page.setInputFiles("input[type=file]", join(projectFolder, "data", "demo", "files", file));
      await tab.page.getByRole("button", { name: "Check the file" }).click();
      await tab.page.waitForURL(/\/uploads\/\d+$/);
      found.push(...(await look(tab, file)));
    }
    await tab.page.getByRole("button", { name: /^Accept/ }).click();
    await tab.page.getByText("Accepted: one season in your figures.").waitFor();
    found.push(...(await look(tab, "an accepted file")));
    const truckId = await oneNumber(
      "SELECT MIN(t.id) AS id FROM truck t JOIN town w ON w.id = t.town_id WHERE w.name = 'Quillbrook'",
    );
    for (const path of [
      "/today",
      "/fleet",
      `/fleet/${truckId}`,
      "/season/2025",
      "/season/2024",
      "/uploads",
      "/peers",
      "/workshops",
      "/dataset",
      "/account",
    ]) {
      found.push(...(await visit(tab, demo, path)));
    }
    found.push(...(await visit(tab, demo, "/network", 403)));
    found.push(...(await visit(tab, demo, "/fleet/1", 404)));
    expect([...found, ...tab.problems]).toEqual([]);
  },
);

test(
  "a director's pages are clean, with each kind of peer group and with a table open",
  { timeout: 400_000 },
  async () => {
    const tab = await enter(demo, "maren.oake");
    const found: string[] = [];
    for (const path of [
      "/today",
      "/fleet",
      "/season/2024",
      "/peers",
      "/peers?group=size-50-149",
      "/peers?group=size-under-50",
    ]) {
      found.push(...(await visit(tab, demo, path)));
    }
    await tab.page.goto(`${demo.origin}/peers`);
    await settled(tab.page);
    await tab.page.locator("summary").filter({ hasText: "Table:", visible: true }).first().click();
    found.push(...(await look(tab, "/peers with its table open")));
    expect([...found, ...tab.problems]).toEqual([]);
  },
);

test(
  "a coordinator's pages are clean, with a refused form and two boards on the wall",
  { timeout: 400_000 },
  async () => {
    const tab = await enter(demo, "ilse.tarrant");
    const { page } = tab;
    const found: string[] = [];
    const figureId = await oneNumber(
      "SELECT f.id FROM season_figure f JOIN town w ON w.id = f.town_id WHERE w.name = 'Fallowmere' AND f.season_start_year = 2025",
    );
    for (const path of [
      "/today",
      "/network",
      "/network/review",
      `/network/review/${figureId}`,
      "/network/editions",
      "/network/people?find=quill",
      "/network/mail",
      "/network/audit",
      "/workshops",
      "/dataset",
    ]) {
      found.push(...(await visit(tab, demo, path)));
    }
    await page.goto(`${demo.origin}/network/people`);
    await settled(page);
    await page.getByRole("button", { name: "Send the invitation" }).click();
    found.push(...(await look(tab, "/network/people with a refused form")));
    await page.goto(`${demo.origin}/network/review/${figureId}`);
    await settled(page);
    await page.getByLabel("Question that goes back with it").fill("Why?");
    await page.getByRole("button", { name: "Send it back" }).click();
    await page.getByText("One thing is to be put right").waitFor();
    found.push(...(await look(tab, "a review with a refused question")));

    await page.goto(`${demo.origin}/workshops`);
    await settled(page);
    await page.getByLabel("Title").fill("A look at every page");
    await page.getByLabel("Day").fill("2026-12-10");
    await page.getByRole("button", { name: "Put it on the calendar" }).click();
    await page.waitForURL(/\/workshops\/\d+$/);
    found.push(...(await look(tab, "a workshop without a board")));
    for (const shows of ["rate-at-working-setting|all", "salt-per-event|size-50-149"]) {
      await page.getByLabel("What it shows").selectOption(shows);
      await page.getByLabel("Question to discuss").fill(`What does ${shows} tell us?`);
      await page.getByRole("button", { name: "Add the board" }).click();
      await page.getByRole("cell", { name: `What does ${shows} tell us?` }).waitFor();
    }
    found.push(...(await look(tab, "a workshop with boards")));
    const { pathname } = new URL(page.url());
    for (const path of [`${pathname}/boards/1`, `${pathname}/boards/2`]) found.push(...(await visit(tab, demo, path)));
    expect([...found, ...tab.problems]).toEqual([]);
  },
);

test(
  "an analyst's pages are clean, before and after the terms and with a new token",
  { timeout: 300_000 },
  async () => {
    const tab = await enter(demo, "ruben.vale");
    const { page } = tab;
    const found = [...(await visit(tab, demo, "/today")), ...(await visit(tab, demo, "/dataset"))];
    await page.getByRole("button", { name: "Accept the terms" }).click();
    await page.getByRole("link", { name: "cells (CSV)" }).first().waitFor();
    found.push(...(await look(tab, "the dataset after the terms")));
    await page.goto(`${demo.origin}/dataset/tokens`);
    await settled(page);
    await page.getByLabel("What it is for").fill("A look at every page");
    await page.getByRole("button", { name: "Make the token" }).click();
    await page.getByText("Copy the token now").waitFor();
    found.push(...(await look(tab, "a new token")));
    expect([...found, ...tab.problems]).toEqual([]);
  },
);

test(
  "a network in which nothing has happened yet shows clean empty pages, each saying what belongs there",
  { timeout: 400_000 },
  async () => {
    const found = [
      ...(await visitAll(fresh, "maren.oake", [
        "/today",
        "/fleet",
        "/season/2025",
        "/uploads",
        "/peers",
        "/workshops",
        "/dataset",
      ])),
      ...(await visitAll(fresh, "ilse.tarrant", [
        "/today",
        "/network",
        "/network/review",
        "/network/editions",
        "/network/people",
        "/network/mail",
        "/network/audit",
        "/workshops",
        "/dataset",
      ])),
      ...(await visitAll(fresh, "ruben.vale", ["/today", "/dataset", "/dataset/tokens"])),
    ];
    expect(found).toEqual([]);
  },
);
