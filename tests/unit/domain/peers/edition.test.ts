import fc from "fast-check";
import { expect, test } from "vitest";
import { defaultPolicy } from "#app/domain/disclosure/policy.ts";
import { contributorsOf } from "#app/domain/peers/contributors.ts";
import { type RegisteredGroup, type TownInput, buildEdition } from "#app/domain/peers/edition.ts";
import { indicatorKeys, indicators, isIndicatorKey } from "#app/domain/peers/indicators.ts";
import { groupKeysOf, peerGroups } from "#app/domain/peers/peer-groups.ts";
import { inventedRegion, seededRandom } from "../region.ts";

const indicator = "rate-at-working-setting";

function build(towns: readonly TownInput[], registry: readonly RegisteredGroup[] = []) {
  const random = seededRandom(3);
  return buildEdition({ seasonStartYear: 2025, towns, registry, hasEarlierRows: false, policy: defaultPolicy, random });
}

function memberCellOf(edition: ReturnType<typeof build>, groupKey: string) {
  const found = edition.cells.find(
    (cell) => cell.audience === "member" && cell.indicator === indicator && cell.groupKey === groupKey,
  );
  if (found?.audience !== "member") throw new Error(`no member cell for ${groupKey}`);
  return found.cell;
}

function plainTowns(count: number, valueOf: (place: number) => number | null): TownInput[] {
  return Array.from({ length: count }, (_, place) => ({
    townId: place + 1,
    contributorId: place + 1,
    district: "Ridge",
    laneMiles: 100,
    values: { "salt-per-event": null, [indicator]: valueOf(place) },
  }));
}

const spread = (place: number) => 203.7 + 17.3 * place;

test("the same towns in any order give the same edition", () => {
  const region = inventedRegion();
  const expected = build(region);
  fc.assert(
    fc.property(fc.shuffledSubarray(region, { minLength: region.length }), (shuffled) => {
      expect(build(shuffled)).toEqual(expected);
    }),
    { numRuns: 20 },
  );
});

test.each([
  [5, "too-few", null],
  [6, null, { interval: false, middleHalf: false, tenths: false, bins: false }],
  [9, null, { interval: true, middleHalf: false, tenths: false, bins: false }],
  [12, null, { interval: true, middleHalf: true, tenths: false, bins: true }],
  [30, null, { interval: true, middleHalf: true, tenths: true, bins: true }],
])("with %i towns a member sees what the policy gives", (count, reason, parts) => {
  const cell = memberCellOf(build(plainTowns(count, spread)), "all");
  expect(cell.state === "withheld" ? cell.reason : null).toBe(reason);
  const shown =
    cell.state === "shown"
      ? {
          interval: cell.interval !== null,
          middleHalf: cell.middleHalf !== null,
          tenths: cell.tenths !== null,
          bins: cell.bins.length > 0,
        }
      : null;
  expect(shown).toEqual(parts);
});

test("nine towns show members a median, the wall and the download nothing", () => {
  const edition = build(plainTowns(9, spread));
  const states = edition.cells
    .filter((cell) => cell.indicator === indicator && cell.groupKey === "all")
    .map(({ audience, cell }) => [audience, cell.state, cell.state === "withheld" ? cell.reason : null]);
  expect(states).toEqual([
    ["member", "shown", null],
    ["wall", "withheld", "too-few"],
    ["download", "withheld", "too-few"],
  ]);
});

test("twenty towns that all lay 301 to 304 are too similar", () => {
  expect(memberCellOf(build(plainTowns(20, (place) => 301 + (place % 4))), "all")).toMatchObject({
    reason: "too-similar",
  });
});

test("a town without a figure is not counted and has no place", () => {
  const edition = build(plainTowns(20, (place) => (place < 3 ? null : spread(place))));
  expect(memberCellOf(edition, "all")).toMatchObject({ towns: 17 });
  expect(edition.places.map(({ townId }) => townId)).not.toContain(1);
  expect(edition.townCount).toBe(17);
});

test("three towns that one body reports for count once, weighted by lane miles", () => {
  const region = plainTowns(14, spread).map((town, place) =>
    place < 3 ? { ...town, contributorId: 1, laneMiles: [100, 100, 200][place] ?? null } : town,
  );
  expect(memberCellOf(build(region), "all")).toMatchObject({ towns: 12 });
  const [holding] = contributorsOf(region);
  expect(holding?.values[indicator]).toBeCloseTo((spread(0) + spread(1) + 2 * spread(2)) / 4, 9);
  expect([holding?.laneMiles, holding?.townIds]).toEqual([400, [1, 2, 3]]);
});

test("places come in fives from 5 to 95, in groups of twelve and more that the town is in", () => {
  const edition = build(inventedRegion());
  const places = edition.places.flatMap((one) => Object.values(one.places));
  expect(places.length).toBeGreaterThan(100);
  expect(places.every((place) => place % 5 === 0 && place >= 5 && place <= 95)).toBe(true);
  const large = edition.places.filter(({ townId }) => townId >= 400);
  expect(large.flatMap((one) => Object.keys(one.places))).not.toContain("size-400-up");
  expect(Math.max(...places)).toBe(95);
});

