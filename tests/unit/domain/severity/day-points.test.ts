import { expect, test } from "vitest";
import { dayPoints, snowPointsOf, temperaturePointsOf } from "#app/domain/severity/day-points.ts";
import { weatherDay } from "#app/domain/severity/weather-day.ts";

const day = "2026-01-15";

/** Readings from the first to the last in even steps. */
function readings(first: number, last: number, perUnit: number) {
  const length = Math.round((last - first) * perUnit) + 1;
  return Array.from({ length }, (_, place) => first + place / perUnit);
}

function isRising(points: readonly (number | null)[]) {
  return points.every((value, place) => value !== null && value >= (points[place - 1] ?? 0));
}

test("no snowfall to 40.0 inches by tenths falls in a hole, and more snow never scores less", () => {
  const points = readings(0, 40, 10).map((SNOW) => dayPoints(weatherDay(day, { SNOW })).snowfallPoints);
  expect(points).toHaveLength(401);
  expect(isRising(points)).toBe(true);
  expect(new Set(points)).toEqual(new Set([0, 1, 2, 3, 4, 6, 7, 9, 10, 12, 13, 14, 18, 22, 26, 36, 45]));
});

test("no depth to 60 inches falls in a hole, and deeper snow never scores less", () => {
  const points = readings(0, 60, 1).map((SNWD) => dayPoints(weatherDay(day, { SNWD })).snowDepthPoints);
  expect(isRising(points)).toBe(true);
  expect(new Set(points)).toEqual(new Set([0, 1, 2, 3, 4, 5, 6, 7, 8, 9, 10, 15]));
});

test("no temperature from 40 down to -60 °F falls in a hole, and colder never scores less", () => {
  const colder = readings(-60, 40, 1).reverse();
  const highs = colder.map((TMAX) => dayPoints(weatherDay(day, { TMAX })).tmaxPoints);
  const lows = colder.map((TMIN) => dayPoints(weatherDay(day, { TMIN })).tminPoints);
  expect([isRising(highs), isRising(lows)]).toEqual([true, true]);
  expect(new Set(highs)).toEqual(new Set([0, 1, 2, 3, 4, 5, 6, 7, 8, 9, 10, 15]));
  expect(new Set(lows)).toEqual(new Set([0, 1, 2, 3, 4, 5, 6, 7, 8, 9, 10, 11, 15, 20]));
});

test("a missing reading is null, a trace is 0, and both add nothing", () => {
  const missing = dayPoints(weatherDay(day, { TMAX: 20, TMIN: 10 }));
  const trace = dayPoints(weatherDay(day, { TMAX: 20, TMIN: 10, SNOW: "trace", SNWD: "trace" }));
  expect([missing.snowfallPoints, missing.snowDepthPoints]).toEqual([null, null]);
  expect([trace.snowfallPoints, trace.snowDepthPoints]).toEqual([0, 0]);
  expect([snowPointsOf(missing), snowPointsOf(trace)]).toEqual([0, 0]);
  expect(temperaturePointsOf(missing)).toBe(6);
});
