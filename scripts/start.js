/* global AbortController */
import { existsSync, readFileSync, rmSync, writeFileSync } from "node:fs";
import { join } from "node:path";
import { setImmediate } from "node:timers/promises";
import { box, welcomeLines } from "./box.js";
import { ensureBuild } from "./build.js";
import { Failure, sentenceFor } from "./failures.js";
import { assertRoom, assertNodeVersion, ensureMariadb, ensureNodeModules } from "./install.js";
import { startMariadb } from "./mariadb.js";
import { assertPortsFree, portsFrom } from "./ports.js";
import { loadSettings, privateFolder, projectFolder } from "./settings.js";

// Only what Node brings is imported above: on a fresh checkout there is nothing else yet.

const isEmpty = process.argv.includes("--empty");
const devPages = process.argv.includes("--dev");
const pidFile = join(privateFolder, "launcher.pid");
const stopping = new AbortController();
/** What to stop at the end, last started first. @type {(() => Promise<void>)[]} */
const started = [];

const say = (/** @type {string} */ line) => console.log(line);

for (const signal of ["SIGINT", "SIGTERM", "SIGHUP"]) {
  process.on(signal, () => {
    if (!stopping.signal.aborted) say("\nStopping …");
    stopping.abort();
  });
}

try {
  await main();
} catch (error) {
  // A Ctrl-C that fell into a step which blocks is only heard now; what broke off then was broken off on purpose.
  await setImmediate();
  if (!stopping.signal.aborted) {
    const sentence = sentenceFor(error);
    console.error(sentence === null ? error : `\n${sentence}`);
    process.exitCode = 1;
  }
}
for (const stop of started.reverse()) await stop();

async function main() {
  const ports = portsFrom(process.env.PORT);
  assertNodeVersion(process.versions.node);
  assertRoom(projectFolder, existsSync(join(projectFolder, "node_modules")) ? 400 : 1_500);
  const settings = loadSettings(privateFolder);
  claimFolder();
  await assertPortsFree(ports);
  ensureNodeModules(projectFolder, say);
  ensureMariadb(say);
  goOn();

  const mariadb = await startMariadb({ folder: join(privateFolder, "db") });
  started.push(mariadb.stop);
  goOn();

  const database = isEmpty ? "commonweigh_own" : "commonweigh_demo";
  const issuer = `http://127.0.0.1:${ports.idp}`;
  const { readyDatabase, followIssuer, loadDemoIfEmpty, inviteFirstCoordinator } = await import("./database.js");
  let token = null;
  await readyDatabase({
    mariadb,
    database,
    settings,
    then: async (connection) => {
      await followIssuer(connection, issuer);
      if (isEmpty) token = await inviteFirstCoordinator(connection);
      else if (await loadDemoIfEmpty(connection, issuer)) say("The demo region is loaded.");
    },
  });
  goOn();
  ensureBuild(projectFolder, say);
  goOn();

  const { startPrograms } = await import("./programs.js");
  const programs = await startPrograms({
    root: projectFolder,
    folder: privateFolder,
    settings,
    ports,
    mariadb,
    database,
    devPages,
    hasDemoPeople: !isEmpty,
    signal: stopping.signal,
  });
  started.push(programs.stop);

  const { origin, mailOrigin } = programs;
  const people = isEmpty ? [] : JSON.parse(readFileSync(join(projectFolder, "idp", "accounts.json"), "utf8"));
  const invitationUrl = token === null ? null : `${origin}/invitations/${token}`;
  say(box(welcomeLines({ origin, mailOrigin, people, invitationUrl })));

  const asked = new Promise((resolve) => {
    if (stopping.signal.aborted) resolve(null);
    stopping.signal.addEventListener("abort", () => resolve(null), { once: true });
  });
  const databaseEnd = mariadb.ended.then(() => `MariaDB has ended. Its log: ${join(privateFolder, "db", "error.log")}`);
  const words = await Promise.race([asked, programs.firstEnd, databaseEnd]);
  if (words !== null) throw new Failure(words);
}

/** Between two steps: an asked-for stop takes effect here. */
function goOn() {
  if (stopping.signal.aborted) throw new Failure("Stopped before everything was up.");
}

/** One launcher a checkout: two would fight over the build, the database and the provider's address. */
function claimFolder() {
  const pid = existsSync(pidFile) ? Number(readFileSync(pidFile, "utf8")) : 0;
  if (isLauncher(pid)) {
    throw new Failure(
      `Commonweigh already runs from this folder. Stop it with Ctrl-C in its window, or with: kill ${pid}`,
    );
  }
  writeFileSync(pidFile, String(process.pid));
  process.on("exit", () => rmSync(pidFile, { force: true }));
}

/** @param {number} pid */
function isLauncher(pid) {
  try {
    return pid > 0 && pid !== process.pid && readFileSync(`/proc/${pid}/cmdline`, "utf8").includes("scripts/start.js");
  } catch {
    return false;
  }
}
