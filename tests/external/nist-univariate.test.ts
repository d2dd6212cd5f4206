// NIST Statistical Reference Datasets, univariate summary statistics, certified mean and standard deviation:
// https://www.itl.nist.gov/div898/strd/. Values in vectors/nist-univariate.json; the tolerance of NumAcc3 and NumAcc4
// is what sixteen digits leave when seven or eight of them are the same in all values.
import { expect, test } from "vitest";
import { mean } from "#app/domain/stats/mean.ts";
import { sampleStandardDeviation } from "#app/domain/stats/sample-standard-deviation.ts";
import vectors from "./vectors/nist-univariate.json";

type Construct = { first: number; then_repeat: number[]; times: number };
type Inputs = { data?: number[]; construct?: Construct };

function dataOf({ data, construct }: Inputs): number[] {
  if (!construct) return data ?? [];
  return [construct.first, ...Array.from({ length: construct.times }, () => construct.then_repeat).flat()];
}

test.each(vectors)("$id: mean and standard deviation equal the certified values", ({ inputs, expected, tolerance }) => {
  const data = dataOf(inputs);
  expect(data).toHaveLength(expected.n);
  const relativeError = (found: number, certified: number) => Math.abs(found - certified) / Math.abs(certified);
  expect(relativeError(mean(data), expected.mean)).toBeLessThanOrEqual(Math.max(tolerance.relative, 1e-15));
  expect(relativeError(sampleStandardDeviation(data), expected.sd)).toBeLessThanOrEqual(tolerance.relative);
});
