import { createHash } from "node:crypto";
import { readFile, writeFile } from "node:fs/promises";
import { join } from "node:path";

/**
 * Writes the build's fingerprint into the service worker, so that phones notice every new build and only new builds.
 *
 * @returns {import("vite").Plugin}
 */
export function workerBuild() {
  return {
    name: "worker-build",
    apply: "build",
    applyToEnvironment: (environment) => environment.name === "client",
    async writeBundle({ dir }, bundle) {
      const file = join(dir ?? "", "sw.js");
      const names = Object.keys(bundle).sort().join("\n");
      const fingerprint = createHash("sha256").update(names).digest("hex").slice(0, 16);
      await writeFile(file, (await readFile(file, "utf8")).replace("__BUILD__", fingerprint));
    },
  };
}
