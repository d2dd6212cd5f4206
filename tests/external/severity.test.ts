// B. E. Mayes Boustead, S. D. Hilberg, M. D. Shulski and K. G. Hubbard, "The Accumulated Winter Season Severity Index
// (AWSSI)", Journal of Applied Meteorology and Climatology 54 (2015), 1693–1712: point tables, as two public programs
// give them, with the published day of a Green Bay station among them. Season rules: Midwestern Regional Climate
// Center. Season totals computed by two independent programs that agree. Stations' published totals and percentiles
// from the articles named in vectors/severity-categories.json; history cut points by NumPy 2.4.6. Temperatures of New
// York from vega-datasets 3.2.1. The rounding vectors are our own rule, without a source.
import fc from "fast-check";
import { expect, test } from "vitest";
import { dayPoints, temperaturePointsOf } from "#app/domain/severity/day-points.ts";
import { calendarDays } from "#app/domain/severity/season-days.ts";
import { categoryBetween, severityCategory, severityCategoryNames } from "#app/domain/severity/severity-category.ts";
import { fromGhcnUnits, weatherDay } from "#app/domain/severity/weather-day.ts";
import { wildlifeIndex, wisconsinRule } from "#app/domain/severity/wildlife-index.ts";
import { winterSeverity } from "#app/domain/severity/winter-severity.ts";
import categories from "./vectors/severity-categories.json";
import history from "./vectors/severity-category-history.json";
import rounding from "./vectors/severity-days-rounding.json";
import days from "./vectors/severity-days.json";
import seasons from "./vectors/severity-seasons.json";
import windows from "./vectors/severity-temperature-windows.json";
import wildlife from "./vectors/severity-wildlife.json";

function readingOf(value: string | number | null | undefined) {
  if (value === "T") return "trace";
  return typeof value === "number" ? value : undefined;
}

function dayOf(day: string, values: readonly (string | number | null)[]) {
  const [TMAX, TMIN, SNOW, SNWD] = values.map(readingOf);
  return weatherDay(day, { TMAX, TMIN, SNOW, SNWD });
}

test.each([...days, ...rounding])("$id: the day scores as the tables say", ({ inputs, expected }) => {
  const day = dayOf("2026-01-15", [inputs.tmaxF, inputs.tminF, inputs.snowIn, inputs.depthIn]);
  const points = dayPoints(day);
  const scored = [points.tmaxPoints, points.tminPoints, points.snowfallPoints, points.snowDepthPoints];
  const sums = scored.map((value) => value ?? 0);
  expect(sums).toEqual([expected.tmax, expected.tmin, expected.snow, expected.depth]);
  expect(sums.reduce((sum, value) => sum + value, 0)).toBe(expected.total);
});

test.each(seasons)("$id: begin, end, parts and gaps of the season equal the reference", ({ inputs, expected }) => {
  const own = new Map<string, readonly (string | number | null)[]>(Object.entries(inputs.days));
  const from = `${inputs.snowYear}-07-01`;
  const to = `${inputs.snowYear + 1}-06-30`;
  const weather = calendarDays(from, to).map((day) => dayOf(day, own.get(day) ?? inputs.defaultDay));
  expect(winterSeverity(weather, { seasonStartYear: inputs.snowYear })).toMatchObject({
    beginDay: expected.start,
    endDay: expected.end,
    dayCount: expected.days,
    tmaxPoints: expected.points.tmax,
    tminPoints: expected.points.tmin,
    snowfallPoints: expected.points.snow,
    snowDepthPoints: expected.points.depth,
    totalPoints: expected.points.total,
    temperaturePoints: expected.temperature,
    snowPoints: expected.snowPart,
    missingDayCounts: {
      tmax: expected.missing.tmax,
      tmin: expected.missing.tmin,
      snowfall: expected.missing.snow,
      snowDepth: expected.missing.depth,
    },
  });
});

test.each(windows)("$id: five months of real temperatures give the reference's points", (vector) => {
  const calendar = calendarDays(vector.from, vector.to);
  expect(calendar).toHaveLength(vector.expected.days);
  const points = calendar.map((day, place) => {
    const TMAX = fromGhcnUnits("TMAX", vector.tmaxTenthsC[place] ?? NaN);
    const TMIN = fromGhcnUnits("TMIN", vector.tminTenthsC[place] ?? NaN);
    return temperaturePointsOf(dayPoints(weatherDay(day, { TMAX, TMIN })));
  });
  expect(points.reduce((sum, value) => sum + value, 0)).toBe(vector.expected.points);
});

test.each(categories)("$id: the published total falls in the published class", ({ inputs, expected }) => {
  // The articles give one cut point each, so every other one is tried within what they say of it.
  const known = inputs.p80 ?? inputs.p60 ?? NaN;
  const isTop = inputs.p80 !== undefined;
  const under = fc.array(fc.integer({ min: 0, max: known }), { minLength: 3, maxLength: 3 });
  const over = fc.integer({ min: inputs.score, max: 5000 });
  fc.assert(
    fc.property(under, over, (lower, upper) => {
      const [first = 0, second = 0, third = 0] = lower.toSorted((a, b) => a - b);
      const found = isTop
        ? categoryBetween(inputs.score, [first, second, third, known])
        : categoryBetween(inputs.score, [first, second, known, upper]);
      expect(found).toBe(expected.category);
      expect(severityCategoryNames[found]).toBe(expected.label);
    }),
  );
});

test.each(history.cases)("$id: the total falls in its fifth of the station's winters", ({ score, category }) => {
  const found = severityCategory(score, history.history);
  expect(found?.category).toBe(category);
  history.cuts.forEach((cut, place) => expect(found?.cutPoints[place]).toBeCloseTo(cut, 9));
});

test.each(wildlife)("$id: cold days and days of deep snow within the window add up", ({ inputs, expected }) => {
  const weather = inputs.days.map(([day, TMIN, SNWD]) =>
    weatherDay(String(day), { TMIN: Number(TMIN), SNWD: Number(SNWD) }),
  );
  expect(wildlifeIndex(weather, { seasonStartYear: 2021, rule: wisconsinRule }).points).toBe(expected.points);
});
