/**
 * How far a truck's rate has moved between two calibrations of the same material, setting, speed and lanes.
 *
 * @param earlierLbPerLaneMile - > 0
 * @param laterLbPerLaneMile - ≥ 0
 * @returns percent of the earlier rate, above 0 when the truck lays more than before, unrounded
 * @throws RangeError when a rate is out of range
 * @example driftPercent(300, 345) // 15
 */
export function driftPercent(earlierLbPerLaneMile: number, laterLbPerLaneMile: number): number {
  if (!(earlierLbPerLaneMile > 0 && Number.isFinite(earlierLbPerLaneMile))) {
    throw new RangeError(`the earlier rate must be above 0, not ${earlierLbPerLaneMile}`);
  }
  if (!(laterLbPerLaneMile >= 0 && Number.isFinite(laterLbPerLaneMile))) {
    throw new RangeError(`the later rate must be 0 or more, not ${laterLbPerLaneMile}`);
  }
  return (100 * (laterLbPerLaneMile - earlierLbPerLaneMile)) / earlierLbPerLaneMile;
}

/** A rate in lb per lane mile with its ± (k = 2, about 95 %). */
type RateWithPlusMinus = { lbPerLaneMile: number; plusMinus: number };

/**
 * Whether two rates differ by more than their measurements can be wrong.
 *
 * @param earlier - its ± ≥ 0
 * @param later - its ± ≥ 0
 * @returns true when the difference is larger than the root sum of squares of both ±
 * @throws RangeError when a ± is negative
 *
 * Source: JCGM 100:2008 (GUM), 5.1.2, for the uncertainty of a difference; deciding at k = 2 is the network's choice.
 * @example isDriftClear({ lbPerLaneMile: 300, plusMinus: 20 }, { lbPerLaneMile: 345, plusMinus: 30 }) // true
 */
export function isDriftClear(earlier: RateWithPlusMinus, later: RateWithPlusMinus): boolean {
  if (!(earlier.plusMinus >= 0 && later.plusMinus >= 0)) throw new RangeError("a ± must be 0 or more");
  const difference = Math.abs(later.lbPerLaneMile - earlier.lbPerLaneMile);
  return difference > Math.hypot(earlier.plusMinus, later.plusMinus);
}
