import { kgToLb, lb, type Lb, shortTonsToLb } from "../units.ts";
import type { MaterialKind } from "#app/domain/calibration/band.ts";

/** The units in which piles and deliveries are written down. */
export const stockUnits = ["ton", "lb", "kg", "tonne", "cubic-yard"] as const;
export type StockUnit = (typeof stockUnits)[number];

/** Exact. Source: definition of the tonne. */
const kgPerTonne = 1000;

/**
 * What a cubic yard usually weighs, lb, where a town has not weighed its own.
 *
 * Source: Minnesota Pollution Control Agency, Minnesota Stormwater Manual, "Material conversions for winter parking lot
 * and sidewalk maintenance": 1.08 short tons a cubic yard of salt, 1.4 of clean sand, 1.37 of winter sand.
 * A pile's grain and moisture move this by a sixth and more, so the density used is kept beside the figure.
 */
export const usualLbPerCubicYard: Record<Exclude<MaterialKind, "brine">, number> = {
  salt: 2160,
  sand: 2800,
  mix: 2740,
};

/** Densities that a solid for the road can have, lb per cubic yard: outside them it is a slip of the pen. */
export const possibleLbPerCubicYard = { min: 1000, max: 4500 };

/** Whether a text names a unit of stock. */
export function isStockUnit(text: string): text is StockUnit {
  return stockUnits.some((unit) => unit === text);
}

/**
 * A quantity of stock in pounds.
 *
 * @param quantity - in `unit`, ≥ 0
 * @param lbPerCubicYard - density, needed for cubic yards alone; null otherwise
 * @throws RangeError when the quantity is negative or not finite, or cubic yards come without a density above 0
 *
 * Source: unit identities; cubic yards by the density given.
 * @example quantityToLb(5, "cubic-yard", 2160) // 10800
 */
export function quantityToLb(quantity: number, unit: StockUnit, lbPerCubicYard: number | null): Lb {
  if (!(quantity >= 0)) throw new RangeError(`a quantity of stock must be 0 or more, not ${quantity}`);
  switch (unit) {
    case "lb":
      return lb(quantity);
    case "ton":
      return shortTonsToLb(quantity);
    case "kg":
      return kgToLb(quantity);
    case "tonne":
      return kgToLb(quantity * kgPerTonne);
    case "cubic-yard":
      if (lbPerCubicYard === null || !(lbPerCubicYard > 0)) {
        throw new RangeError("cubic yards need a density above 0 lb per cubic yard");
      }
      return lb(quantity * lbPerCubicYard);
  }
}
