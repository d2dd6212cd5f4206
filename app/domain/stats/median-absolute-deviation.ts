import { medianAbsoluteDeviation as deviationOf } from "simple-statistics";
import { assertFinite } from "./assert-finite.ts";

/**
 * The median distance from the median, not scaled to a normal distribution.
 *
 * @param values - one or more finite numbers in any order
 * @throws RangeError when the list is empty or holds anything not finite
 * @example medianAbsoluteDeviation([1, 1, 2, 2, 4, 6, 9]) // 1
 */
export function medianAbsoluteDeviation(values: readonly number[]): number {
  assertFinite(values);
  return deviationOf([...values]);
}
