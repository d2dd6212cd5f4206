import { sampleStandardDeviation as standardDeviationOf } from "simple-statistics";
import { assertFinite } from "./assert-finite.ts";

/**
 * The standard deviation with n − 1 in the denominator.
 *
 * @param values - two or more finite numbers
 * @throws RangeError when there are fewer than two values or anything is not finite
 * @example sampleStandardDeviation([1, 3, 2]) // 1
 */
export function sampleStandardDeviation(values: readonly number[]): number {
  assertFinite(values);
  if (values.length < 2) throw new RangeError("a standard deviation needs at least two values");
  return standardDeviationOf([...values]);
}