test("Far Shore differs from the largest size by one town, so it is withheld, with one district more to hide it", () => {
  const edition = build(inventedRegion());
  const reasonOf = (key: string) => {
    const cell = memberCellOf(edition, key);
    return cell.state === "withheld" ? cell.reason : "shown";
  };
  expect(reasonOf("district-far-shore")).toBe("too-close");
  const others = ["district-lower-fold", "district-ridge", "district-upper-fold"].map(reasonOf).sort();
  expect(others).toEqual(["shown", "shown", "too-close"]);
  for (const key of ["all", "size-under-50", "size-50-149", "size-150-399", "size-400-up"]) {
    expect(reasonOf(key)).toBe("shown");
  }
});

test("the same figures again may be published beside the earlier edition", () => {
  const first = build(inventedRegion());
  const again = build(
    inventedRegion(),
    first.members.filter(({ isPublished }) => isPublished),
  );
  expect(again.cells).toEqual(first.cells);
});

test("one corrected figure is held back, as it could be worked out from two editions", () => {
  const region = inventedRegion();
  const first = build(region);
  const [town, ...others] = region;
  if (!town) throw new Error("a town was expected");
  const corrected = [{ ...town, values: { ...town.values, [indicator]: 423.4 } }, ...others];
  const second = build(
    corrected,
    first.members.filter(({ isPublished }) => isPublished),
  );
  expect(memberCellOf(second, "all")).toMatchObject({ reason: "too-close" });
  expect(memberCellOf(second, "size-150-399").state).toBe("shown");
});

test("an earlier edition without figures is compared by its towns alone", () => {
  const first = build(inventedRegion());
  const registry = first.members
    .filter(({ isPublished }) => isPublished)
    .map((one) => ({ indicator: one.indicator, groupKey: one.groupKey, contributorIds: one.contributorIds }));
  expect(build(inventedRegion(), registry).cells).toEqual(first.cells);
});

test("while the region is held back, its newcomer does not show in the scale either", () => {
  const first = build(plainTowns(12, spread));
  const published = first.members.filter(({ isPublished }) => isPublished);
  const [low, high] = [101.3, 2931.7].map((late) => {
    const second = build(
      plainTowns(13, (place) => (place < 12 ? spread(place) : late)),
      published,
    );
    return memberCellOf(second, "all");
  });
  expect(low).toMatchObject({ state: "withheld", reason: "too-close" });
  expect(high).toEqual(low);
});

test("all groups of an indicator share one axis, in fifties, that ends at nobody's figure", () => {
  const edition = build(inventedRegion());
  const axes = edition.cells.flatMap((cell) =>
    cell.indicator === indicator && "axis" in cell.cell ? [cell.cell.axis] : [],
  );
  expect(new Set(axes.map((axis) => JSON.stringify(axis))).size).toBe(1);
  expect([axes[0]?.from, axes[0]?.to].every((end) => (end ?? 1) % 50 === 0)).toBe(true);
  expect(axes[0]?.from).toBeLessThanOrEqual(200);
  expect(axes[0]?.to).toBeGreaterThanOrEqual(350);
});

test("bars on the wall stand for about three towns each", () => {
  const edition = build(inventedRegion());
  const wall = edition.cells.find((one) => one.audience === "wall" && one.groupKey === "all")?.cell;
  const member = edition.cells.find((one) => one.audience === "member" && one.groupKey === "all")?.cell;
  if (!wall || !("bars" in wall) || !member || !("bins" in member)) throw new Error("both were expected");
  expect(wall.bars.map(({ count }) => count)).toEqual(
    member.bins.map(({ towns }) => Math.max(1, Math.round(towns / 3))),
  );
  expect(wall.townBand).toBe("50 and more");
});

test("no towns at all make an edition in which everything is withheld", () => {
  const edition = build([]);
  expect(edition.cells.every(({ cell }) => cell.state === "withheld")).toBe(true);
  expect(edition).toMatchObject({ townCount: 0, places: [], rows: { state: "withheld", reason: "too-few" } });
});

test("a town given twice and a figure that is no number are refused", () => {
  const [town] = plainTowns(1, spread);
  if (!town) throw new Error("a town was expected");
  expect(() => build([town, town])).toThrow(RangeError);
  expect(() => build([{ ...town, values: { ...town.values, [indicator]: NaN } }])).toThrow(RangeError);
});

test("a town of 118 lane miles in Upper Fold is in three groups of the menu, one of unknown size in two", () => {
  expect(groupKeysOf({ laneMiles: 118, district: "Upper Fold" })).toEqual([
    "all",
    "size-50-149",
    "district-upper-fold",
  ]);
  expect(groupKeysOf({ laneMiles: null, district: "Upper Fold" })).toEqual(["all", "district-upper-fold"]);
  const menu = peerGroups([
    { laneMiles: 118, district: "Upper Fold" },
    { laneMiles: 20, district: "Ridge" },
  ]);
  expect(menu.map(({ key, label }) => `${key}: ${label}`)).toEqual([
    "all: The whole region",
    "size-under-50: Under 50 lane miles",
    "size-50-149: 50–149 lane miles",
    "size-150-399: 150–399 lane miles",
    "size-400-up: 400 lane miles and more",
    "district-ridge: Ridge",
    "district-upper-fold: Upper Fold",
  ]);
});

test("the registry's keys are its entries' keys, and nothing else is an indicator", () => {
  expect(indicatorKeys.map((key) => indicators[key].key)).toEqual([...indicatorKeys]);
  expect([isIndicatorKey("salt-per-event"), isIndicatorKey("toString"), isIndicatorKey("")]).toEqual([
    true,
    false,
    false,
  ]);
});
