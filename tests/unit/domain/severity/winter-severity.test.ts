import fc from "fast-check";
import { expect, test } from "vitest";
import { calendarDays, everyDay, seasonStartYearsOf } from "#app/domain/severity/season-days.ts";
import { weatherDay } from "#app/domain/severity/weather-day.ts";
import { severityBuildUp, winterSeverity } from "#app/domain/severity/winter-severity.ts";
import { winterSpan } from "#app/domain/severity/winter-span.ts";
import { aSeason, onDays } from "./winters.ts";

const season = { seasonStartYear: 2025 };

test("a season without a sign of winter runs from 1 December to the last of February", () => {
  expect(winterSpan(aSeason(2025), season)).toEqual({ beginDay: "2025-12-01", endDay: "2026-02-28" });
  expect(winterSpan([], { seasonStartYear: 2023 })).toEqual({ beginDay: "2023-12-01", endDay: "2024-02-29" });
});

test("snow on the ground ends a winter and does not begin one", () => {
  const days = aSeason(2025, { "2025-11-05": { SNWD: 2 }, "2026-04-03": { SNWD: 1 } });
  expect(winterSpan(days, season)).toEqual({ beginDay: "2025-12-01", endDay: "2026-04-03" });
});

test("a day at 32 °F begins a winter, one at 32.5 does not", () => {
  expect(winterSpan(aSeason(2025, { "2025-11-05": { TMAX: 32.4 } }), season)?.beginDay).toBe("2025-11-05");
  expect(winterSpan(aSeason(2025, { "2025-11-05": { TMAX: 32.5 } }), season)?.beginDay).toBe("2025-12-01");
});

test("a season in which nothing was read scores 0 and says that all 90 days are missing", () => {
  expect(winterSeverity([], season)).toMatchObject({
    totalPoints: 0,
    dayCount: 90,
    missingDayCounts: { tmax: 90, tmin: 90, snowfall: 90, snowDepth: 90 },
  });
});

test("a day left out lacks all four elements, an element left out lacks its own", () => {
  const days = aSeason(2025, { "2026-01-10": null, "2026-01-11": { SNWD: undefined }, "2026-01-12": { TMIN: 20 } });
  expect(winterSeverity(days, season)).toMatchObject({
    missingDayCounts: { tmax: 1, tmin: 1, snowfall: 1, snowDepth: 2 },
    totalPoints: 2,
  });
});

test("on 30 November without a sign of winter it has not begun, on 1 December it has", () => {
  expect(winterSeverity(aSeason(2025), { ...season, throughDay: "2025-11-30" })).toBeNull();
  expect(severityBuildUp(aSeason(2025), { ...season, throughDay: "2025-11-30" })).toEqual([]);
  expect(winterSeverity(aSeason(2025), { ...season, throughDay: "2025-12-01" })).toMatchObject({
    endDay: "2025-12-01",
    dayCount: 1,
    isOver: false,
  });
});

test("a running season looks at no day after the last reported", () => {
  const days = aSeason(2025, { "2026-01-20": { TMAX: 0 }, "2026-01-21": { TMAX: 0 } });
  const running = winterSeverity(days, { ...season, throughDay: "2026-01-20" });
  expect(running).toMatchObject({ endDay: "2026-01-20", totalPoints: 6, isOver: false });
  expect(winterSeverity(days, season)).toMatchObject({ totalPoints: 12, isOver: true });
});

test("days that nobody read from 1 March to 10 March are blind and past the end; a read temperature is not", () => {
  const days = aSeason(2025, {
    ...onDays("2026-03-01", "2026-03-10", null),
    ...onDays("2026-03-11", "2026-03-15", { SNOW: undefined }),
  });
  expect(winterSeverity(days, season)?.edge).toEqual({ dayCount: 61 + 61, blindDayCount: 10 });
});

