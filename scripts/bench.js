import { mkdirSync, writeFileSync } from "node:fs";
import { cpus } from "node:os";
import { join } from "node:path";
import { measureComputation } from "./bench/computation.js";
import { measurePages } from "./bench/pages.js";
import { measureStart } from "./bench/start.js";
import { projectFolder } from "./settings.js";

/*
 * Speed and memory, as ratios against a bare baseline measured in the same run: npm run bench
 * The result goes to bench/latest.json; with --keep also to data/bench-result.json, the last accepted one.
 * Ends with exit code 1 when a limit is missed.
 */

const measures = [...(await measurePages()), ...(await measureComputation()), ...(await measureStart())];
const result = {
  measuredAt: new Date().toISOString(),
  node: process.version,
  cores: cpus().length,
  measures,
};
const text = `${JSON.stringify(result, null, 2)}\n`;
mkdirSync(join(projectFolder, "bench"), { recursive: true });
writeFileSync(join(projectFolder, "bench", "latest.json"), text);
if (process.argv.includes("--keep")) writeFileSync(join(projectFolder, "data", "bench-result.json"), text);

for (const { name, value, unit, limit, isMet, detail } of measures) {
  const wanted = limit === null ? "" : `  (${limit})${isMet ? "" : "  MISSED"}`;
  console.log(`${name.padEnd(52)} ${value} ${unit}${wanted}${detail === "" ? "" : `  ${detail}`}`);
}
process.exitCode = measures.every(({ isMet }) => isMet) ? 0 : 1;
