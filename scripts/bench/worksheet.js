import { launchChromium } from "../chromium.js";

const slowdown = 4;
const passCount = 3;

/** A new person's first opening of the page: every script as it came over the wire, headers not counted. */
async function firstLoadBytes(context, address) {
  const page = await context.newPage();
  const session = await context.newCDPSession(page);
  const scripts = new Map();
  let bytes = 0;
  await session.send("Network.enable");
  await session.send("Network.setCacheDisabled", { cacheDisabled: true });
  // The worker fetches the same files again for its own store, when the page is already in use.
  await session.send("Network.setBypassServiceWorker", { bypass: true });
  session.on("Network.responseReceived", ({ requestId, response }) => {
    if (/\.js$/.test(new URL(response.url).pathname)) scripts.set(requestId, response);
  });
  session.on("Network.dataReceived", ({ requestId, encodedDataLength }) => {
    if (scripts.has(requestId)) bytes += encodedDataLength;
  });
  await page.goto(address, { waitUntil: "networkidle" });
  const encodings = [...new Set([...scripts.values()].map(({ headers }) => headers["Content-Encoding"] ?? "none"))];
  await page.close();
  return { bytes, count: scripts.size, encodings };
}

/** From the finger to the next frame, as the browser measures it; what is under 16 ms it does not report. */
async function watchTaps(page) {
  await page.evaluate(() => {
    window.taps = [];
    new window.PerformanceObserver((list) => {
      for (const { name, duration } of list.getEntries()) {
        if (["pointerdown", "pointerup", "click", "keydown"].includes(name)) window.taps.push(duration);
      }
    }).observe({ type: "event", durationThreshold: 16, buffered: true });
  });
}

async function tapThrough(page, origin) {
  const slowest = [];
  const step = async (name, taps) => {
    await page.evaluate(() => (window.taps = []));
    await taps();
    await page.waitForTimeout(400);
    slowest.push({ name, ms: await page.evaluate(() => Math.max(0, ...window.taps)) });
  };
  const key = (name) => page.getByRole("button", { name });
  await page.goto(`${origin}/fleet/worksheets/new`);
  await page.getByLabel("Truck").selectOption({ index: 1 });
  await page.getByLabel("Material").selectOption({ label: "Salt" });
  await key("Begin").tap();
  await page.waitForURL(/worksheets\/[0-9a-f-]{36}/);
  await page.getByRole("heading", { name: /You calibrate/ }).waitFor();
  await watchTaps(page);
  await step("a tap on nothing, for comparison", () => page.getByRole("heading", { name: /You calibrate/ }).tap());
  await step("to the cautions", () => key("Go on to the cautions").tap());
  await step("ticking", async () => {
    await page.getByLabel("we may count").tap();
    await page.getByLabel("we may catch").tap();
  });
  await step("to the gate", () => key("Go on to the gate").tap());
  await page.getByLabel("Measured opening").fill("1 7/8");
  await step("to the counts", () => key("Count the turns").tap());
  await step("starting the clock", () => key(/Start the clock/).tap());
  await step("turns on the pad", async () => {
    for (let turn = 0; turn < 24; turn++) await key(/^Turn/).tap();
  });
  await page.waitForTimeout(5000);
  await step("stopping and keeping", async () => {
    await key("Stop here").tap();
    await key(/^Keep/).tap();
  });
  await page.getByLabel("Count 1, turns").fill("6.25");
  await page.getByLabel("Count 1, seconds").fill("60");
  for (let setting = 2; setting <= 8; setting++) {
    await step(`adding setting ${setting}`, () => key(`Type setting ${setting}`).tap());
    await page.getByLabel(`Count ${setting}, turns`).fill(String(5 + 4 * setting));
  }
  await step("to the catches", () => key("Catch and weigh").tap());
  for (let place = 1; place <= 3; place++) {
    await step(`adding catch ${place}`, () => key(/^Weigh catch/).tap());
    await page.getByLabel(`Catch ${place}, gross weight in lb`).fill(`1${place + 3}.2`);
  }
  await step("to the rates", () => key("See the rates").tap());
  await step("opening every speed", () => page.getByText("Every speed from 5 to 45 mph").first().tap());
  await step("to the decision", () => key("Decide on the gate").tap());
  await step("to the card", () => key("See the card").tap());
  await step("finishing", () => key("Finish the sheet").tap());
  return slowest;
}

/** Of each step, the middle one of its times. @param {{ name: string, ms: number }[][]} passes */
function middlePass(passes) {
  return (passes[0] ?? []).map(({ name }, place) => {
    const times = passes.map((taps) => taps[place]?.ms ?? 0).sort((a, b) => a - b);
    return { name, ms: times[Math.floor(times.length / 2)] ?? 0 };
  });
}

/**
 * The worksheet on a slow phone: what it loads first, and how soon it answers a tap.
 *
 * @param {import("../passing-system.js").PassingSystem} system
 * @returns {Promise<{ worksheetScriptKb: number, worksheetSlowestTapMs: number, worksheetSlowestTap: string }>}
 */
export async function worksheetCosts({ origin }) {
  const browser = await launchChromium();
  try {
    const context = await browser.newContext({ viewport: { width: 360, height: 740 }, hasTouch: true });
    const page = await context.newPage();
    await page.goto(`${origin}/auth/start?hint=dell.farrow`);
    await page.waitForURL(/\/today$/);
    const { bytes } = await firstLoadBytes(context, `${origin}/fleet/worksheets/new`);
    const session = await context.newCDPSession(page);
    await session.send("Emulation.setCPUThrottlingRate", { rate: slowdown });
    // Something else on the machine may hold up one pass: the middle one of three speaks for the page.
    const passes = [];
    for (let pass = 0; pass < passCount; pass++) passes.push(await tapThrough(page, origin));
    const worst = middlePass(passes).reduce((a, b) => (b.ms > a.ms ? b : a));
    return {
      worksheetScriptKb: Math.round(bytes / 100) / 10,
      worksheetSlowestTapMs: worst.ms,
      worksheetSlowestTap: worst.name,
    };
  } finally {
    await browser.close();
  }
}
