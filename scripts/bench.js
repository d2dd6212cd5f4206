import { spawn } from "node:child_process";
import { mkdirSync, writeFileSync } from "node:fs";
import { cpus } from "node:os";
import { join } from "node:path";
import { domainTimes } from "./bench/domain.js";
import { pageRates } from "./bench/pages.js";
import { worksheetCosts } from "./bench/worksheet.js";
import { Failure, sentenceFor } from "./failures.js";
import { startPassingSystem } from "./passing-system.js";
import { freePorts } from "./ports.js";
import { plainEnvironment, projectFolder } from "./settings.js";

/*
 * How fast it is, in ratios against bare baselines measured in the same run: npm run bench
 * What stands in data/bench-result.json is replaced with:                    npm run bench -- --keep
 */

const limits = {
  /** A Peers page, against the least page that the same server can render. */
  leastPeersPerBare: 0.35,
  /** An edition of the 65 demo towns with names, protection, places and row file, against its quantiles bare: far off is a slip. */
  mostEditionPerQuantiles: 100,
  /** Reading 50,000 rows by column name, against the bare parser. */
  mostCsvPerParser: 3,
  mostWarmStartSeconds: 10,
  /** Compressed script of the worksheet's first load. */
  mostWorksheetScriptKb: 150,
  /** At a processor slowed down four times. */
  mostWorksheetTapMs: 100,
};

try {
  await main();
} catch (error) {
  console.error(sentenceFor(error) ?? error);
  process.exitCode = 1;
}

async function main() {
  const say = (/** @type {string} */ line) => console.log(line);
  say("Starting a network with the demo …");
  const system = await startPassingSystem({ logLevel: "warn", say });
  let pages;
  let worksheet;
  try {
    pages = await pageRates({ system, say });
    say("Tapping through the worksheet …");
    worksheet = await worksheetCosts(system);
  } finally {
    await system.stop();
  }
  say("Timing the domain …");
  const domain = await domainTimes();
  say("Starting npm start twice …");
  await timeStart();
  const warmStartSeconds = await timeStart();

  const ratios = { ...pages.ratios, ...domain.ratios };
  const measured = { ...pages, ...worksheet, ...domain, ratios, warmStartSeconds };
  const misses = missed(measured);
  const result = {
    measuredOn: new Date().toISOString().slice(0, 10),
    machine: { node: process.version, cores: cpus().length, processor: cpus()[0]?.model ?? "unknown" },
    ...measured,
    limits,
    misses,
  };
  const text = `${JSON.stringify(result, null, 2)}\n`;
  mkdirSync(join(projectFolder, "bench"), { recursive: true });
  writeFileSync(join(projectFolder, "bench", "latest.json"), text);
  // Only a run that keeps every limit is worth keeping.
  if (process.argv.includes("--keep") && misses.length === 0)
    writeFileSync(join(projectFolder, "data", "bench-result.json"), text);
  say(text);
  for (const miss of misses) console.error(miss);
  process.exitCode = misses.length === 0 ? 0 : 1;
}

function missed({ ratios, warmStartSeconds, failedRequests, worksheetScriptKb, worksheetSlowestTapMs }) {
  return [
    ...(failedRequests === 0 ? [] : [`${failedRequests} requests were not answered as they should be.`]),
    ...["peersPerBare", "peersOfGroupPerBare"]
      .filter((name) => !(ratios[name] >= limits.leastPeersPerBare))
      .map((name) => `${name} is ${ratios[name]}, under ${limits.leastPeersPerBare}.`),
    ...(ratios.editionPerQuantiles > limits.mostEditionPerQuantiles
      ? [`editionPerQuantiles is ${ratios.editionPerQuantiles}, over ${limits.mostEditionPerQuantiles}.`]
      : []),
    ...(ratios.csvPerParser > limits.mostCsvPerParser
      ? [`csvPerParser is ${ratios.csvPerParser}, over ${limits.mostCsvPerParser}.`]
      : []),
    ...(worksheetScriptKb > 0 && worksheetScriptKb < limits.mostWorksheetScriptKb
      ? []
      : [`The worksheet loads ${worksheetScriptKb} kB of script, over ${limits.mostWorksheetScriptKb}.`]),
    ...(worksheetSlowestTapMs > limits.mostWorksheetTapMs
      ? [`A tap on the worksheet takes ${worksheetSlowestTapMs} ms, over ${limits.mostWorksheetTapMs}.`]
      : []),
    ...(warmStartSeconds > limits.mostWarmStartSeconds
      ? [`A warm start takes ${warmStartSeconds} s, over ${limits.mostWarmStartSeconds}.`]
      : []),
  ];
}

/** Start as `npm start` does, wait for its box, stop it. @returns {Promise<number>} seconds until the box stood there */
async function timeStart() {
  const ports = await freePorts();
  const startedAt = performance.now();
  const child = spawn(process.execPath, [join(projectFolder, "scripts", "start.js")], {
    cwd: projectFolder,
    env: { ...plainEnvironment(), PORT: String(ports.app) },
    stdio: ["ignore", "pipe", "pipe"],
  });
  let words = "";
  const ended = new Promise((resolve) => child.once("exit", resolve));
  const isUp = await new Promise((resolve) => {
    child.stdout.on("data", (data) => {
      words += data;
      if (words.includes("Stop: Ctrl-C")) resolve(true);
    });
    child.stderr.on("data", (data) => (words += data));
    child.once("exit", () => resolve(false));
  });
  const seconds = Number(((performance.now() - startedAt) / 1000).toFixed(2));
  if (!isUp) throw new Failure(`npm start does not come up. It says:\n${words.trim()}`);
  child.kill("SIGINT");
  await ended;
  return seconds;
}
