// Exact definitions of the units: international yard and pound agreement of 1959; US liquid gallon of 231 cubic inches.
// Values in vectors/units.json. Chloride in salt: molar masses of IUPAC, Na 22.98977 and Cl 35.453 g/mol.
import { expect, test } from "vitest";
import { chlorideShareOfSalt } from "#app/domain/season/season-totals.ts";
import { gallonsToLitres, inchesToMm, lbPerLaneMileToKgPerLaneKm, lbToKg, milesToKm } from "#app/domain/units.ts";
import vectors from "./vectors/units.json";

const conversions: Record<string, (value: number) => number> = {
  lb_to_kg: lbToKg,
  mile_to_km: milesToKm,
  inch_to_mm: inchesToMm,
  US_gal_to_L: gallonsToLitres,
  kg_per_lane_km: lbPerLaneMileToKgPerLaneKm,
};

test.each(vectors)("$id: the factor equals the definition to the digits given", ({ expected }) => {
  const [name = "", factor = NaN] = Object.entries<number | undefined>(expected)[0] ?? [];
  const digits = (String(factor).split(".")[1] ?? "").length;
  expect(conversions[name]?.(1)).toBeCloseTo(factor, digits);
});

test("chloride makes 60.66 % of salt by weight, from the molar masses", () => {
  expect(Math.abs(chlorideShareOfSalt - 35.453 / (22.98977 + 35.453))).toBeLessThan(0.00005);
});
