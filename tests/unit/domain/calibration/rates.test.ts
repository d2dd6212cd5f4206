import fc from "fast-check";
import { expect, test } from "vitest";
import { applicationRate, countForRate } from "#app/domain/calibration/application-rate.ts";
import { bandPlace, commonPracticeBands, distanceFromBand } from "#app/domain/calibration/band.ts";
import { catchVariationPercent, lbPerRevolution } from "#app/domain/calibration/catch-weight.ts";
import { revolutionsPerMinute, settingsWithLimit } from "#app/domain/calibration/count-rate.ts";
import { calibrationRates, rateAtSetting, rateTable, speedsInBand } from "#app/domain/calibration/rates.ts";
import { timedDischarge } from "#app/domain/calibration/timed-catch.ts";
import { repeatUncertainty } from "#app/domain/calibration/uncertainty.ts";
import { lbPerLaneMile, lbPerMin, mph } from "#app/domain/units.ts";

const saltBand = { lowLbPerLaneMile: 250, highLbPerLaneMile: 300 };
const tenPounds = [{ revolutions: 1, grossLb: 12, tareLb: 2 }];
const counts = [
  { setting: 3, revolutions: 15, seconds: 60 },
  { setting: 2, revolutions: 10, seconds: 60 },
  { setting: 4, revolutions: 10, seconds: 30 },
];
const positive = (max: number) => fc.double({ min: 0.1, max, noNaN: true });

test("counts of 10, 15 and 20 a minute with 10 lb a revolution give 100, 150 and 200 lb a minute", () => {
  const rates = calibrationRates({ counts, catches: tenPounds });
  expect(rates.settings.map(({ setting }) => setting)).toEqual([2, 3, 4]);
  expect(rates.settings.map((one) => one.lbPerMin)).toEqual([100, 150, 200]);
  expect([rates.lbPerRev, rates.catchVariationPercent]).toEqual([10, null]);
});

test("at 25 mph setting 4 lays 480 lb on a lane mile, over two lanes 240, and an uncounted setting is not known", () => {
  const rates = calibrationRates({ counts, catches: tenPounds });
  expect(rateAtSetting(rates, 4, 25, 1)).toBe(480);
  expect(rateAtSetting(rates, 4, 25, 2)).toBe(240);
  expect(rateAtSetting(rates, 5, 25, 1)).toBeNull();
});

test("setting 4 with 200 lb a minute is in the salt band from 40 to 48 mph", () => {
  const rates = calibrationRates({ counts, catches: tenPounds });
  expect(speedsInBand(rates, 4, 1, saltBand)).toEqual({ slowestMph: 40, fastestMph: 48 });
  expect(speedsInBand(rates, 9, 1, saltBand)).toBeNull();
});

test("a rate rises in proportion to the count and to the catch", () => {
  fc.assert(
    fc.property(positive(100), positive(50), positive(10), (revolutions, netLb, factor) => {
      const rate = (revolutionsNow: number, netLbNow: number) => {
        const catches = [{ revolutions: 1, grossLb: netLbNow, tareLb: 0 }];
        const rates = calibrationRates({ counts: [{ setting: 1, revolutions: revolutionsNow, seconds: 60 }], catches });
        return rateAtSetting(rates, 1, 25, 1) ?? NaN;
      };
      const expected = factor * rate(revolutions, netLb);
      expect(Math.abs(rate(revolutions * factor, netLb) / expected - 1)).toBeLessThan(1e-12);
      expect(Math.abs(rate(revolutions, netLb * factor) / expected - 1)).toBeLessThan(1e-12);
    }),
  );
});

test("the count for a rate lays that rate again", () => {
  fc.assert(
    fc.property(
      positive(2000),
      positive(50),
      positive(60),
      fc.integer({ min: 1, max: 4 }),
      (rate, lbPerRev, speed, lanes) => {
        const count = countForRate(lbPerLaneMile(rate), lbPerRev, mph(speed), lanes);
        const again = applicationRate(lbPerMin(count * lbPerRev), mph(speed), lanes);
        expect(Math.abs(again / rate - 1)).toBeLessThan(1e-12);
      },
    ),
  );
});

