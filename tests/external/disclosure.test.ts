// Handbook on Statistical Disclosure Control (Hundepool and others, ESSnet), https://sdctools.github.io/HandbookSDC,
// chapter 4.2: sensitivity rules and examples 1 and 2; section 3.4: microaggregation. The attacks (quartiles that are
// members' exact values, subtraction of groups) are worked by hand. Values in vectors/sdc-*.json.
import { expect, test } from "vitest";
import { conflictsWith, differenceSizes } from "#app/domain/disclosure/groups.ts";
import { microaggregate } from "#app/domain/disclosure/microaggregate.ts";
import { defaultPolicy } from "#app/domain/disclosure/policy.ts";
import { roundTo } from "#app/domain/disclosure/rounding.ts";
import { dominanceUnsafe, pPercentUnsafe } from "#app/domain/disclosure/sums.ts";
import { groupReason, memberCell } from "#app/domain/peers/cell.ts";
import { quantileType7 } from "#app/domain/stats/quantile.ts";
import cells from "./vectors/sdc-cells.json";
import differencing from "./vectors/sdc-differencing.json";
import examples from "./vectors/sdc-handbook.json";
import leaks from "./vectors/sdc-leaks.json";
import microaggregation from "./vectors/sdc-microaggregation.json";

test.each(examples)("$id: p% and dominance judge the handbook's cell as it does", ({ inputs, expected }) => {
  const contributions = [inputs.x1, inputs.x2, inputs.total - inputs.x1 - inputs.x2];
  expect(pPercentUnsafe(contributions, inputs.p)).toBe(expected.p_unsafe);
  expect(dominanceUnsafe(contributions, inputs.n, inputs.k)).toBe(expected.nk_unsafe);
});

test.each(cells)("$id: p% and dominance follow the handbook's formulas", ({ inputs, expected }) => {
  expect(pPercentUnsafe(inputs.x, inputs.p)).toBe(expected.p_unsafe);
  expect(dominanceUnsafe(inputs.x, inputs.n, inputs.k)).toBe(expected.nk_unsafe);
});

test.each(leaks)("$id: exact quartiles of five would be three members' figures, so five are withheld", (vector) => {
  expect(vector.inputs.p.map((p) => quantileType7(vector.inputs.x, p))).toEqual(vector.expected.values);
  expect(groupReason(vector.inputs.x, defaultPolicy)).toBe("too-few");
});

test("nine figures, whose quartiles are exact members, show no quartiles", () => {
  const cell = memberCell(
    [182, 205, 231, 260, 318, 333, 341, 356, 372],
    null,
    { from: 0, to: 400, step: 50 },
    defaultPolicy,
  );
  expect(cell).toMatchObject({ state: "shown", median: 320, middleHalf: null, tenths: null, bins: [] });
});

test.each(differencing)("$id: a group without one town of another conflicts with it", ({ inputs }) => {
  const whole = inputs.groupA.map((_, place) => place);
  const without = whole.filter((place) => place !== inputs.groupB_excludes_index);
  expect(differenceSizes(whole, without)).toEqual({ onlyInFirst: 1, onlyInSecond: 0 });
  expect(conflictsWith([whole], without, inputs.minDiff)).toBe(true);
  expect(conflictsWith([whole], whole, inputs.minDiff)).toBe(false);
});

test.each(microaggregation)("$id: twelve rates become two means of six, and 220 and 310 when rounded", (vector) => {
  const means = microaggregate(vector.inputs.x, vector.inputs.k);
  vector.expected.groups.flat().forEach((value, place) => expect(means[place]).toBeCloseTo(value, 9));
  expect(means.map((value) => roundTo(value, vector.inputs.round))).toEqual(vector.expected.rounded);
});
