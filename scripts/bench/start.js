import { spawn } from "node:child_process";
import { join } from "node:path";
import { freePorts } from "../ports.js";
import { projectFolder } from "../settings.js";
import { short } from "./measure.js";

/** A warm start may take at most so long. */
const mostSeconds = 10;

/**
 * Start everything by the README's command, wait for the box, and stop it as Ctrl-C does.
 *
 * @param {number} port
 * @returns {Promise<number>} seconds until the box
 */
async function startOnce(port) {
  const startedAt = performance.now();
  const child = spawn(process.execPath, [join(projectFolder, "scripts", "start.js")], {
    cwd: projectFolder,
    env: { ...process.env, PORT: String(port) },
  });
  let words = "";
  const seconds = await new Promise((resolve, reject) => {
    const listen = (chunk) => {
      words += chunk;
      if (words.includes("Stop: Ctrl-C")) resolve((performance.now() - startedAt) / 1000);
    };
    child.stdout.on("data", listen);
    child.stderr.on("data", listen);
    child.on("exit", () => reject(new Error(`npm start ended before its box: ${words.slice(-400)}`)));
  });
  const ended = new Promise((resolve) => child.on("exit", resolve));
  child.kill("SIGINT");
  await ended;
  return seconds;
}

/** The second start, when packages, database and build are there. */
export async function measureStart() {
  const { app } = await freePorts();
  await startOnce(app);
  const seconds = await startOnce(app);
  return [
    {
      name: "a warm npm start",
      value: short(seconds),
      unit: "s",
      limit: `under ${mostSeconds}`,
      isMet: seconds < mostSeconds,
      detail: "",
    },
  ];
}
