import fc from "fast-check";
import { expect, test } from "vitest";
import {
  directGalPerLaneMile,
  directGalPerMin,
  prewetGalPerMin,
  prewetGalPerTon,
  timedGalPerMin,
} from "#app/domain/calibration/liquids.ts";

const positive = fc.double({ min: 0.01, max: 1000, noNaN: true });

test("half a gallon in 30 seconds is 1 a minute, 10 gal a ton on 200 lb a minute", () => {
  const galPerMin = timedGalPerMin({ gallons: 0.5, seconds: 30 });
  expect(galPerMin).toBe(1);
  expect(prewetGalPerTon({ galPerMin, dryLbPerMin: 200 })).toBe(10);
});

test("20 gal a minute at 30 mph lay 40 gal on a lane mile, over two lanes 20", () => {
  expect(directGalPerLaneMile({ galPerMin: 20, speedMph: 30, lanes: 1 })).toBe(40);
  expect(directGalPerLaneMile({ galPerMin: 20, speedMph: 30, lanes: 2 })).toBe(20);
});

test("each inverse leads back to the flow", () => {
  fc.assert(
    fc.property(positive, positive, fc.integer({ min: 1, max: 4 }), (galPerMin, other, lanes) => {
      const galPerTon = prewetGalPerTon({ galPerMin, dryLbPerMin: other });
      expect(prewetGalPerMin({ galPerTon, dryLbPerMin: other }) / galPerMin).toBeCloseTo(1, 12);
      const galPerLaneMile = directGalPerLaneMile({ galPerMin, speedMph: other, lanes });
      expect(directGalPerMin({ galPerLaneMile, speedMph: other, lanes }) / galPerMin).toBeCloseTo(1, 12);
    }),
  );
});

test("speed 0, half a lane, no time and no dry material are refused", () => {
  expect(() => directGalPerLaneMile({ galPerMin: 20, speedMph: 0, lanes: 1 })).toThrow(RangeError);
  expect(() => directGalPerMin({ galPerLaneMile: 20, speedMph: 30, lanes: 0.5 })).toThrow(RangeError);
  expect(() => timedGalPerMin({ gallons: 1, seconds: 0 })).toThrow(RangeError);
  expect(() => prewetGalPerTon({ galPerMin: 1, dryLbPerMin: 0 })).toThrow(RangeError);
});
