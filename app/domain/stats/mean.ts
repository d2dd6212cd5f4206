import { mean as meanOf } from "simple-statistics";
import { assertFinite } from "./assert-finite.ts";

/**
 * The arithmetic mean.
 *
 * @param values - one or more finite numbers
 * @throws RangeError when the list is empty or holds anything not finite
 * @example mean([12.1, 12.6, 11.9]) // 12.2
 */
export function mean(values: readonly number[]): number {
  assertFinite(values);
  return meanOf([...values]);
}
