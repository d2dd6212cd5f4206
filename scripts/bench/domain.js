import { mkdirSync } from "node:fs";
import { join } from "node:path";
import { Readable } from "node:stream";
import { pathToFileURL } from "node:url";
import { parse } from "csv-parse";
import { quantileSorted } from "simple-statistics";
import { build } from "vite";
import { generateRegion } from "../../data/demo/generate.js";
import { projectFolder } from "../settings.js";
import { median } from "./pages.js";

const seasonStartYear = 2024;
const rounds = 7;

/**
 * Milliseconds of the two heaviest computations, each in turn with the bare library that it stands on.
 *
 * @returns {Promise<{ ms: Record<string, number>, ratios: Record<string, number> }>} medians of the rounds; `ratios` is
 *   put beside those of the pages by whoever calls
 */
export async function domainTimes() {
  const { buildEdition, defaultPolicy, groupKeysOf, readCsv, seasonFileColumns } = await compiled();
  const towns = demoTowns();
  const file = seasonFile(seasonFileColumns);
  const timers = {
    edition: () =>
      buildEdition({ seasonStartYear, towns, registry: [], policy: defaultPolicy, random: () => Math.random() }),
    quantiles: () => bareQuantiles(towns, groupKeysOf),
    csv: () => readCsv(file, seasonFileColumns),
    parser: () => bareParser(file),
  };
  const ms = await inTurn(timers);
  return {
    ms,
    ratios: {
      editionPerQuantiles: Number((ms.edition / ms.quantiles).toFixed(2)),
      csvPerParser: Number((ms.csv / ms.parser).toFixed(2)),
    },
  };
}

/** The domain as plain JavaScript, as the build makes it. */
async function compiled() {
  const folder = join(projectFolder, "bench", "compiled");
  mkdirSync(folder, { recursive: true });
  await build({
    root: projectFolder,
    configFile: false,
    logLevel: "warn",
    build: {
      ssr: join(projectFolder, "scripts", "bench", "measured.ts"),
      outDir: folder,
      emptyOutDir: true,
      rollupOptions: { output: { entryFileNames: "measured.mjs" } },
    },
  });
  return import(pathToFileURL(join(folder, "measured.mjs")).href);
}

/** What the demo's towns bring to an edition, by plain arithmetic. */
function demoTowns() {
  const region = generateRegion();
  const truckById = new Map(region.truck.map((truck) => [truck.id, truck]));
  const saltIds = new Set(region.material.filter(({ kind }) => kind === "salt").map(({ id }) => id));
  const by = (rows) => Map.groupBy?.(rows, (row) => row.calibration_id) ?? grouped(rows);
  const [counts, catches] = [by(region.calibration_count), by(region.calibration_catch)];
  const rateOf = (calibration) => {
    const truck = truckById.get(calibration.truck_id);
    const count = counts.get(calibration.id).find(({ setting }) => setting === truck.working_setting);
    const own = catches.get(calibration.id);
    const lbPerRev = own.reduce((sum, each) => sum + (each.gross_lb - each.tare_lb) / each.revolutions, 0) / own.length;
    const revPerMin = (count.revolutions * 60) / count.seconds;
    return (lbPerRev * revPerMin * 60) / truck.working_speed_mph / truck.lanes_per_pass;
  };
  return region.town.map((town) => {
    const figure = region.season_figure.find(
      (each) => each.town_id === town.id && each.season_start_year === seasonStartYear,
    );
    const rates = region.calibration
      .filter(({ town_id, material_id, tested_on }) => {
        return town_id === town.id && saltIds.has(material_id) && tested_on.startsWith(String(seasonStartYear));
      })
      .map(rateOf);
    return {
      townId: town.id,
      contributorId: town.reports_through_town_id ?? town.id,
      district: town.district,
      laneMiles: figure?.lane_miles ?? null,
      values: {
        "salt-per-event": figure
          ? (figure.salt_lb + figure.mix_lb * (figure.mix_salt_share ?? 0)) / figure.lane_miles / figure.event_count
          : null,
        "rate-at-working-setting": rates.length === 0 ? null : median(rates),
      },
    };
  });
}

function grouped(rows) {
  const groups = new Map();
  for (const row of rows) groups.set(row.calibration_id, [...(groups.get(row.calibration_id) ?? []), row]);
  return groups;
}

/** The figures of an edition without protection, names or places: five quantiles of every group. */
function bareQuantiles(towns, groupKeysOf) {
  const found = [];
  for (const indicator of ["salt-per-event", "rate-at-working-setting"]) {
    const groups = new Map();
    for (const town of towns) {
      const value = town.values[indicator];
      if (value === null) continue;
      for (const key of groupKeysOf(town)) {
        const own = groups.get(key);
        if (own) own.push(value);
        else groups.set(key, [value]);
      }
    }
    for (const values of groups.values()) {
      const sorted = values.sort((one, other) => one - other);
      found.push([0.1, 0.25, 0.5, 0.75, 0.9].map((share) => quantileSorted(sorted, share)));
    }
  }
  return found;
}

function seasonFile(columns) {
  const lines = [columns.join(",")];
  for (let row = 0; row < 50_000; row += 1) {
    lines.push(`2025-26,${100 + (row % 700)}.5,${10 + (row % 30)},${row % 4000}.25,${row % 900},20,0,,${row * 7}`);
  }
  return new TextEncoder().encode(lines.slice(0, 50_000).join("\n"));
}

async function bareParser(file) {
  const rows = [];
  for await (const row of Readable.from([Buffer.from(file)]).pipe(parse())) rows.push(row);
  return rows;
}

/** @param {Record<string, () => unknown>} timers @returns {Promise<Record<string, number>>} median ms of each */
async function inTurn(timers) {
  const found = Object.fromEntries(Object.keys(timers).map((name) => [name, []]));
  // The first round only warms up.
  for (let round = 0; round <= rounds; round += 1) {
    for (const [name, timer] of Object.entries(timers)) {
      const startedAt = performance.now();
      await timer();
      if (round > 0) found[name].push(performance.now() - startedAt);
    }
  }
  return Object.fromEntries(Object.entries(found).map(([name, times]) => [name, Number(median(times).toFixed(3))]));
}
