import { expect, test } from "vitest";
import { weatherDay } from "#app/domain/severity/weather-day.ts";
import { minnesotaRule, wildlifeIndex, wisconsinRule } from "#app/domain/severity/wildlife-index.ts";
import { winterCounts } from "#app/domain/severity/winter-counts.ts";

const january = { from: "2026-01-01", to: "2026-01-04" };

test("0.1, 1 and 3 inches of snow count in every tally they reach, a trace in none", () => {
  const days = [0.1, 1, 3, "trace" as const].map((SNOW, place) => weatherDay(`2026-01-0${place + 1}`, { SNOW }));
  const counts = winterCounts(days, january);
  expect(counts.snowDays).toEqual({ dayCount: 3, unknownDayCount: 0 });
  expect(counts.snowDaysOf1In).toEqual({ dayCount: 2, unknownDayCount: 0 });
  expect(counts.snowDaysOf3In).toEqual({ dayCount: 1, unknownDayCount: 0 });
});

test("33 by day and 32 by night is a freeze and thaw; 32 by day is none, whatever the night was", () => {
  const days = [
    weatherDay("2026-01-01", { TMAX: 33, TMIN: 32 }),
    weatherDay("2026-01-02", { TMAX: 32, TMIN: 20 }),
    weatherDay("2026-01-03", { TMAX: 32 }),
    weatherDay("2026-01-04", { TMAX: 33 }),
  ];
  expect(winterCounts(days, january).freezeThawDays).toEqual({ dayCount: 1, unknownDayCount: 1 });
});

test("rain at 32 °F is a wet freeze; a trace of it is none and a dry day needs no temperature", () => {
  const days = [
    weatherDay("2026-01-01", { PRCP: 0.01, TMIN: 32 }),
    weatherDay("2026-01-02", { PRCP: "trace", TMIN: 20 }),
    weatherDay("2026-01-03", { PRCP: 0 }),
  ];
  expect(winterCounts(days, january).wetFreezeDays).toEqual({ dayCount: 1, unknownDayCount: 1 });
});

test("the two states' rules differ in depth and in November", () => {
  const days = [
    weatherDay("2025-11-15", { TMIN: -1, SNWD: 16 }),
    weatherDay("2026-01-15", { TMIN: 0, SNWD: 17 }),
    weatherDay("2026-05-01", { TMIN: -1, SNWD: 40 }),
  ];
  expect(wildlifeIndex(days, { seasonStartYear: 2025, rule: wisconsinRule })).toEqual({
    points: 1,
    missingColdDayCount: 150,
    missingDepthDayCount: 150,
  });
  expect(wildlifeIndex(days, { seasonStartYear: 2025, rule: minnesotaRule }).points).toBe(4);
});
