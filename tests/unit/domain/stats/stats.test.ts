import fc from "fast-check";
import { expect, test } from "vitest";
import { mean } from "#app/domain/stats/mean.ts";
import { median } from "#app/domain/stats/median.ts";
import { medianAbsoluteDeviation } from "#app/domain/stats/median-absolute-deviation.ts";
import { medianInterval, medianIntervalRanks } from "#app/domain/stats/median-interval.ts";
import { modifiedZ } from "#app/domain/stats/modified-z.ts";
import { midRank } from "#app/domain/stats/percentile-rank.ts";
import { quantileType7 } from "#app/domain/stats/quantile.ts";
import { sampleStandardDeviation } from "#app/domain/stats/sample-standard-deviation.ts";
import { theilSen } from "#app/domain/stats/theil-sen.ts";

const figures = fc.array(fc.double({ min: -1e6, max: 1e6, noNaN: true }), { minLength: 1, maxLength: 80 });

/** Type 7 written out by its definition: h = (n − 1)p, between the values at its floor and the next. */
function byDefinition(values: readonly number[], p: number) {
  const sorted = [...values].sort((a, b) => a - b);
  const h = (sorted.length - 1) * p;
  const low = Math.floor(h);
  const [below = NaN, above = below] = [sorted[low], sorted[low + 1]];
  return below + (h - low) * (above - below);
}

test("in 5,000 samples the quantile equals its definition on the sorted values", () => {
  fc.assert(
    fc.property(figures, fc.double({ min: 0, max: 1, noNaN: true }), (values, p) => {
      const expected = byDefinition(values, p);
      const allowed = 1e-9 * Math.max(1, ...values.map(Math.abs));
      expect(Math.abs(quantileType7(values, p) - expected)).toBeLessThanOrEqual(allowed);
    }),
    { numRuns: 5000 },
  );
});

test("order does not matter and the list is left as it was", () => {
  const values = [9, 10, 8];
  expect(median(values)).toBe(9);
  expect(values).toEqual([9, 10, 8]);
});

test.each([
  ["quantile", (values: number[]) => quantileType7(values, 0.5)],
  ["median", median],
  ["mean", mean],
  ["standard deviation", sampleStandardDeviation],
  ["median absolute deviation", medianAbsoluteDeviation],
  ["mid-rank", (values: number[]) => midRank(values, 1)],
  ["median interval", medianInterval],
  ["modified z", (values: number[]) => modifiedZ(values, 1)],
] as const)("the %s refuses an empty list, NaN, infinity and texts", (_, statistic) => {
  const texts = JSON.parse('["10", "9", "8"]') as number[];
  for (const values of [[], [1, NaN, 3], [1, Infinity, 2], texts]) expect(() => statistic(values)).toThrow(RangeError);
});

test("p outside 0 to 1 is refused", () => {
  for (const p of [-0.1, 1.1, NaN]) expect(() => quantileType7([1, 2], p)).toThrow(RangeError);
});

test("turning the scale round turns the mid-rank r into 100 − r", () => {
  fc.assert(
    fc.property(fc.array(fc.integer({ min: 0, max: 20 }), { minLength: 1 }), (values) => {
      const value = values[0] ?? 0;
      const turned = midRank(
        values.map((one) => -one),
        -value,
      );
      expect(turned).toBeCloseTo(100 - midRank(values, value), 9);
    }),
  );
});

test("the median's interval covers at least 95 % and one rank further in would not", () => {
  for (const n of [6, 9, 12, 65, 1500, 10_000]) {
    const ranks = medianIntervalRanks(n);
    expect(ranks?.coverage).toBeGreaterThanOrEqual(0.95);
    // The tail just outside the next pair of ranks, by the normal approximation, is more than 2.5 % on a side.
    const next = ((ranks?.lowerRank ?? 0) + 0.5 - n / 2) / Math.sqrt(n / 4);
    expect(next).toBeGreaterThan(-2.05);
  }
});

test("under six values the median has no interval", () => {
  expect(medianInterval([1, 2, 3, 4, 5])).toBeNull();
  expect(() => medianIntervalRanks(2.5)).toThrow(RangeError);
});

test("values that do not spread have no modified z", () => {
  expect(modifiedZ([5, 5, 5], 9)).toBeNull();
});

test("points above one another have no robust line, and others lie on theirs", () => {
  expect(
    theilSen([
      { x: 1, y: 1 },
      { x: 1, y: 5 },
    ]),
  ).toBeNull();
  expect(
    theilSen([
      { x: 1, y: 5 },
      { x: 2, y: 7 },
      { x: 4, y: 11 },
    ]),
  ).toEqual({ slope: 2, intercept: 3 });
});
