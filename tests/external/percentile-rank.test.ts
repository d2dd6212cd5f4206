// Mid-ranks as SciPy 1.17.1 `percentileofscore(kind="mean")` gives them. Values in vectors/percentile-rank.json.
import { expect, test } from "vitest";
import { midRank } from "#app/domain/stats/percentile-rank.ts";
import vectors from "./vectors/percentile-rank.json";

test.each(vectors)("$id: the mid-rank equals the reference to $tolerance", ({ inputs, expected, tolerance }) => {
  expect(Math.abs(midRank(inputs.x, inputs.value) - expected.mean)).toBeLessThanOrEqual(tolerance);
});
