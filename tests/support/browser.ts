import type { Browser, BrowserContext, Page } from "playwright-core";
import { launchChromium } from "#scripts/chromium.js";

export type Tab = {
  page: Page;
  context: BrowserContext;
  /** What no page may ever do: an error in the console, an exception, a request to another origin. */
  problems: string[];
};

type Options = {
  /** Origins a page may speak to; the first is the application's. */
  origins: readonly string[];
  widthPx?: number;
  heightPx?: number;
  hasScript?: boolean;
};

/** Pages in which no frame is ever asked for, so that waiting for one would not end. */
const withoutScript = new WeakSet<Page>();

/** One Chromium for a test file. */
export async function openBrowser(): Promise<Browser> {
  return launchChromium();
}

/**
 * A tab with cookies of its own that keeps account of what no page may do.
 *
 * A console line about a status of 400, 403, 404, 409 or 413 is the browser's own report of an answer that a test asks
 * for on purpose; a page that answers so without being asked fails its test by what it shows.
 */
export async function openTab(browser: Browser, options: Options): Promise<Tab> {
  const { origins, widthPx = 1280, heightPx = widthPx < 500 ? 740 : 900, hasScript = true } = options;
  const context = await browser.newContext({
    viewport: { width: widthPx, height: heightPx },
    javaScriptEnabled: hasScript,
    locale: "en-GB",
    timezoneId: "UTC",
  });
  const page = await context.newPage();
  page.setDefaultTimeout(20_000);
  if (!hasScript) withoutScript.add(page);
  const problems: string[] = [];
  page.on("console", (message) => {
    const isAsked = /^Failed to load resource: the server responded with a status of 4\d\d /.test(message.text());
    if (message.type() === "error" && !isAsked) problems.push(`console: ${message.text()}`);
  });
  page.on("pageerror", (error) => problems.push(`exception: ${error.message}`));
  page.on("request", (request) => {
    const url = new URL(request.url());
    if (url.protocol !== "data:" && !origins.includes(url.origin)) problems.push(`request to ${url.origin}`);
  });
  return { page, context, problems };
}

/** Sign in by link, through the identity provider, and arrive on Today or where the link was to lead. */
export async function signIn(page: Page, origin: string, subject: string, returnTo = "/today"): Promise<void> {
  await page.goto(`${origin}/auth/start?${new URLSearchParams({ hint: subject, returnTo })}`);
  await page.waitForURL(`${origin}${returnTo}`);
  await settled(page);
}

declare global {
  // Adding to a declaration of the platform takes an interface.
  // eslint-disable-next-line @typescript-eslint/consistent-type-definitions
  interface Window {
    /** The framework's router, where scripts have taken over. */
    __reactRouterDataRouter?: { state: { navigation: { state: string } } };
  }
}

/** Wait until a page is at rest: its scripts have taken over, and what was asked for has come. */
export async function settled(page: Page): Promise<void> {
  await page.waitForLoadState("networkidle");
  if (withoutScript.has(page)) return;
  await page.waitForFunction(() => (window.__reactRouterDataRouter?.state.navigation.state ?? "idle") === "idle");
  await page.evaluate(async () => {
    await document.fonts.ready;
    await new Promise((resolve) => requestAnimationFrame(() => requestAnimationFrame(resolve)));
  });
}
