import fc from "fast-check";
import { expect, test } from "vitest";
import { driftPercent, isDriftClear } from "#app/domain/calibration/drift.ts";
import { beforeAfter } from "#app/domain/calibration/savings.ts";

const rate = fc.double({ min: 1, max: 2000, noNaN: true });

test("from 300 to 345 lb is 15 % up, to 240 is 20 % down", () => {
  expect([driftPercent(300, 345), driftPercent(300, 240), driftPercent(300, 300)]).toEqual([15, -20, 0]);
  expect(() => driftPercent(0, 10)).toThrow(RangeError);
  expect(() => driftPercent(10, NaN)).toThrow(RangeError);
});

test("the drift leads from the earlier rate to the later", () => {
  fc.assert(
    fc.property(rate, rate, (earlier, later) => {
      expect((earlier * (1 + driftPercent(earlier, later) / 100)) / later).toBeCloseTo(1, 9);
    }),
  );
});

test("45 lb apart is clear with ± 20 and 30, and not with ± 30 and 35", () => {
  const earlier = { lbPerLaneMile: 300, plusMinus: 20 };
  const later = { lbPerLaneMile: 345, plusMinus: 30 };
  expect(isDriftClear(earlier, later)).toBe(true);
  expect(isDriftClear({ ...earlier, plusMinus: 30 }, { ...later, plusMinus: 35 })).toBe(false);
  expect(() => isDriftClear({ ...earlier, plusMinus: -1 }, later)).toThrow(RangeError);
});

const change = {
  beforeLbPerLaneMile: 400,
  afterLbPerLaneMile: 300,
  laneMiles: 80,
  eventCount: 25,
  priceCentsPerTon: 7000,
};

test("400 to 300 lb on 80 lane miles and 25 events at $70 saves 100 tons and $7,000", () => {
  expect(beforeAfter(change)).toEqual({
    savedLbPerLaneMile: 100,
    savedPercent: 25,
    savedCentsPerLaneMile: 350,
    season: { savedTons: 100, savedCents: 700_000 },
  });
});

test("what is not known stays unknown, and zero events are known", () => {
  expect(beforeAfter({ ...change, priceCentsPerTon: null })).toMatchObject({
    savedCentsPerLaneMile: null,
    season: { savedTons: 100, savedCents: null },
  });
  expect(beforeAfter({ ...change, laneMiles: null }).season).toBeNull();
  expect(beforeAfter({ ...change, eventCount: null }).season).toBeNull();
  expect(beforeAfter({ ...change, eventCount: 0 }).season).toEqual({ savedTons: 0, savedCents: 0 });
});

test("laying more is a saving below zero, and figures below zero are refused", () => {
  expect(beforeAfter({ ...change, afterLbPerLaneMile: 500 })).toMatchObject({
    savedPercent: -25,
    season: { savedTons: -100, savedCents: -700_000 },
  });
  for (const wrong of [
    { beforeLbPerLaneMile: 0 },
    { afterLbPerLaneMile: -1 },
    { laneMiles: -1 },
    { eventCount: NaN },
  ]) {
    expect(() => beforeAfter({ ...change, ...wrong })).toThrow(RangeError);
  }
});
