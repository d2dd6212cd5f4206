// R 4.2.2, `mad`, `quantile` and the 3.5 limit of Iglewicz and Hoaglin (ASQC 1993) on two laboratory series of the R
// package MASS (chem: copper in flour; abbey: nickel in rock); SciPy 1.17.1 `theilslopes`. Values in
// vectors/robust.json, robust-mad-zero.json and theil-sen.json.
import { expect, test } from "vitest";
import { median } from "#app/domain/stats/median.ts";
import { medianAbsoluteDeviation } from "#app/domain/stats/median-absolute-deviation.ts";
import { modifiedZ } from "#app/domain/stats/modified-z.ts";
import { quantileType7 } from "#app/domain/stats/quantile.ts";
import { theilSen } from "#app/domain/stats/theil-sen.ts";
import madZero from "./vectors/robust-mad-zero.json";
import vectors from "./vectors/robust.json";
import lines from "./vectors/theil-sen.json";

test.each(vectors)("$id: median, MAD and quartiles equal the reference to $tolerance", (vector) => {
  const { x } = vector.inputs;
  const pairs = [
    [median(x), vector.expected.median],
    [medianAbsoluteDeviation(x), vector.expected.mad_raw],
    [quantileType7(x, 0.25), vector.expected.q1],
    [quantileType7(x, 0.75), vector.expected.q3],
  ] as const;
  for (const [found, expected] of pairs) expect(Math.abs(found - expected)).toBeLessThanOrEqual(vector.tolerance);
});

test.each(vectors)("$id: exactly the listed values lie beyond a modified z of 3.5", ({ inputs, expected }) => {
  const outliers = inputs.x.filter((value) => Math.abs(modifiedZ(inputs.x, value) ?? 0) > 3.5);
  expect(outliers.sort((a, b) => a - b)).toEqual(expected["outliers_3.5"]);
});

test.each(madZero)(
  "$id: six equal values of seven fall back to the mean deviation",
  ({ inputs, expected, tolerance }) => {
    expect(Math.abs((modifiedZ(inputs.x, 9) ?? 0) - expected.M_of_9)).toBeLessThanOrEqual(tolerance);
  },
);

test.each(lines)("$id: one wild value of eight does not move the robust line", ({ inputs, expected, tolerance }) => {
  const line = theilSen(inputs.x.map((x, place) => ({ x, y: inputs.y[place] ?? NaN })));
  expect(Math.abs((line?.slope ?? NaN) - expected.slope)).toBeLessThanOrEqual(tolerance);
  expect(Math.abs((line?.intercept ?? NaN) - expected.intercept)).toBeLessThanOrEqual(tolerance);
});
