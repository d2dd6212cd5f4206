import AxeBuilder from "@axe-core/playwright";
import type { Browser, Page } from "playwright-core";
import { afterAll, beforeAll, expect, test } from "vitest";
import { connect } from "#scripts/migrate.js";
import { type PassingSystem, startPassingSystem } from "#scripts/passing-system.js";
import { openBrowser, openTab, settled, signIn, type Tab } from "#tests/support/browser.ts";

// A season by hand, on real parts: typed and pasted storms, the piles, the return, the review by field, and the mail.

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

async function enter(subject: string, widthPx = 1280): Promise<Page> {
  const tab = await openTab(browser, { origins: [system.origin, system.idpOrigin], widthPx });
  tabs.push(tab);
  await signIn(tab.page, system.origin, subject);
  return tab.page;
}

async function go(page: Page, path: string) {
  const response = await page.goto(`${system.origin}${path}`);
  expect(response?.status(), path).toBe(200);
  await settled(page);
}

async function send(page: Page, name: string | RegExp) {
  const answered = page.waitForResponse((response) => response.request().method() === "POST");
  await page.getByRole("button", { name }).click();
  await answered;
  await settled(page);
}

const title = (page: Page) => page.locator("h1").innerText();

type Mail = { to: string; subject: string; text: string };

async function mailTo(address: RegExp, subject: RegExp): Promise<Mail> {
  for (const deadline = Date.now() + 60_000; Date.now() < deadline;) {
    const mails = (await (await fetch(`${system.mailOrigin}/mails.json`)).json()) as Mail[];
    const found = mails.findLast((mail) => address.test(mail.to) && subject.test(mail.subject));
    if (found) return found;
    await new Promise((resolve) => setTimeout(resolve, 300));
  }
  throw new Error(`No mail to ${String(address)} about ${String(subject)} has come.`);
}

async function paste(page: Page, cell: string, text: string) {
  await page.getByLabel(cell).focus();
  await page.evaluate((block) => {
    const clipboardData = new DataTransfer();
    clipboardData.setData("text/plain", block);
    document.activeElement?.dispatchEvent(
      new ClipboardEvent("paste", { clipboardData, bubbles: true, cancelable: true }),
    );
  }, text);
}

async function press(page: Page, ...keys: string[]) {
  for (const key of keys) await page.keyboard.press(key);
}

const focused = (page: Page) => page.evaluate(() => document.activeElement?.getAttribute("aria-label"));
const storedStorms = (page: Page) => page.locator("tbody a", { hasText: "Open" }).count();

/** 25 storms of 23.2 tons of salt and 5.8 of mix each, as a spreadsheet copies them; the eighth with a word we do not know. */
function block() {
  return Array.from({ length: 25 }, (_, place) => {
    const day = `${place < 20 ? 1 : 2}/${place < 20 ? place + 5 : place - 15}/2026`;
    const kind = place === 7 ? "hail" : place % 3 === 0 ? "Freezing rain" : "snow";
    return [`${day} 4:00 AM`, `${day} 9:30 AM`, kind, "24", "2", "230.5", "12", "23.2", "5.8", "", "north", ""].join(
      "\t",
    );
  }).join("\n");
}

