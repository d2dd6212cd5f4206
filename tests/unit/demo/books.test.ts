import { expect, test } from "vitest";
import { stockBalance } from "#app/domain/season/stock-balance.ts";
import { severityQuality } from "#app/domain/severity/severity-quality.ts";
import { winterSeverity } from "#app/domain/severity/winter-severity.ts";
import { eventCountOf } from "#app/domain/season/storm.ts";
import { demoSeed, generateRegion, type SeasonFigureRow } from "../../../data/demo/generate.js";
import { demoStations, stationSeason } from "../../../data/demo/weather.js";

const region = generateRegion();
const materialById = new Map(region.material.map((material) => [material.id, material]));
const stormById = new Map(region.storm.map((storm) => [storm.id, storm]));
const slipped = new Set(region.doubtful.map(({ town }) => region.town.find(({ name }) => name === town)?.id));

function grouped<Row>(rows: readonly Row[], keyOf: (row: Row) => string) {
  const groups = new Map<string, Row[]>();
  for (const row of rows) groups.set(keyOf(row), [...(groups.get(keyOf(row)) ?? []), row]);
  return groups;
}

const stockOf = grouped(
  region.stock_entry,
  (entry) => `${entry.town_id} ${entry.season_start_year} ${entry.material_id}`,
);
const stormsOf = grouped(region.storm, (storm) => `${storm.town_id} ${storm.season_start_year}`);
const usedOf = grouped(region.storm_material, (used) => {
  const storm = stormById.get(used.storm_id);
  return `${storm?.town_id ?? 0} ${storm?.season_start_year ?? 0} ${used.material_id}`;
});

function isSlipped(figure: SeasonFigureRow) {
  return figure.season_start_year === 2025 && slipped.has(figure.town_id);
}

test("every pile's books come to the figure reported, and the log explains it but for −5 to 13 %", () => {
  const shares: number[] = [];
  for (const figure of region.season_figure.filter((one) => !isSlipped(one))) {
    for (const [kind, reportedLb] of [
      ["salt", figure.salt_lb],
      ["mix", figure.mix_lb],
      ["sand", figure.sand_lb],
    ] as const) {
      const material = region.material.find((one) => one.town_id === figure.town_id && one.kind === kind);
      if (!material || reportedLb === 0) continue;
      const key = `${figure.town_id} ${figure.season_start_year} ${material.id}`;
      const balance = stockBalance(
        (stockOf.get(key) ?? []).map(({ kind: what, day, quantity_lb }) => ({
          kind: what,
          day,
          quantityLb: quantity_lb,
        })),
        (usedOf.get(key) ?? []).map(({ storm_id, used_lb }) => ({
          day: stormById.get(storm_id)?.started_at.slice(0, 10) ?? "",
          usedLb: used_lb ?? 0,
        })),
      );
      expect(balance.usedLb, key).toBeCloseTo(reportedLb, 3);
      expect(balance.leftOutCount, key).toBe(0);
      shares.push(balance.unexplainedShare ?? NaN);
    }
  }
  expect(shares.length).toBeGreaterThan(500);
  expect(Math.min(...shares)).toBeGreaterThan(-0.06);
  expect(Math.max(...shares)).toBeLessThan(0.14);
  expect(shares.filter((share) => share > 0.1).length).toBeGreaterThan(5);
});

test("every reported season has as many storms as events, within the season and in order", () => {
  for (const figure of region.season_figure) {
    const storms = stormsOf.get(`${figure.town_id} ${figure.season_start_year}`) ?? [];
    const lines = storms.map(({ started_at, ended_at }) => ({ startedAt: started_at, endedAt: ended_at }));
    expect(eventCountOf(lines)).toBe(figure.event_count);
    for (const { startedAt, endedAt } of lines) {
      expect(
        startedAt >= `${figure.season_start_year}-10-01` && endedAt < `${figure.season_start_year + 1}-06-01`,
      ).toBe(true);
      expect(endedAt > startedAt).toBe(true);
    }
  }
});

