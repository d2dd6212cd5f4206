import { expect, test } from "vitest";
import { inReportedSteps, isPossibleReading, weatherDay } from "#app/domain/severity/weather-day.ts";

test("a trace is a reading of 0 and a missing element is no reading", () => {
  const day = weatherDay("2026-01-15", { TMAX: 30, SNOW: "trace" });
  expect(day).toMatchObject({ tmaxF: 30, snowfallIn: 0, isSnowfallTrace: true });
  expect(day).toMatchObject({ tminF: null, snowDepthIn: null, isSnowDepthTrace: false, precipIn: null });
});

test("what can be no weather is refused, and so is a trace of temperature or a day that is none", () => {
  expect(() => weatherDay("2026-01-15", { TMAX: 278 })).toThrow(RangeError);
  expect(() => weatherDay("2026-01-15", { SNOW: -0.1 })).toThrow(RangeError);
  expect(() => weatherDay("2026-01-15", { SNWD: NaN })).toThrow(RangeError);
  expect(() => weatherDay("2026-01-15", { TMIN: "trace" })).toThrow("cannot be a trace");
  expect(() => weatherDay("2026-02-29", {})).toThrow(RangeError);
});

test("the limits are the last readings that pass", () => {
  expect([isPossibleReading("TMAX", 140), isPossibleReading("TMAX", 140.1)]).toEqual([true, false]);
  expect([isPossibleReading("SNOW", 100), isPossibleReading("SNOW", 102)]).toEqual([true, false]);
  expect(isPossibleReading("PRCP", Number.POSITIVE_INFINITY)).toBe(false);
});

test("a half goes away from zero on both sides of it, and never becomes a minus zero", () => {
  const tminOf = (TMIN: number) => inReportedSteps(weatherDay("2026-01-15", { TMIN })).tminF;
  expect([tminOf(8.5), tminOf(-8.5), tminOf(-8.49)]).toEqual([9, -9, -8]);
  expect(Object.is(tminOf(-0.04), 0)).toBe(true);
});

test("a half that binary fractions cannot hold is still a half: 4.35 inches are 4.4", () => {
  const day = inReportedSteps(weatherDay("2026-01-15", { SNOW: 4.35, PRCP: 1.005, SNWD: 2.5 }));
  expect(day).toMatchObject({ snowfallIn: 4.4, precipIn: 1.01, snowDepthIn: 3 });
});
