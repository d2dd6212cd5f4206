// Order-statistic intervals of the median: SciPy 1.17.1 `binom`, R 4.2.2 `pbinom`; for n up to 20 a textbook's table
// A.7 agrees to its 0.1 %. Values in vectors/median-interval.json and vectors/median-interval-values.json.
import { expect, test } from "vitest";
import { medianInterval, medianIntervalRanks } from "#app/domain/stats/median-interval.ts";
import values from "./vectors/median-interval-values.json";
import ranks from "./vectors/median-interval.json";

test.each(ranks)("$id: ranks and coverage equal the reference to $tolerance", ({ inputs, expected, tolerance }) => {
  const found = medianIntervalRanks(inputs.n);
  expect(found?.lowerRank ?? null).toBe(expected.lower);
  expect(found?.upperRank ?? null).toBe(expected.upper);
  expect(Math.abs((found?.coverage ?? 0) - (expected.coverage ?? 0))).toBeLessThanOrEqual(tolerance);
});

test.each(values)("$id: the interval of ten rates runs from the 2nd to the 9th", ({ inputs, expected }) => {
  expect(medianInterval(inputs.x)).toEqual({ low: expected.lo, high: expected.hi });
});
