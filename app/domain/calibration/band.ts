/** The range a rate should fall in, both ends within it, lb per lane mile. */
export type Band = { lowLbPerLaneMile: number; highLbPerLaneMile: number };

export type BandPlace = "under" | "in" | "over";

export const materialKinds = ["salt", "mix", "sand", "brine"] as const;
/** What a spreader is filled with; "mix" is salt and sand together. */
export type MaterialKind = (typeof materialKinds)[number];

/**
 * Bands of common practice, with no published source. Straight salt: 250 to 300. For salt and sand mixed, practice
 * says "about 500", drawn as 450 to 550. There is none for sand alone or for brine.
 */
export const commonPracticeBands: Partial<Record<MaterialKind, Band>> = {
  salt: { lowLbPerLaneMile: 250, highLbPerLaneMile: 300 },
  mix: { lowLbPerLaneMile: 450, highLbPerLaneMile: 550 },
};

/** Weights subtracted in binary miss a band's end by a last digit: closer than this share of the end is on the end. */
const onTheEndRatio = 1e-9;

/**
 * How far a rate lies outside the band.
 *
 * @param rateLbPerLaneMile - finite
 * @returns lb per lane mile: above 0 over the band, below 0 under it, 0 inside or on either end
 * @throws RangeError when the rate is not finite
 * @example distanceFromBand(388, { lowLbPerLaneMile: 250, highLbPerLaneMile: 300 }) // 88
 */
export function distanceFromBand(rateLbPerLaneMile: number, band: Band): number {
  if (!Number.isFinite(rateLbPerLaneMile)) throw new RangeError("a rate must be a finite number");
  const { lowLbPerLaneMile: low, highLbPerLaneMile: high } = band;
  if (rateLbPerLaneMile > high * (1 + onTheEndRatio)) return rateLbPerLaneMile - high;
  if (rateLbPerLaneMile < low * (1 - onTheEndRatio)) return rateLbPerLaneMile - low;
  return 0;
}

/**
 * Whether a rate lies under, in or over the band.
 *
 * @param rateLbPerLaneMile - finite
 * @throws RangeError when the rate is not finite
 * @example bandPlace(250, { lowLbPerLaneMile: 250, highLbPerLaneMile: 300 }) // "in"
 */
export function bandPlace(rateLbPerLaneMile: number, band: Band): BandPlace {
  const distance = distanceFromBand(rateLbPerLaneMile, band);
  if (distance === 0) return "in";
  return distance > 0 ? "over" : "under";
}