test("along each row of the table the rate falls as the speed rises", () => {
  const speeds = fc.uniqueArray(fc.integer({ min: 1, max: 80 }), { minLength: 2, maxLength: 12 });
  fc.assert(
    fc.property(speeds, fc.integer({ min: 1, max: 4 }), (speedsMph, lanes) => {
      const ascending = [...speedsMph].sort((a, b) => a - b);
      for (const { cells } of rateTable(calibrationRates({ counts, catches: tenPounds }), lanes, ascending)) {
        const rates = cells.map((cell) => cell.lbPerLaneMile);
        expect(rates).toEqual([...rates].sort((a, b) => b - a));
        expect(new Set(rates).size).toBe(ascending.length);
      }
    }),
  );
});

test("the speeds of the band lay exactly its ends", () => {
  fc.assert(
    fc.property(positive(60), positive(60), (revolutions, netLb) => {
      const catches = [{ revolutions: 1, grossLb: netLb, tareLb: 0 }];
      const rates = calibrationRates({ counts: [{ setting: 1, revolutions, seconds: 60 }], catches });
      const speeds = speedsInBand(rates, 1, 1, saltBand);
      expect(rateAtSetting(rates, 1, speeds?.slowestMph ?? NaN, 1)).toBeCloseTo(300, 6);
      expect(rateAtSetting(rates, 1, speeds?.fastestMph ?? NaN, 1)).toBeCloseTo(250, 6);
    }),
  );
});

test("a count that stays at 20 and later readings of it are at the hydraulic limit", () => {
  const levelling = [10, 20, 20, 19.75, 21].map((revolutions, place) => ({
    setting: place + 1,
    revolutions,
    seconds: 60,
  }));
  expect(settingsWithLimit(levelling).map(({ revPerMin }) => revPerMin)).toEqual([10, 20, 20, 20, 20]);
  expect(settingsWithLimit(levelling).map((one) => one.isAtHydraulicLimit)).toEqual([false, false, true, true, true]);
});

test("15 revolutions in 30 seconds are 30 a minute, and none or no time is refused", () => {
  expect(revolutionsPerMinute({ setting: 1, revolutions: 15, seconds: 30 })).toBe(30);
  for (const wrong of [
    { revolutions: 0, seconds: 60 },
    { revolutions: 5, seconds: 0 },
    { revolutions: NaN, seconds: 60 },
  ]) {
    expect(() => revolutionsPerMinute({ setting: 1, ...wrong })).toThrow(RangeError);
  }
  expect(() => settingsWithLimit([...counts, ...counts])).toThrow(RangeError);
});

test("catches of 12.1, 12.6 and 11.9 lb average 12.2 and vary by 2.96 %", () => {
  const catches = [12.1, 12.6, 11.9].map((netLb) => ({ revolutions: 1, grossLb: netLb + 2, tareLb: 2 }));
  expect(lbPerRevolution(catches)).toBeCloseTo(12.2, 9);
  expect(catchVariationPercent(catches)).toBeCloseTo(2.955, 3);
  expect(repeatUncertainty(catches.slice(0, 1))).toBeNull();
});

test("a catch without revolutions, without net weight or none at all is refused", () => {
  expect(() => lbPerRevolution([])).toThrow(RangeError);
  expect(() => lbPerRevolution([{ revolutions: 0, grossLb: 5, tareLb: 1 }])).toThrow(RangeError);
  expect(() => lbPerRevolution([{ revolutions: 1, grossLb: 5, tareLb: 5 }])).toThrow(RangeError);
  expect(() => lbPerRevolution([{ revolutions: 1, grossLb: 5, tareLb: -1 }])).toThrow(RangeError);
  expect(() => timedDischarge({ grossLb: 1, tareLb: 2, seconds: 30 })).toThrow(RangeError);
});

test("speed 0, half a lane and a negative discharge are refused", () => {
  expect(() => applicationRate(lbPerMin(200), mph(0), 1)).toThrow(RangeError);
  expect(() => applicationRate(lbPerMin(200), mph(20), 0.5)).toThrow(RangeError);
  expect(() => applicationRate(lbPerMin(-1), mph(20), 1)).toThrow(RangeError);
});

// Common practice, no published source.
test("388 is 88 over the salt band of 250 to 300, 240 is 10 under, and both ends are in", () => {
  expect(commonPracticeBands.salt).toEqual(saltBand);
  expect([388, 240, 250, 300].map((rate) => distanceFromBand(rate, saltBand))).toEqual([88, -10, 0, 0]);
  expect([388, 240, 250, 300].map((rate) => bandPlace(rate, saltBand))).toEqual(["over", "under", "in", "in"]);
});
