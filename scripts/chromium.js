import { chromium } from "playwright-core";
import { Failure } from "./failures.js";
import { findProgram } from "./install.js";

const flags = [
  "--headless",
  "--no-sandbox",
  "--disable-gpu",
  "--disable-quic",
  "--no-first-run",
  "--disable-background-networking",
  "--disable-component-update",
  "--disable-sync",
  "--force-color-profile=srgb",
];

/**
 * The machine's own Chromium without a window, asking nothing of other hosts by itself.
 *
 * @returns {Promise<import("playwright-core").Browser>}
 * @throws {Failure} when there is none
 */
export async function launchChromium() {
  const executablePath = findProgram("chromium");
  if (executablePath === null) {
    throw new Failure("Chromium is not installed. Run: apt-get install -y --no-install-recommends chromium");
  }
  return chromium.launch({ executablePath, args: flags });
}
