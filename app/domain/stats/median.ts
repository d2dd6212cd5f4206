import { quantileType7 } from "./quantile.ts";

/**
 * The middle value; with an even number of values, the mean of the middle two.
 *
 * @param values - one or more finite numbers in any order
 * @throws RangeError when the list is empty or holds anything not finite
 * @example median([1, 9, 2]) // 2
 */
export function median(values: readonly number[]): number {
  return quantileType7(values, 0.5);
}