test("a season is typed and pasted, reconciled, filled, sent, returned by field, corrected and accepted", async () => {
  const recorder = await enter("dell.farrow");
  await go(recorder, "/season/2025/storms");
  expect(await title(recorder)).toBe("No storm of 2025–26 is in the log yet.");

  // The first line with the keyboard alone.
  await recorder.getByLabel("start, line 1").focus();
  await recorder.keyboard.type("12/2 10:00 pm");
  await press(recorder, "Tab");
  await recorder.keyboard.type("12/3 6:30 am");
  await press(recorder, "ArrowRight");
  await recorder.keyboard.type("snow");
  await press(recorder, "Enter");
  expect(await focused(recorder)).toBe("kind, line 2");
  await press(recorder, "ArrowUp", "Tab");
  expect(await focused(recorder)).toBe("pavement, °F, line 1");
  await recorder.getByLabel("salt, tons, line 1").fill("10");

  await paste(recorder, "start, line 2", block());
  await recorder.getByText("26 lines are not stored yet.").waitFor();
  await press(recorder, "Control+s");
  await recorder.getByText("25 lines stored, one needs a look.").waitFor();
  expect(await storedStorms(recorder)).toBe(25);
  await recorder.getByText(/kind: Say what it was/).waitFor();

  // What is not stored outlives a reload, and the line is put right in place.
  await recorder.reload();
  await settled(recorder);
  await recorder.getByText("One line is back that had not been stored.").waitFor();
  const wrong = recorder.locator('input[aria-label^="kind, line"]');
  const texts = await wrong.evaluateAll((cells) => cells.map((cell) => (cell as HTMLInputElement).value));
  await wrong.nth(texts.indexOf("hail")).fill("sleet");
  await recorder.getByRole("button", { name: "Save one line" }).click();
  await recorder.getByText("One line is stored.").waitFor();
  await settled(recorder);
  expect(await storedStorms(recorder)).toBe(26);
  await go(recorder, "/season/2025/storms");
  expect(await title(recorder)).toBe("26 storms in 2025–26 took 590.0 tons of salt.");

  // The piles: 604 tons left, 590 are logged.
  await go(recorder, "/season/2025/stock");
  expect(await title(recorder)).toBe(
    "In 2025–26, 604.0 tons of salt left the pile; the storm log explains all but 2.3 %.",
  );
  await recorder.getByLabel("Material").selectOption({ label: "Salt" });
  await recorder.getByLabel("What happened").selectOption({ label: "delivery" });
  await recorder.getByLabel("Day").fill("2026-03-20");
  await recorder.getByLabel("Quantity").fill("10");
  await recorder.getByLabel("In", { exact: true }).selectOption({ label: "cubic yards" });
  await recorder.getByLabel("A cubic yard weighs").fill("2000");
  await send(recorder, "Write it down");
  expect(await title(recorder)).toContain("614.0 tons of salt left the pile");
  await send(recorder, "Remove delivery of 20 Mar 2026");
  expect(await title(recorder)).toContain("604.0 tons of salt left the pile");

  await go(recorder, "/season/2025/figures");
  await recorder.getByRole("link", { name: "Fill from storms and stock" }).click();
  await recorder.getByText("Taken over from storms and stock.").waitFor();
  expect(await recorder.getByLabel("Salt", { exact: true }).inputValue()).toBe("604");
  expect(await recorder.getByLabel("Events").inputValue()).toBe("26");
  await send(recorder, "Save the figures");
  // 604 tons and a fifth of 147.9 on 118 lane miles in 26 events.
  expect(await title(recorder)).toBe(
    "In 2025–26 you used 5.4 tons of salt on each lane mile, 413 lb in each of 26 events.",
  );
  expect(await recorder.getByRole("button", { name: /^Send/ }).count()).toBe(0);

  const director = await enter("maren.oake");
  await go(director, "/season/2025");
  await send(director, "Send 2025–26 in");
  expect(await director.locator("main").innerText()).toContain("Nothing changes until then");
  await go(recorder, "/season/2025/storms");
  expect(await recorder.locator("main").innerText()).toContain("has been sent in, so nothing in it changes");
  expect((await mailTo(/ilse\.tarrant/, /Quillbrook has sent in/)).text).toContain("/network/review/");

  const coordinator = await enter("ilse.tarrant");
  await go(coordinator, "/network/review");
  await coordinator.getByRole("link", { name: "Quillbrook" }).click();
  await coordinator.waitForURL(/\/network\/review\/\d+$/);
  await settled(coordinator);
  const review = new URL(coordinator.url()).pathname;
  await coordinator.getByLabel("Question that goes back with it").fill("One figure, please look again.");
  await coordinator.getByText("Notes on other fields").click();
  await coordinator.getByLabel(/^Note on salt, tons/).fill("Is the south yard in this?");
  await send(coordinator, "Send it back");
  const returned = await mailTo(/maren\.oake/, /comes back with a question/);
  expect(returned.text).toContain("Salt, tons: Is the south yard in this?");

  await go(director, "/season/2025");
  expect(await director.locator("main").innerText()).toContain("You sent 604.0; it has not been changed.");
  await go(director, "/season/2025/figures");
  await director.getByText("The coordinator asks: Is the south yard in this?").waitFor();
  await director.getByLabel("Salt", { exact: true }).fill("612.5");
  await send(director, "Save the figures");
  expect(await director.locator("main").innerText()).toContain("You sent 604.0; it is 612.5 now.");
  await send(director, "Send 2025–26 in");

  await go(coordinator, review);
  expect(await coordinator.locator("main").innerText()).toContain("Salt, tons from 604.0 to 612.5");
  await coordinator.getByLabel("Ask without sending it back").fill("Was the yard weighed?");
  await send(coordinator, /^Ask/);
  await mailTo(/maren\.oake/, /A question about 2025–26/);
  await go(director, "/season/2025");
  await director.getByLabel("Answer").fill("Yes, on 20 May.");
  await send(director, "Send the answer");
  await mailTo(/ilse\.tarrant/, /Quillbrook answers/);
  await go(coordinator, review);
  expect(await coordinator.locator("main").innerText()).toContain("Yes, on 20 May.");
  await send(coordinator, /^Accept it as it is/);
  await mailTo(/maren\.oake/, /is accepted/);
  await go(director, "/season/2025");
  expect(await director.locator("main").innerText()).toContain("Accepted");
  expect(tabs.flatMap(({ problems }) => problems)).toEqual([]);
});

