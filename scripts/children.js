import { spawn } from "node:child_process";
import { closeSync, existsSync, mkdirSync, openSync, readFileSync } from "node:fs";
import { join } from "node:path";
import { setTimeout as sleep } from "node:timers/promises";
import { Failure, sentenceForLog } from "./failures.js";

/**
 * A program that a launcher has started.
 *
 * @typedef {object} Program
 * @property {string} title what a person calls it
 * @property {string} log path of its log
 * @property {boolean} isReady whether it has said "ready" over its channel
 * @property {boolean} isEnded
 * @property {Promise<void>} ended settles when it is gone
 * @property {import("node:child_process").ChildProcess} child
 */

/**
 * Start a script of the project on Node, its words going to a log. It ends by itself when the launcher is gone: each of
 * our programs stops when its channel closes.
 *
 * @param {object} given
 * @param {string} given.title
 * @param {string} given.script path within root
 * @param {string} given.root the checkout
 * @param {string} given.logFolder
 * @param {Record<string, string | undefined>} given.env the whole environment
 * @returns {Program}
 */
export function startProgram({ title, script, root, logFolder, env }) {
  mkdirSync(logFolder, { recursive: true, mode: 0o700 });
  const log = join(logFolder, `${title.replaceAll(" ", "-")}.log`);
  const output = openSync(log, "w", 0o600);
  // A group of its own: Ctrl-C in the terminal reaches the launcher only, which stops everything in order.
  const child = spawn(process.execPath, [join(root, script)], {
    cwd: root,
    env,
    detached: true,
    stdio: ["ignore", output, output, "ipc"],
  });
  closeSync(output);
  /** @type {Program} */
  const program = { title, log, child, isReady: false, isEnded: false, ended: Promise.resolve() };
  program.ended = new Promise((resolve) => {
    const end = () => {
      program.isEnded = true;
      resolve();
    };
    child.once("exit", end);
    child.once("error", end);
  });
  child.on("message", (message) => {
    if (message === "ready") program.isReady = true;
  });
  return program;
}

/**
 * Wait until a program really answers.
 *
 * @param {Program} program
 * @param {(program: Program) => boolean | Promise<boolean>} probe true once it answers; an exception counts as not yet
 * @param {number} [limitMs]
 * @throws {Failure} when it has died or stays silent, with the last lines of its log
 */
export async function waitUntilAnswering(program, probe, limitMs = 30_000) {
  const deadline = Date.now() + limitMs;
  while (!program.isEnded && Date.now() < deadline) {
    try {
      if (await probe(program)) return;
    } catch {
      // Not listening yet.
    }
    await sleep(50);
  }
  throw new Failure(
    lastWords(program, program.isEnded ? "ended by itself" : `does not answer after ${limitMs / 1000} seconds`),
  );
}

/**
 * @param {Program} program
 * @param {string} what what became of it
 * @returns {string} which program, and the last lines of its log; one sentence when the log states a reason we know
 */
export function lastWords(program, what) {
  const lines = tail(program.log, 12);
  const sentence = sentenceForLog(lines);
  if (sentence !== null) return `The ${program.title} ${what}. ${sentence}`;
  return `The ${program.title} ${what}. Its last lines:\n${lines}\nThe whole log: ${program.log}`;
}

/**
 * Stop programs one after the other, in the order given: first a request, then, if it is not heard, by force.
 *
 * @param {readonly Program[]} programs
 * @param {number} [graceMs] how long one may take to finish what it is doing
 */
export async function stopPrograms(programs, graceMs = 15_000) {
  for (const program of programs) {
    if (program.isEnded) continue;
    program.child.kill("SIGTERM");
    const isTimely = await Promise.race([program.ended.then(() => true), sleep(graceMs, false, { ref: false })]);
    if (!isTimely) program.child.kill("SIGKILL");
    await program.ended;
  }
}

/**
 * @param {string} file
 * @param {number} count
 * @returns {string} its last lines, or a note that there are none
 */
export function tail(file, count) {
  if (!existsSync(file)) return "(it has written nothing)";
  const lines = readFileSync(file, "utf8").trimEnd().split("\n").slice(-count).join("\n");
  return lines === "" ? "(it has written nothing)" : lines;
}
