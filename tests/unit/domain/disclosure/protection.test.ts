import fc from "fast-check";
import { expect, test } from "vitest";
import { protectedBins } from "#app/domain/disclosure/bins.ts";
import { conflictsWith, differenceSizes, publishableGroups } from "#app/domain/disclosure/groups.ts";
import { microaggregate } from "#app/domain/disclosure/microaggregate.ts";
import { defaultPolicy, publicPolicy } from "#app/domain/disclosure/policy.ts";
import { laneMileBand, protectedNumber, roundTo, townBand } from "#app/domain/disclosure/rounding.ts";
import { dominanceUnsafe, pPercentUnsafe } from "#app/domain/disclosure/sums.ts";

const rates = fc.double({ min: 50, max: 900, noNaN: true });

test("388 rounds to 390 by tens, 0.3 stays 0.3 by tenths, and 12,345 keeps three digits", () => {
  expect([roundTo(388, 10), roundTo(385, 10), roundTo(0.3, 0.1)]).toEqual([390, 390, 0.3]);
  expect(protectedNumber(12_345, 10, 3)).toBe(12_300);
  expect(() => roundTo(NaN, 10)).toThrow(RangeError);
  expect(() => roundTo(5, 0)).toThrow(RangeError);
});

test("towns are banded at 10, 15, 25 and 50, lane miles at 50, 150 and 400", () => {
  expect([9, 10, 14, 15, 24, 25, 49, 50, 65].map((towns) => townBand(towns))).toEqual([
    "under 10",
    "10–14",
    "10–14",
    "15–24",
    "15–24",
    "25–49",
    "25–49",
    "50 and more",
    "50 and more",
  ]);
  expect([0, 49.9, 50, 149.6, 150, 399, 400, 2000].map((miles) => laneMileBand(miles))).toEqual([
    "under 50",
    "under 50",
    "50–149",
    "50–149",
    "150–399",
    "150–399",
    "400 and more",
    "400 and more",
  ]);
});

test("the public policy holds every limit but p", () => {
  expect(publicPolicy(defaultPolicy)).not.toHaveProperty("pPercent");
  expect(Object.keys(publicPolicy(defaultPolicy))).toHaveLength(Object.keys(defaultPolicy).length - 1);
});

test("eleven values have no bins, twelve that spread have", () => {
  const spread = Array.from({ length: 12 }, (_, place) => 200 + 23.7 * place);
  expect(protectedBins(spread.slice(1), 10)).toEqual([]);
  expect(protectedBins(spread, 10).length).toBeGreaterThan(1);
});

test("bins hold three towns or more, cover all, begin and end open, and touch at multiples of the base", () => {
  fc.assert(
    fc.property(fc.array(rates, { minLength: 12, maxLength: 90 }), (values) => {
      const bins = protectedBins(values, 10);
      if (bins.length === 0) return;
      expect(Math.min(...bins.map(({ towns }) => towns))).toBeGreaterThanOrEqual(3);
      expect([bins[0]?.from, bins.at(-1)?.to]).toEqual([null, null]);
      bins.forEach(({ from, to, towns }, place) => {
        const inside = values.filter((value) => value >= (from ?? -Infinity) && value < (to ?? Infinity));
        expect(inside).toHaveLength(towns);
        if (to !== null) expect([to % 10, bins[place + 1]?.from]).toEqual([0, to]);
      });
      const barelyFilled = bins.filter(({ towns }) => towns === 3).length;
      expect(barelyFilled * 2).toBeLessThanOrEqual(bins.length);
    }),
    { numRuns: 1000 },
  );
});

test("bins do not depend on the order of the towns", () => {
  const shuffles = fc
    .array(rates, { minLength: 12, maxLength: 60 })
    .chain((values) => fc.tuple(fc.constant(values), fc.shuffledSubarray(values, { minLength: values.length })));
  fc.assert(
    fc.property(shuffles, ([values, shuffled]) => {
      expect(protectedBins(shuffled, 10)).toEqual(protectedBins(values, 10));
    }),
  );
});

test("groups that share all, nothing or differ by five on a side are fine, by one to four are not", () => {
  const whole = Array.from({ length: 20 }, (_, place) => place);
  for (const size of [1, 2, 3, 4]) expect(conflictsWith([whole], whole.slice(size), 5)).toBe(true);
  expect(conflictsWith([whole], whole.slice(5), 5)).toBe(false);
  expect(conflictsWith([whole], whole, 5)).toBe(false);
  expect(conflictsWith([whole.slice(0, 10)], whole.slice(10), 5)).toBe(false);
  expect(differenceSizes([1, 2, 3], [2, 3, 4, 5])).toEqual({ onlyInFirst: 1, onlyInSecond: 2 });
});

function group(groupKey: string, from: number, to: number, partition = "size") {
  return { groupKey, partition, members: Array.from({ length: to - from }, (_, place) => from + place) };
}

test("when the rest of a partition would be three towns, its smallest group is left out as well", () => {
  const candidates = [group("all", 0, 30, "all"), group("small", 0, 10), group("middle", 10, 27)];
  expect([...publishableGroups(candidates, [], "all", 5)]).toEqual(["all", "middle"]);
});

test("a rest of six towns, or no rest, leaves every group in", () => {
  const sixLeft = [group("all", 0, 30, "all"), group("small", 0, 10), group("middle", 10, 24)];
  expect([...publishableGroups(sixLeft, [], "all", 5)]).toEqual(["all", "small", "middle"]);
  const noneLeft = [group("all", 0, 30, "all"), group("small", 0, 10), group("middle", 10, 30)];
  expect([...publishableGroups(noneLeft, [], "all", 5)]).toEqual(["all", "small", "middle"]);
});

test("a district that differs from a size by two towns is left out, the size stays", () => {
  const candidates = [
    group("all", 0, 40, "all"),
    group("small", 0, 12),
    group("large", 12, 40),
    group("lake", 2, 14, "district"),
  ];
  expect([...publishableGroups(candidates, [], "all", 5)]).toEqual(["all", "small", "large"]);
});

test("a group with one town more than in an earlier edition is left out", () => {
  const earlier = [group("all", 0, 30).members];
  expect([...publishableGroups([group("all", 0, 31, "all")], earlier, "all", 5)]).toEqual([]);
  expect([...publishableGroups([group("all", 0, 30, "all")], earlier, "all", 5)]).toEqual(["all"]);
});

test("microaggregation keeps the mean, and every value is shared by k towns or more", () => {
  fc.assert(
    fc.property(fc.array(rates, { minLength: 5, maxLength: 80 }), (values) => {
      const means = microaggregate(values, 5);
      const sum = (list: number[]) => list.reduce((total, value) => total + value, 0);
      expect(Math.abs(sum(means) / sum(values) - 1)).toBeLessThan(1e-12);
      for (const value of means) expect(means.filter((other) => other === value).length).toBeGreaterThanOrEqual(5);
    }),
  );
  expect(() => microaggregate([1, 2, 3, 4], 5)).toThrow(RangeError);
});

test("a negative contribution has no place in the sum rules", () => {
  expect(() => pPercentUnsafe([5, -1], 10)).toThrow(RangeError);
  expect(() => dominanceUnsafe([5, NaN], 2, 85)).toThrow(RangeError);
});
