import AxeBuilder from "@axe-core/playwright";
import type { Browser, BrowserContext, Page } from "playwright-core";
import { expect, inject } from "vitest";
import { connect } from "#scripts/migrate.js";
import { signIn } from "#tests/support/factories.ts";

/** The running system's database, for what a test looks up by itself. */
export async function systemDatabase() {
  return connect(inject("wholeSystem").migrator);
}
export type Database = Awaited<ReturnType<typeof systemDatabase>>;

export type Phone = { context: BrowserContext; page: Page; faults: string[] };

/** A phone of 360 × 740 on which one of the demo people is signed in. `faults` gathers what its console complains of. */
export async function aPhone(browser: Browser, db: Database, personName: string): Promise<Phone> {
  const { origin } = inject("wholeSystem");
  const context = await browser.newContext({
    viewport: { width: 360, height: 740 },
    deviceScaleFactor: 2,
    hasTouch: true,
    baseURL: origin,
  });
  await signInOn(context, db, personName);
  const page = await context.newPage();
  const faults: string[] = [];
  page.on("pageerror", (error) => faults.push(error.message));
  page.on("console", (message) => {
    // A browser reports each request that failed for want of signal; that is what these tests are about.
    if (message.type() === "error" && !message.text().includes("net::ERR_INTERNET_DISCONNECTED")) {
      faults.push(message.text());
    }
  });
  return { context, page, faults };
}

/** Sign somebody in on a phone, in place of whoever was. */
export async function signInOn(context: BrowserContext, db: Database, personName: string) {
  const { origin } = inject("wholeSystem");
  const [person] = await db.query<{ id: number }[]>("SELECT id FROM user_account WHERE name = ?", [personName]);
  if (!person) throw new Error(`Nobody is called ${personName}.`);
  const [name, value] = (await signIn({ db, issuer: "" }, person)).split("=");
  await context.addCookies([{ name: name ?? "", value: value ?? "", url: origin }]);
}

/** Wait until the phone has kept the worksheet's program, and reload once so that it is in charge. */
export async function keepProgramOn(page: Page) {
  await page.goto("/fleet/worksheets");
  await page.evaluate(() => navigator.serviceWorker.ready);
}

/** axe finds nothing on the page as it stands. */
export async function expectNoAxeFindings(page: Page, where: string) {
  const { violations } = await new AxeBuilder({ page }).analyze();
  const found = violations.map(({ id, nodes }) => `${id}: ${nodes.map(({ html }) => html.slice(0, 160)).join(" | ")}`);
  expect(found, where).toEqual([]);
}
