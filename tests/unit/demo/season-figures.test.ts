import { expect, test } from "vitest";
import { type SeasonFigureRow, generateRegion } from "../../../data/demo/generate.js";

const region = generateRegion();
const townNameById = new Map(region.town.map((town) => [town.id, town.name]));

function figuresOf(year: number) {
  return region.season_figure.filter((figure) => figure.season_start_year === year);
}

function townName(figure: SeasonFigureRow) {
  return townNameById.get(figure.town_id) ?? "";
}

function isDoubtful(figure: SeasonFigureRow) {
  return figure.season_start_year === 2025 && region.doubtful.some((slip) => slip.town === townName(figure));
}

function saltLbPerLaneMileEvent(figure: SeasonFigureRow) {
  const saltLb = figure.salt_lb + figure.mix_lb * (figure.mix_salt_share ?? 0);
  return saltLb / figure.lane_miles / figure.event_count;
}

function dollarsPerTon(figure: SeasonFigureRow) {
  const tons = (figure.salt_lb + figure.mix_lb + figure.sand_lb) / 2000;
  return figure.material_cost_cents === null ? null : figure.material_cost_cents / 100 / tons;
}

function median(values: number[]) {
  const sorted = values.toSorted((one, other) => one - other);
  const middle = Math.floor(sorted.length / 2);
  const upper = sorted[middle] ?? NaN;
  return sorted.length % 2 === 1 ? upper : (upper + (sorted[middle - 1] ?? NaN)) / 2;
}

test("every figure but the planted three lies within plausible limits", () => {
  for (const figure of region.season_figure.filter((one) => !isDoubtful(one))) {
    const label = `${townName(figure)} ${figure.season_start_year}`;
    expect(figure.event_count, label).toBeGreaterThanOrEqual(14);
    expect(figure.event_count, label).toBeLessThanOrEqual(38);
    expect(saltLbPerLaneMileEvent(figure), label).toBeGreaterThan(150);
    expect(saltLbPerLaneMileEvent(figure), label).toBeLessThan(650);
    expect(figure.sand_lb / 2000 / figure.lane_miles, label).toBeLessThan(3);
    expect(figure.salt_lb % 200, label).toBe(0);
    expect(dollarsPerTon(figure) ?? 50, label).toBeGreaterThan(25);
    expect(dollarsPerTon(figure) ?? 50, label).toBeLessThan(120);
    expect(figure.mix_salt_share === null, label).toBe(figure.mix_lb === 0);
  }
});

test("lane miles change by less than 5 % from the town's first figures to any later ones but the planted", () => {
  const first = new Map<number, number>();
  for (const figure of region.season_figure.filter((one) => !isDoubtful(one))) {
    const firstLaneMiles = first.get(figure.town_id) ?? figure.lane_miles;
    first.set(figure.town_id, firstLaneMiles);
    expect(Math.abs(figure.lane_miles / firstLaneMiles - 1)).toBeLessThan(0.05);
  }
  expect(first.size).toBe(65);
});

test("salt per lane mile and event has a median of 300 to 345 lb each season and varies twofold and more", () => {
  for (const year of [2021, 2022, 2023, 2024, 2025]) {
    const values = figuresOf(year)
      .filter((figure) => !isDoubtful(figure))
      .map(saltLbPerLaneMileEvent);
    expect(median(values), `${year}`).toBeGreaterThan(300);
    expect(median(values), `${year}`).toBeLessThan(345);
    expect(Math.max(...values) / Math.min(...values)).toBeGreaterThan(2);
  }
});

test("a town keeps its practice: its seasons differ less from each other than the towns do", () => {
  const logsByTown = new Map<number, number[]>();
  for (const figure of region.season_figure.filter((one) => !isDoubtful(one))) {
    const logs = logsByTown.get(figure.town_id) ?? [];
    logsByTown.set(figure.town_id, [...logs, Math.log(saltLbPerLaneMileEvent(figure))]);
  }
  const townMeans = [...logsByTown.values()].map((logs) => logs.reduce((sum, value) => sum + value, 0) / logs.length);
  const withinSpreads = [...logsByTown.values()].map((logs) => Math.max(...logs) - Math.min(...logs));
  expect(Math.max(...townMeans) - Math.min(...townMeans)).toBeGreaterThan(3 * median(withinSpreads));
});

test("two to four towns are missing in each past season, never the same twice; all the others are accepted", () => {
  const missing = [2021, 2022, 2023, 2024].flatMap((year) => {
    const present = new Set(figuresOf(year).map((figure) => figure.town_id));
    const absent = region.town.filter((town) => !present.has(town.id));
    expect(absent.length).toBeGreaterThanOrEqual(2);
    expect(absent.length).toBeLessThanOrEqual(4);
    expect(figuresOf(year).every((figure) => figure.state === "accepted")).toBe(true);
    return absent.map((town) => town.id);
  });
  expect(new Set(missing).size).toBe(missing.length);
});

test("2025-26 stands at 57 accepted, 6 sent, 1 returned with a note, and nothing yet from Quillbrook", () => {
  const figures = figuresOf(2025);
  expect(figures.map(townName)).not.toContain("Quillbrook");
  expect(figures.filter((figure) => figure.state === "accepted")).toHaveLength(57);
  expect(figures.filter((figure) => figure.state === "sent")).toHaveLength(6);
  const returned = figures.filter((figure) => figure.state === "returned");
  expect(returned.map((figure) => figure.review_note?.endsWith("check and send again."))).toEqual([true]);
});

test("three of the six waiting are doubtful, Fallowmere with about ten times the salt of its other seasons", () => {
  expect(region.doubtful).toHaveLength(3);
  const doubtful = figuresOf(2025).filter(isDoubtful);
  expect(doubtful.map((figure) => figure.state)).toEqual(["sent", "sent", "sent"]);
  const fallowmere = region.season_figure.filter((figure) => townName(figure) === "Fallowmere");
  const perEvent = new Map(fallowmere.map((figure) => [figure.season_start_year, saltLbPerLaneMileEvent(figure)]));
  const usual = median([2021, 2022, 2023, 2024].map((year) => perEvent.get(year) ?? NaN));
  const times = (perEvent.get(2025) ?? NaN) / usual;
  expect(times).toBeGreaterThan(7);
  expect(times).toBeLessThan(12);
});

test("the two smaller slips are 30 % more lane miles and a cost under $10 a ton", () => {
  const lastYear = new Map(figuresOf(2024).map((figure) => [figure.town_id, figure.lane_miles]));
  const doubtful = figuresOf(2025).filter((figure) => isDoubtful(figure) && townName(figure) !== "Fallowmere");
  const grown = doubtful.filter((figure) => figure.lane_miles > 1.25 * (lastYear.get(figure.town_id) ?? Infinity));
  const cheap = doubtful.filter((figure) => (dollarsPerTon(figure) ?? Infinity) < 10);
  expect([grown.length, cheap.length]).toEqual([1, 1]);
  expect(grown[0]?.town_id).not.toBe(cheap[0]?.town_id);
});

test("figures are written after the season, sent after they are written, reviewed after they are sent", () => {
  for (const figure of region.season_figure) {
    expect(figure.created_at > `${figure.season_start_year + 1}-06-27`).toBe(true);
    expect(figure.created_at < figure.sent_at).toBe(true);
    expect(figure.sent_at < `${figure.season_start_year + 1}-10-01`).toBe(true);
    expect(figure.reviewed_at === null).toBe(figure.state === "sent");
    expect(figure.reviewed_at === null || figure.reviewed_at > figure.sent_at).toBe(true);
  }
});
