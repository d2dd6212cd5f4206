import { mkdtempSync, rmSync } from "node:fs";
import { join } from "node:path";
import { Readable } from "node:stream";
import { pathToFileURL } from "node:url";
import { parse } from "csv-parse";
import { quantileSorted } from "simple-statistics";
import { build } from "vite";
import { projectFolder } from "../settings.js";
import { middleOf, short } from "./measure.js";

const rounds = 5;

/**
 * The domain as one plain module: Node 20 does not read TypeScript.
 *
 * @param {string} folder inside the checkout, so that packages are found
 * @param {Record<string, string>} entries name to source file
 */
async function bundled(folder, entries) {
  await build({
    root: projectFolder,
    configFile: false,
    logLevel: "error",
    build: {
      ssr: true,
      outDir: folder,
      emptyOutDir: false,
      rollupOptions: { input: entries, output: { entryFileNames: "[name].mjs" } },
    },
  });
}

/** @param {() => void} work @returns {number} ms, the middle of several runs after one to warm up */
function timeOf(work) {
  work();
  return middleOf(
    Array.from({ length: rounds }, () => {
      const startedAt = performance.now();
      work();
      return performance.now() - startedAt;
    }),
  );
}

/** Towns with figures spread like a region's, from a fixed sequence. */
function someTowns(count) {
  let seed = 7;
  const next = () => (seed = (seed * 48_271) % 2_147_483_647) / 2_147_483_647;
  return Array.from({ length: count }, (_, index) => ({
    townId: index + 1,
    contributorId: index + 1,
    district: `District ${index % 5}`,
    laneMiles: 20 + 600 * next(),
    values: { "salt-per-event": 200 + 300 * next(), "rate-at-working-setting": 180 + 400 * next() },
  }));
}

/** The edition's engine against the same quantiles taken bare, and reading a file against the bare parser. */
export async function measureComputation() {
  const folder = mkdtempSync(join(projectFolder, "bench-"));
  try {
    await bundled(folder, {
      edition: join(projectFolder, "app/domain/peers/edition.ts"),
      policy: join(projectFolder, "app/domain/disclosure/policy.ts"),
    });
    const load = (name) => import(pathToFileURL(join(folder, `${name}.mjs`)).href);
    const [{ buildEdition }, { defaultPolicy }] = await Promise.all([load("edition"), load("policy")]);
    const towns = someTowns(1000);
    const groups = 10;
    const bare = timeOf(() => {
      for (const key of ["salt-per-event", "rate-at-working-setting"]) {
        const sorted = towns.map((town) => town.values[key]).sort((a, b) => a - b);
        for (let group = 0; group < groups; group++) {
          for (const p of [0.1, 0.25, 0.5, 0.75, 0.9]) quantileSorted(sorted, p);
        }
      }
    });
    const edition = timeOf(() => {
      buildEdition({ seasonStartYear: 2025, towns, registry: [], policy: defaultPolicy, random: Math.random });
    });
    return [
      {
        name: "an edition of 1,000 towns against bare quantiles",
        value: short(edition / bare),
        unit: "times",
        limit: null,
        isMet: true,
        detail: `${short(edition)} ms against ${short(bare)} ms; the edition also groups, protects, places and bins`,
      },
      await measureParser(),
    ];
  } finally {
    rmSync(folder, { recursive: true, force: true });
  }
}

/** How fast this machine's bare parser reads, so that the figures of two runs can be set side by side. */
async function measureParser() {
  const line = "2025-26,118,24,1890.5,0,,240,,131400\n";
  const rows = 50_000;
  const startedAt = performance.now();
  let count = 0;
  for await (const record of Readable.from([line.repeat(rows)]).pipe(parse())) count += record.length > 0 ? 1 : 0;
  if (count !== rows) throw new Error(`The parser read ${count} of ${rows} rows.`);
  const ms = performance.now() - startedAt;
  return {
    name: "rows the bare parser reads in a second",
    value: short((rows / ms) * 1000),
    unit: "rows",
    limit: null,
    isMet: true,
    detail: "a yardstick of the machine",
  };
}
