import { mkdirSync, rmSync, writeFileSync } from "node:fs";
import { join } from "node:path";
import { launchChromium } from "./chromium.js";
import { startPassingSystem } from "./passing-system.js";
import { projectFolder } from "./settings.js";
import { readmeStops, walk } from "./tour/walk.js";

/*
 * Pictures of every page, wide and narrow, light, dark and on paper: npm run tour
 * The three pictures of the README alone, small enough to keep:      npm run tour -- --readme
 */

const isForReadme = process.argv.includes("--readme");
const folder = isForReadme ? join(projectFolder, "data", "pictures") : join(projectFolder, "tests", "e2e", "pictures");
const widthsPx = [1280, 360];
const schemes = /** @type {const} */ (["light", "dark"]);

const system = await startPassingSystem({ logLevel: "warn" });
const browser = await launchChromium();
let pictureCount = 0;
try {
  if (!isForReadme) rmSync(folder, { recursive: true, force: true });
  mkdirSync(folder, { recursive: true });
  await walk({ system, browser, stop: isForReadme ? takeReadmePicture : takePictures });
  console.log(`${pictureCount} pictures are in ${folder}`);
} finally {
  await browser.close();
  await system.stop();
}

/**
 * Every picture of one stop.
 *
 * @param {string} name
 * @param {import("playwright-core").Page} page
 */
async function takePictures(name, page) {
  for (const width of widthsPx) {
    await page.emulateMedia({ media: "screen" });
    await showWholePage(page, width);
    for (const colorScheme of schemes) {
      await page.emulateMedia({ colorScheme, media: "screen" });
      await settle(page);
      await page.screenshot({ path: join(folder, `${name}-${width}-${colorScheme}.png`) });
      pictureCount += 1;
    }
  }
  // A dark screen must still print black on white. The width is a Letter sheet's between its margins.
  await page.emulateMedia({ colorScheme: "dark", media: "print" });
  await page.setViewportSize({ width: 701, height: 900 });
  await settle(page);
  await page.screenshot({ path: join(folder, `${name}-print.png`), fullPage: true });
  await page.setViewportSize({ width: 1280, height: 900 });
  await page.emulateMedia({ colorScheme: "light", media: "print" });
  await settle(page);
  writeFileSync(join(folder, `${name}.pdf`), await page.pdf({ format: "Letter", preferCSSPageSize: true }));
  await page.emulateMedia({ media: "screen", colorScheme: "light" });
  pictureCount += 2;
}

/**
 * The picture of a stop that the README shows, as high as its page is long, up to a limit.
 *
 * @param {string} name
 * @param {import("playwright-core").Page} page
 */
async function takeReadmePicture(name, page) {
  const stop = readmeStops[name];
  if (stop === undefined) return;
  await page.setViewportSize({ width: 1280, height: stop.heightPx });
  await settle(page);
  await page.screenshot({ path: join(folder, `${stop.file}.png`) });
  await page.setViewportSize({ width: 1280, height: 900 });
  pictureCount += 1;
}

/**
 * A window as high as the page: what stays at the foot of the window then stands at the foot of the picture.
 *
 * @param {import("playwright-core").Page} page
 * @param {number} width in px
 */
async function showWholePage(page, width) {
  const leastHeight = width < 500 ? 740 : 720;
  await page.setViewportSize({ width, height: leastHeight });
  await settle(page);
  const height = await page.evaluate(() => document.documentElement.scrollHeight);
  await page.setViewportSize({ width, height: Math.min(Math.max(height, leastHeight), 12_000) });
}

/** @param {import("playwright-core").Page} page */
async function settle(page) {
  await page.waitForLoadState("networkidle");
  await page.evaluate(async () => {
    await document.fonts.ready;
    await new Promise((resolve) => window.requestAnimationFrame(() => window.requestAnimationFrame(resolve)));
  });
}
