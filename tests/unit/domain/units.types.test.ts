import { expect, test } from "vitest";
import { applicationRate } from "#app/domain/calibration/application-rate.ts";
import { type Lb, lb, lbPerLaneMile, lbPerMin, mph, shortTons } from "#app/domain/units.ts";

test("speed and discharge in each other's place do not compile, and would give another rate", () => {
  // @ts-expect-error a speed is no discharge
  const swapped = applicationRate(mph(20), lbPerMin(200), 1);
  expect(swapped).not.toBe(applicationRate(lbPerMin(200), mph(20), 1));
});

test("a bare number is no speed", () => {
  // @ts-expect-error 20 carries no unit
  expect(applicationRate(lbPerMin(200), 20, 1)).toBe(600);
});

test("short tons in the place of pounds do not compile", () => {
  // @ts-expect-error a short ton is not a pound
  const wrong: Lb = shortTons(2);
  expect(wrong).toBe(2);
});

test.each([lb, lbPerMin, mph, lbPerLaneMile, shortTons])("%o refuses NaN and infinity", (constructor) => {
  for (const value of [NaN, Infinity, -Infinity]) expect(() => constructor(value)).toThrow(RangeError);
});