test("the worker fetches a season from the weather service, and the winter comes to the same points as before", async () => {
  const director = await enter("maren.oake");
  await go(director, "/season/2025/winter");
  const before = await title(director);
  expect(before).toMatch(/^The winter of 2025–26 was \w+ \(W\d\): [\d,]+ points\.$/);

  const database = await connect(system.migrator);
  const fetchedDays = async () => {
    const [{ count }] = await database.query<[{ count: number }]>(
      `SELECT COUNT(*) AS count FROM weather_day d JOIN station s ON s.id = d.station_id
        WHERE s.name = 'Tarn Head Weir' AND d.fetched_at > '2026-07-02 06:00:00'`,
    );
    return count;
  };
  expect(await fetchedDays()).toBe(0);
  const coordinator = await enter("ilse.tarrant");
  await go(coordinator, "/network/stations?season=2025");
  await send(coordinator, "Fetch the weather of Tarn Head Weir");
  await expect.poll(fetchedDays, { timeout: 40_000, interval: 500 }).toBe(273);
  await database.end();
  await go(director, "/season/2025/winter");
  expect(await title(director)).toBe(before);
});

const townPages = ["", "/figures", "/storms", "/storms/new", "/stock", "/winter"].map((page) => `/season/2024${page}`);
const openPages = ["/season/2026/figures", "/season/2026/storms", "/season/2026/storms/new", "/season/2026/stock"];

test.each([
  [
    "maren.oake",
    1280,
    [
      ...townPages.filter((page) => !page.endsWith("new")),
      ...openPages,
      "/season/roads",
      "/season/materials",
      "/account",
    ],
  ],
  [
    "maren.oake",
    360,
    [...townPages.filter((page) => !page.endsWith("new")), ...openPages, "/season/roads", "/season/materials"],
  ],
  ["ilse.tarrant", 1280, ["/network/review", "/network/seasons", "/network/stations"]],
  ["ilse.tarrant", 360, ["/network/review", "/network/seasons", "/network/stations"]],
])(
  "axe finds nothing on the pages of %s at %d px, and none is wider than its screen",
  async (subject, widthPx, pages) => {
    const page = await enter(subject, widthPx);
    for (const path of pages) {
      await go(page, path);
      const { violations } = await new AxeBuilder({ page: page as never }).analyze();
      expect(
        violations.map(({ id, nodes }) => `${path} ${id}: ${nodes.map(({ html }) => html.slice(0, 160)).join(" | ")}`),
      ).toEqual([]);
      const overflow = await page.evaluate(
        () => document.documentElement.scrollWidth - document.documentElement.clientWidth,
      );
      expect(overflow, path).toBeLessThanOrEqual(0);
    }
    expect(tabs.flatMap(({ problems }) => problems)).toEqual([]);
  },
);
