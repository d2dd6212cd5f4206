/**
 * Weight of a cubic yard by kind of material, lb. Brine is measured in gallons.
 *
 * Source: Minnesota Pollution Control Agency, Minnesota Stormwater Manual, "Material conversions for winter parking lot
 * and sidewalk maintenance": 1.08 tons of salt, 1.4 tons of clean sand, 1.37 tons of winter sand in a cubic yard.
 */
export const lbPerCubicYardOf = { salt: 2160, sand: 2800, mix: 2740, brine: null } as const;

/** Where the densities come from, for the line beside a figure that was measured in cubic yards. */
export const densitySource =
  "Minnesota Pollution Control Agency: 1.08 tons of salt, 1.37 of sand and salt mixed, 1.4 of sand in a cubic yard";
