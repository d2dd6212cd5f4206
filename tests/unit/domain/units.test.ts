import fc from "fast-check";
import { expect, test } from "vitest";
import * as units from "#app/domain/units.ts";

const amounts = fc.double({ min: 1e-6, max: 1e9, noNaN: true });

test.each([
  ["lb and kg", units.lbToKg, units.kgToLb],
  ["miles and km", units.milesToKm, units.kmToMiles],
  ["inches and mm", units.inchesToMm, units.mmToInches],
  ["gallons and litres", units.gallonsToLitres, units.litresToGallons],
  ["short tons and lb", units.shortTonsToLb, units.lbToShortTons],
  ["rates", units.lbPerLaneMileToKgPerLaneKm, units.kgPerLaneKmToLbPerLaneMile],
] as const)("%s come back from the round trip to 1e-12", (_, there, back) => {
  fc.assert(
    fc.property(amounts, (value) => Math.abs(back(there(value)) / value - 1) <= 1e-12),
    { numRuns: 1000 },
  );
});

test("100 lb per lane mile are 28.18 kg per lane km", () => {
  expect(units.lbPerLaneMileToKgPerLaneKm(100)).toBeCloseTo(28.1849, 4);
});
