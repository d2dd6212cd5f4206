import { createHash } from "node:crypto";
import { expect, test } from "vitest";
import { generateRegion } from "../../../data/demo/generate.js";

const region = generateRegion();
const townById = new Map(region.town.map((town) => [town.id, town]));

function sha256(value: unknown) {
  return createHash("sha256").update(JSON.stringify(value)).digest("hex");
}

/** Lane miles by town, from the last season in which no slip is planted. */
function laneMilesByTown() {
  const settled = region.season_figure.filter((figure) => figure.season_start_year < 2025);
  return new Map(settled.map((figure) => [figure.town_id, figure.lane_miles]));
}

function countBy<Item>(items: Iterable<Item>, keyOf: (item: Item) => string) {
  const counts: Record<string, number> = {};
  for (const item of items) counts[keyOf(item)] = (counts[keyOf(item)] ?? 0) + 1;
  return counts;
}

function sizeBand(laneMiles: number) {
  if (laneMiles < 50) return "under 50";
  if (laneMiles < 150) return "50-149";
  return laneMiles < 400 ? "150-399" : "400 and more";
}

test("the same seed gives the same region to the last byte, another seed another one", () => {
  expect(sha256(generateRegion({ seed: 7 }))).toBe(sha256(generateRegion({ seed: 7 })));
  expect(sha256(generateRegion({ seed: 7 }))).not.toBe(sha256(generateRegion({ seed: 8 })));
});

test("65 towns with 65 names lie in four districts of 13 to 19", () => {
  expect(region.town).toHaveLength(65);
  expect(new Set(region.town.map((town) => town.name)).size).toBe(65);
  const districts = countBy(region.town, (town) => town.district);
  expect(Object.keys(districts).sort()).toEqual(["Lakeside", "Lower Tarn", "Ridge", "Upper Tarn"]);
  for (const townCount of Object.values(districts)) {
    expect(townCount).toBeGreaterThanOrEqual(13);
    expect(townCount).toBeLessThanOrEqual(19);
  }
});

test("12 towns are under 50 lane miles, 24 of 50 to 149, 20 of 150 to 399, 9 of 400 and more", () => {
  expect(countBy(laneMilesByTown().values(), sizeBand)).toEqual({
    "under 50": 12,
    "50-149": 24,
    "150-399": 20,
    "400 and more": 9,
  });
});

test("a size and a district never differ by fewer than 5 towns on either side", () => {
  const bandOf = new Map([...laneMilesByTown()].map(([townId, laneMiles]) => [townId, sizeBand(laneMiles)]));
  for (const band of new Set(bandOf.values())) {
    for (const district of new Set(region.town.map((town) => town.district))) {
      const onlyInBand = region.town.filter((town) => bandOf.get(town.id) === band && town.district !== district);
      const onlyInDistrict = region.town.filter((town) => bandOf.get(town.id) !== band && town.district === district);
      expect(Math.min(onlyInBand.length, onlyInDistrict.length), `${band} and ${district}`).toBeGreaterThanOrEqual(5);
    }
  }
});

test("one body reports for three small towns of its own district", () => {
  const members = region.town.filter((town) => town.reports_through_town_id !== null);
  const laneMiles = laneMilesByTown();
  expect(members).toHaveLength(3);
  expect(new Set(members.map((town) => town.reports_through_town_id)).size).toBe(1);
  for (const town of members) {
    expect(laneMiles.get(town.id)).toBeLessThan(50);
    expect(townById.get(town.reports_through_town_id ?? 0)?.district).toBe(town.district);
  }
});

test("every town has one director, and the six of the walk-through have their roles and towns", () => {
  const directorTowns = region.user_account.filter((person) => person.role === "director").map((one) => one.town_id);
  expect(directorTowns).toHaveLength(65);
  expect(new Set(directorTowns).size).toBe(65);
  const cast = region.user_account.slice(0, 6).map((person) => [person.subject, person.role, townName(person.town_id)]);
  expect(cast).toEqual([
    ["ilse.tarrant", "coordinator", null],
    ["ruben.vale", "analyst", null],
    ["dell.farrow", "recorder", "Quillbrook"],
    ["maren.oake", "director", "Quillbrook"],
    ["tobin.ashe", "recorder", "Fallowmere"],
    ["hester.lund", "director", "Fallowmere"],
  ]);
});

test("no two people share a subject or an e-mail address, and every address is of a reserved domain", () => {
  expect(new Set(region.user_account.map((person) => person.subject)).size).toBe(region.user_account.length);
  expect(new Set(region.user_account.map((person) => person.email)).size).toBe(region.user_account.length);
  for (const person of region.user_account) expect(person.email).toMatch(/^[a-z.]+@[a-z-]+\.example$/);
});

test("fleets are 2 to 24 trucks with no unit number twice in a town, three in ten with ground-speed control", () => {
  for (const [townId, laneMiles] of laneMilesByTown()) {
    const fleet = region.truck.filter((truck) => truck.town_id === townId);
    expect(fleet.length).toBeGreaterThanOrEqual(2);
    expect(fleet.length).toBeLessThanOrEqual(24);
    expect(new Set(fleet.map((truck) => truck.unit_number)).size).toBe(fleet.length);
    // Quillbrook's eight trucks for 118 lane miles are written down; the least and the most have no room to follow.
    if (townName(townId) === "Quillbrook" || fleet.length === 2 || fleet.length === 24) continue;
    expect(laneMiles / fleet.length, townName(townId) ?? "").toBeGreaterThan(17);
    expect(laneMiles / fleet.length, townName(townId) ?? "").toBeLessThan(36);
  }
  const groundSpeedCount = region.truck.filter((truck) => truck.control === "ground-speed").length;
  expect(groundSpeedCount / region.truck.length).toBeGreaterThan(0.25);
  expect(groundSpeedCount / region.truck.length).toBeLessThan(0.4);
});

test("every town buys salt at $58 to $76 a ton, about 60 % a mix of 10 to 30 % salt, about a third make brine", () => {
  const salt = region.material.filter((material) => material.kind === "salt");
  expect(salt).toHaveLength(65);
  for (const { price_cents_per_ton, salt_share } of salt) {
    expect(salt_share).toBe(1);
    expect(price_cents_per_ton).toBeGreaterThanOrEqual(5800);
    expect(price_cents_per_ton).toBeLessThanOrEqual(7600);
  }
  const mixes = region.material.filter((material) => material.kind === "mix");
  expect(mixes.length / 65).toBeGreaterThan(0.5);
  expect(mixes.length / 65).toBeLessThan(0.72);
  for (const mix of mixes) {
    expect(mix.salt_share).toBeGreaterThanOrEqual(0.1);
    expect(mix.salt_share).toBeLessThanOrEqual(0.3);
  }
  const brineShare = region.material.filter((material) => material.kind === "brine").length / 65;
  expect(brineShare).toBeGreaterThan(0.2);
  expect(brineShare).toBeLessThan(0.45);
});

test("one job asks for the edition of each past season, none for 2025-26", () => {
  expect(region.job.map((job) => `${job.dedupe_key} ${job.payload}`)).toEqual(
    [2021, 2022, 2023, 2024].map((year) => `publish-edition:${year}:1 {"seasonStartYear":${year},"number":1}`),
  );
});

function townName(townId: number | null) {
  return townId === null ? null : townById.get(townId)?.name;
}