test("the build-up rises day by day to the season's total and names the gaps where they are", () => {
  const days = aSeason(2025, { "2025-12-10": { TMAX: 20, SNOW: 3 }, "2025-12-11": null, "2025-12-12": { SNWD: 3 } });
  const rows = severityBuildUp(days, season);
  expect(rows.slice(8, 12)).toEqual([
    { day: "2025-12-09", dayOfSeason: 162, temperaturePoints: 0, snowPoints: 0, totalPoints: 0, missing: [] },
    { day: "2025-12-10", dayOfSeason: 163, temperaturePoints: 2, snowPoints: 4, totalPoints: 6, missing: [] },
    {
      day: "2025-12-11",
      dayOfSeason: 164,
      temperaturePoints: 2,
      snowPoints: 4,
      totalPoints: 6,
      missing: ["tmax", "tmin", "snowfall", "snowDepth"],
    },
    { day: "2025-12-12", dayOfSeason: 165, temperaturePoints: 2, snowPoints: 7, totalPoints: 9, missing: [] },
  ]);
  expect(rows.at(-1)?.totalPoints).toBe(winterSeverity(days, season)?.totalPoints);
});

test("neither the order of the days nor days of other seasons change the severity", () => {
  const days = aSeason(2025, { "2025-11-20": { SNOW: 2 }, "2026-01-10": { TMAX: 10, TMIN: -3, SNWD: 4 } });
  const others = [...aSeason(2024, { "2025-01-01": { TMAX: 0 } }), ...aSeason(2026, { "2026-07-01": { TMAX: 0 } })];
  const expected = winterSeverity(days, season);
  fc.assert(
    fc.property(fc.shuffledSubarray([...days, ...others], { minLength: days.length + others.length }), (shuffled) => {
      expect(winterSeverity(shuffled, season)).toEqual(expected);
    }),
    { numRuns: 10 },
  );
});

test("a colder day or more snow never lowers the total", () => {
  fc.assert(
    fc.property(
      fc.integer({ min: 0, max: 364 }),
      fc.integer({ min: -40, max: 10 }),
      fc.integer({ min: 0, max: 300 }),
      (place, TMAX, tenths) => {
        const day = calendarDays("2025-07-01", "2026-06-30")[place] ?? "";
        const base = { "2025-11-20": { SNOW: 2 }, "2026-03-10": { TMAX: 10, TMIN: -3, SNWD: 4 } };
        const before = winterSeverity(aSeason(2025, base), season)?.totalPoints ?? NaN;
        const added = { TMAX, TMIN: -3, SNWD: 4, SNOW: 2 + tenths / 10 };
        const after = winterSeverity(aSeason(2025, { ...base, [day]: added }), season)?.totalPoints ?? NaN;
        expect(after).toBeGreaterThanOrEqual(before);
      },
    ),
    { numRuns: 60 },
  );
});

test("a day given twice and an end outside the season are refused", () => {
  const day = weatherDay("2026-01-10", { TMAX: 20 });
  expect(() => winterSeverity([day, day], season)).toThrow("2026-01-10 is given twice");
  expect(() => winterSeverity([], { ...season, throughDay: "2026-07-01" })).toThrow(RangeError);
});

test("every day of a span is there once, leap day and change of clocks included", () => {
  expect(calendarDays("2024-02-28", "2024-03-01")).toEqual(["2024-02-28", "2024-02-29", "2024-03-01"]);
  expect(new Set(calendarDays("2025-07-01", "2026-06-30")).size).toBe(365);
  expect(calendarDays("2026-01-02", "2026-01-01")).toEqual([]);
  expect(
    everyDay([weatherDay("2026-01-02", { TMAX: 20 })], "2026-01-01", "2026-01-03").map((day) => day.tmaxF),
  ).toEqual([null, 20, null]);
});

test("days of June and July fall in two seasons", () => {
  const days = ["2026-07-01", "2026-06-30", "2026-01-01"].map((day) => weatherDay(day, {}));
  expect(seasonStartYearsOf(days)).toEqual([2025, 2026]);
});
