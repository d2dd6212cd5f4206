import { spawn } from "node:child_process";
import { existsSync, mkdtempSync, readFileSync, rmSync } from "node:fs";
import { tmpdir } from "node:os";
import { join } from "node:path";
import { setImmediate } from "node:timers/promises";
import { ensureBuild } from "./build.js";
import { sentenceFor } from "./failures.js";
import { assertRoom, assertNodeVersion, ensureChromium, ensureMariadb, ensureNodeModules } from "./install.js";
import { projectFolder } from "./settings.js";
import { checkOutcome, lastLine, vitestOutcome } from "./test-outcome.js";

// Only what Node brings is imported above: on a fresh checkout there is nothing else yet.

const bin = (/** @type {string[]} */ ...path) => join(projectFolder, "node_modules", ...path);
const reactRouter = bin("@react-router", "dev", "bin.js");

/** In this order; a check that fails does not keep the next ones from running. */
const checks = [
  {
    title: "typecheck",
    commands: [
      [reactRouter, "typegen"],
      [bin("typescript", "bin", "tsc"), "-p", "."],
    ],
  },
  { title: "lint", commands: [[bin("eslint", "bin", "eslint.js"), ...scriptArguments("lint")]] },
  {
    title: "deps",
    commands: [[bin("dependency-cruiser", "bin", "dependency-cruise.mjs"), ...scriptArguments("deps")]],
  },
  { title: "unused", commands: [[bin("knip", "bin", "knip.js")]] },
];
const suites = ["unit", "external", "integration", "e2e"];

const say = (/** @type {string} */ line) => console.log(line);
let isStopping = false;
/** @type {import("node:child_process").ChildProcess | null} */
let running = null;
for (const signal of ["SIGINT", "SIGTERM", "SIGHUP"]) {
  process.on(signal, () => {
    isStopping = true;
    // A Ctrl-C reaches the whole group; the others reach this program only.
    if (signal !== "SIGINT") running?.kill("SIGTERM");
  });
}

try {
  assertNodeVersion(process.versions.node);
  assertRoom(projectFolder, existsSync(join(projectFolder, "node_modules")) ? 800 : 2_000);
  ensureNodeModules(projectFolder, say);
  ensureMariadb(say);
  ensureChromium(say);
  await runAll();
} catch (error) {
  await setImmediate();
  console.error(sentenceFor(error) ?? error);
  say(lastLine([{ title: "preparation", passed: 0, failed: 1 }]));
  process.exitCode = 1;
}

async function runAll() {
  const outcomes = [];
  for (const { title, commands } of checks) {
    if (isStopping) break;
    say(`\n── ${title}`);
    let isPassed = true;
    for (const command of commands) isPassed = isPassed && (await run(command)) === 0;
    outcomes.push(checkOutcome(title, isPassed));
  }
  for (const suite of suites) {
    if (isStopping) break;
    say(`\n── ${suite}`);
    outcomes.push(await runSuite(suite));
  }
  say("");
  for (const { title, passed, failed } of outcomes) say(`${title.padEnd(12)} ${passed} passed, ${failed} failed`);
  if (isStopping) say("Stopped before all checks had run.");
  say(lastLine(outcomes));
  const isGood = outcomes.every(({ failed }) => failed === 0) && outcomes.some(({ passed }) => passed > 0);
  process.exitCode = isGood && !isStopping ? 0 : 1;
}

/** @param {string} suite */
async function runSuite(suite) {
  const folder = mkdtempSync(join(tmpdir(), "commonweigh-test-"));
  const report = join(folder, "report.json");
  try {
    if (suite === "integration" || suite === "e2e") ensureBuild(projectFolder, say);
    const vitest = bin("vitest", "vitest.mjs");
    const reporters = ["--reporter=default", "--reporter=json", `--outputFile.json=${report}`];
    const status = await run([vitest, "run", "--project", suite, ...reporters]);
    return vitestOutcome(suite, existsSync(report) ? JSON.parse(readFileSync(report, "utf8")) : null, status);
  } catch (error) {
    console.error(sentenceFor(error) ?? error);
    return checkOutcome(suite, false);
  } finally {
    rmSync(folder, { recursive: true, force: true });
  }
}

/** @param {string[]} command a script for Node and its arguments @returns {Promise<number>} its exit status */
function run(command) {
  return new Promise((resolve) => {
    running = spawn(process.execPath, command, { cwd: projectFolder, stdio: ["ignore", "inherit", "inherit"] });
    running.once("error", () => resolve(1));
    running.once("exit", (status) => resolve(status ?? 1));
  });
}

/** The arguments of a package.json script, so that they stand in one place only. @param {string} name */
function scriptArguments(name) {
  const { scripts } = JSON.parse(readFileSync(join(projectFolder, "package.json"), "utf8"));
  return scripts[name].split(" ").slice(1);
}
