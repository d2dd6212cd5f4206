import { quantileSorted } from "simple-statistics";
import { assertFinite } from "./assert-finite.ts";

/**
 * The p-quantile of the values, type 7: linear between the order statistics at (n − 1)p.
 *
 * The library changed from type 2 to type 7 within a patch release, so its version is pinned and guarded by a test.
 *
 * @param values - one or more finite numbers in any order; not changed
 * @param p - 0 to 1
 * @returns the quantile in the unit of the values
 * @throws RangeError when the list is empty, holds anything not finite, or p is outside 0 to 1
 *
 * Source: R. J. Hyndman and Y. Fan, "Sample quantiles in statistical packages", The American Statistician 50 (1996),
 * 361–365, definition 7.
 * @example quantileType7([3, 5, 7, 8], 0.25) // 4.5
 */
export function quantileType7(values: readonly number[], p: number): number {
  assertFinite(values);
  if (!(p >= 0 && p <= 1)) throw new RangeError(`p must lie between 0 and 1, not ${p}`);
  return quantileSorted(
    [...values].sort((a, b) => a - b),
    p,
  );
}
