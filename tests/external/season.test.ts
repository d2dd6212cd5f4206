import { readFileSync } from "node:fs";
import { expect, test } from "vitest";
import { saltInBrineLb } from "#app/domain/season/brine.ts";
import { chlorideShareOfSalt, seasonTotals } from "#app/domain/season/season-totals.ts";
import { quantityToLb, usualLbPerCubicYard } from "#app/domain/season/stock-quantity.ts";
import { lbToShortTons, shortTonsToLb } from "#app/domain/units.ts";

type YardRow = {
  id: string;
  cubic_yards: number;
  sand_tons_published?: number;
  salt_tons_published?: number;
  note: string;
};
type YardTable = { source: string; rows: YardRow[] };

const yards = JSON.parse(readFileSync(new URL("./vectors/cubic-yards.json", import.meta.url), "utf8")) as YardTable;
/** The table prints 6.4 tons for 5 cubic yards of salt, where its own factor of 1.08 gives 5.4. */
const misprinted = new Set(["MPCA-YD-05"]);

// Minnesota Pollution Control Agency, Minnesota Stormwater Manual, "Material conversions for winter parking lot and
// sidewalk maintenance", table of cubic yards to tons; printed to one decimal.
test("cubic yards of sand and salt weigh what the Stormwater Manual prints, to its decimal", () => {
  const salted = yards.rows.filter((row) => row.salt_tons_published !== undefined && !misprinted.has(row.id));
  const sanded = yards.rows.filter((row) => row.sand_tons_published !== undefined);
  expect(salted.length).toBeGreaterThanOrEqual(12);
  expect(sanded.length).toBeGreaterThanOrEqual(12);
  for (const { id, cubic_yards, salt_tons_published = NaN } of salted) {
    const tons = lbToShortTons(quantityToLb(cubic_yards, "cubic-yard", usualLbPerCubicYard.salt));
    expect(Math.abs(tons - salt_tons_published), id).toBeLessThan(0.0501);
  }
  for (const { id, cubic_yards, sand_tons_published = NaN } of sanded) {
    const tons = lbToShortTons(quantityToLb(cubic_yards, "cubic-yard", usualLbPerCubicYard.sand));
    expect(Math.abs(tons - sand_tons_published), id).toBeLessThan(0.0501);
  }
});

// Lange's Handbook of Chemistry, 15th ed., Table 5.13: 23.3 % sodium chloride has a specific gravity of 1.179; with
// water of 8.338 lb a gallon that is 9.83 lb of brine and 2.29 lb of salt a gallon.
test("a gallon of brine at 23.3 % holds 2.29 lb of salt", () => {
  expect(saltInBrineLb(1)).toBeCloseTo(2.29, 2);
  expect(saltInBrineLb(1) / 0.233).toBeCloseTo(9.83, 2);
});

// Iowa Department of Transportation, statement on salt brine (2012): 50 gallons on a lane mile are about 110 lb of salt.
test("50 gallons of brine on a lane mile hold about the 110 lb of salt that Iowa's statement says", () => {
  expect(Math.abs(saltInBrineLb(50) / 110 - 1)).toBeLessThan(0.05);
});

// Wisconsin Department of Transportation, figures carried by two news reports: 526,000 tons on 34,339 lane miles.
test("526,000 tons of salt on 34,339 lane miles are 15.32 tons on each", () => {
  const totals = seasonTotals({
    laneMiles: 34_339,
    eventCount: 30,
    saltLb: shortTonsToLb(526_000),
    mixLb: 0,
    mixSaltShare: null,
    sandLb: 0,
    brineGal: null,
    materialCostCents: null,
  });
  expect(totals.saltTonsPerLaneMile).toBeCloseTo(15.32, 2);
});

// Molar masses of sodium (22.990) and chlorine (35.453 g/mol): 60.66 % of salt is chloride.
test("the chloride in salt is 60.66 % by weight", () => {
  expect(chlorideShareOfSalt).toBeCloseTo(35.453 / (22.99 + 35.453), 4);
});

// A winter-sand contract of a state highway department asks for 80 to 120 lb of salt in a cubic yard of sand, which at
// 1.4 tons a cubic yard is 2.78 to 4.11 % of the mix by weight.
test.each([
  [80, 2.78],
  [120, 4.11],
])("%d lb of salt in a cubic yard of sand are %d %% of the mix", (saltLb, percent) => {
  const sandLb = quantityToLb(1, "cubic-yard", usualLbPerCubicYard.sand);
  expect((100 * saltLb) / (sandLb + saltLb)).toBeCloseTo(percent, 2);
});