test("Quillbrook's last season has its piles and no storm yet; they come to the season file's 604 and 147.9 tons", () => {
  const id = region.town.find(({ name }) => name === "Quillbrook")?.id;
  expect(stormsOf.has(`${id} 2025`)).toBe(false);
  const used = (kind: string) => {
    const material = region.material.find((one) => one.town_id === id && one.kind === kind);
    const entries = stockOf.get(`${id} 2025 ${material?.id}`) ?? [];
    return stockBalance(
      entries.map(({ kind: what, day, quantity_lb }) => ({ kind: what, day, quantityLb: quantity_lb })),
      null,
    ).usedLb;
  };
  expect([used("salt"), used("mix")]).toEqual([1_208_000, 295_800]);
});

test("Fallowmere's ten times too much salt is one delivery whose decimal point is missing", () => {
  const id = region.town.find(({ name }) => name === "Fallowmere")?.id;
  const deliveries = region.stock_entry.filter(
    (entry) =>
      entry.town_id === id &&
      entry.season_start_year === 2025 &&
      entry.kind === "delivery" &&
      materialById.get(entry.material_id)?.kind === "salt",
  );
  const figure = region.season_figure.find((one) => one.town_id === id && one.season_start_year === 2025);
  expect(deliveries.map(({ quantity_lb }) => quantity_lb)).toEqual([figure?.salt_lb]);
  expect((figure?.stock_used_lb ?? 0) / (figure?.stock_logged_lb ?? NaN)).toBeGreaterThan(2);
});

test("roads by class come to the lane miles reported, but where lane miles are the slip", () => {
  const roads = grouped(region.road_class, (road) => `${road.town_id} ${road.season_start_year}`);
  for (const figure of region.season_figure.filter((one) => !isSlipped(one))) {
    const own = roads.get(`${figure.town_id} ${figure.season_start_year}`) ?? [];
    expect(own).toHaveLength(3);
    expect(own.reduce((sum, road) => sum + road.lane_miles, 0)).toBeCloseTo(figure.lane_miles, 6);
  }
});

test("every figure was sent once, some twice with a note between; the returned one carries a note on its sand", () => {
  const versions = grouped(region.figure_version, ({ figure_id }) => String(figure_id));
  const twice = [...versions.values()].filter((own) => own.length === 2);
  expect(versions.size).toBe(region.season_figure.length);
  expect(twice.length).toBeGreaterThan(8);
  for (const figure of region.season_figure) {
    const last = versions.get(String(figure.id))?.at(-1);
    expect(JSON.parse(last?.content ?? "{}")).toMatchObject({ saltLb: figure.salt_lb, laneMiles: figure.lane_miles });
    expect(last?.version).toBe(figure.state === "sent" ? figure.version : figure.version - 1);
  }
  const returned = region.season_figure.find(({ state }) => state === "returned");
  expect(region.figure_note.filter(({ figure_id }) => figure_id === returned?.id).map(({ field }) => field)).toEqual([
    "sandLb",
  ]);
});

test("six stations with 25 winters each, of 400 to 2,300 points, all but one sound; the gap of 2023-24 is planted", () => {
  expect(demoStations).toHaveLength(6);
  const unsound: string[] = [];
  for (const { code, name } of demoStations) {
    for (const year of [2003, 2016, 2023, 2025]) {
      const days = stationSeason(demoSeed, code, year).map(({ isTrace, ...day }) => ({
        ...day,
        isSnowfallTrace: isTrace,
        isSnowDepthTrace: false,
        isPrecipTrace: false,
      }));
      const winter = winterSeverity(days, { seasonStartYear: year });
      if (!winter) throw new Error("a winter was expected");
      if (!severityQuality(winter).isTotalSound) unsound.push(`${name} ${year}`);
      expect(winter.totalPoints, `${name} ${year}`).toBeGreaterThan(400);
      expect(winter.totalPoints, `${name} ${year}`).toBeLessThan(2300);
    }
  }
  expect(unsound).toEqual(["Ridge Gap 2023"]);
});
