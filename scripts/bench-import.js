import { mkdirSync, writeFileSync } from "node:fs";
import { cpus } from "node:os";
import { join } from "node:path";
import { importRates } from "./bench/import.js";
import { projectFolder } from "./settings.js";

/* How fast 100,000 rows of a storm log are taken in: node scripts/bench-import.js */

const limits = { leastSpeedRatio: 0.5, mostGrownMb: 150 };

const measured = await importRates();
const result = {
  measuredOn: new Date().toISOString().slice(0, 10),
  machine: { node: process.version, cores: cpus().length, processor: cpus()[0]?.model ?? "unknown" },
  ...measured,
  limits,
};
mkdirSync(join(projectFolder, "bench"), { recursive: true });
writeFileSync(join(projectFolder, "bench", "import.json"), `${JSON.stringify(result, null, 2)}\n`);
console.log(JSON.stringify(result, null, 2));
if (measured.speedRatio < limits.leastSpeedRatio || measured.grownMb > limits.mostGrownMb) process.exitCode = 1;
