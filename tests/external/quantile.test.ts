// Type-7 quantiles as R 4.2.2 `quantile(type = 7)` gives them, NumPy 2.4 ("linear") and MariaDB's PERCENTILE_CONT
// agree; R's data set `precip` (70 cities, inches of rain). Values in vectors/quantile.json. The sample of ten in
// vectors/quantile-guard.json tells the statistics library's older type 2 from the type 7 it has had since 7.8.9.
import { expect, test } from "vitest";
import { quantileType7 } from "#app/domain/stats/quantile.ts";
import guard from "./vectors/quantile-guard.json";
import vectors from "./vectors/quantile.json";

test.each(vectors)("$id: quantiles of type 7 equal the reference to $tolerance", ({ inputs, expected, tolerance }) => {
  expect(inputs.p).toHaveLength(expected.length);
  inputs.p.forEach((p, place) => {
    expect(Math.abs(quantileType7(inputs.x, p) - (expected[place] ?? NaN))).toBeLessThanOrEqual(tolerance);
  });
});

test.each(guard)("$id: the library still gives type 7 and not the type 2 of its older versions", (vector) => {
  const found = vector.inputs.p.map((p) => quantileType7(vector.inputs.x, p));
  vector.expected["ge_7.8.9"].forEach((value, place) => expect(found[place]).toBeCloseTo(value, 12));
  expect(found[1]).not.toBeCloseTo(vector.expected["le_7.8.8"][1] ?? NaN, 6);
});
