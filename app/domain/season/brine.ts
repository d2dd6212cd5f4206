/** Salt in brine, by weight, where salt is least likely to freeze out: the eutectic. */
const brineSaltShare = 0.233;
/** Specific gravity of that brine at 15 °C. Source: Lange's Handbook of Chemistry, 15th ed., Table 5.13. */
const brineSpecificGravity = 1.179;
/** Water at 15 °C, lb per US gallon: 0.9991 kg/l × 3.785411784 l ÷ 0.45359237 kg. */
const waterLbPerGal = 8.338;

/**
 * Salt in so many gallons of brine of 23.3 % salt, in lb: 2.29 lb a gallon of brine (not of water).
 *
 * @param brineGal - US gallons, ≥ 0
 *
 * Source: Lange's Handbook of Chemistry, 15th ed., Table 5.13 (specific gravity 1.179 at 23.3 %).
 * @example saltInBrineLb(1000) // 2290.5
 */
export function saltInBrineLb(brineGal: number): number {
  return brineGal * brineSpecificGravity * waterLbPerGal * brineSaltShare;
}

/**
 * The share of all salt that was put down wetted or as brine, 0 to 1.
 *
 * @param totalSaltLb - dry salt and the salt inside the mix, lb
 * @param wettedSaltLb - of that, wetted before or while it was spread, lb; null = not reported
 * @param brineGal - brine spread by itself or for wetting, US gallons; null = not reported
 * @returns null when neither is reported, or when no salt was put down; never above 1
 * @example liquidShare({ totalSaltLb: 100_000, wettedSaltLb: 20_000, brineGal: 0 }) // 0.2
 */
export function liquidShare(given: {
  totalSaltLb: number;
  wettedSaltLb: number | null;
  brineGal: number | null;
}): number | null {
  const { totalSaltLb, wettedSaltLb, brineGal } = given;
  if (wettedSaltLb === null && brineGal === null) return null;
  const brineSaltLb = saltInBrineLb(brineGal ?? 0);
  const allSaltLb = totalSaltLb + brineSaltLb;
  if (allSaltLb === 0) return null;
  return (Math.min(wettedSaltLb ?? 0, totalSaltLb) + brineSaltLb) / allSaltLb;
}
