import { assertFinite } from "./assert-finite.ts";

/**
 * The percentile rank of a value by the mid-rank: the share of values below it, and half of the share equal to it.
 *
 * Ties share one rank, the median stands at 50, and turning the scale round turns r into 100 − r.
 *
 * @param values - one or more finite numbers in any order, with the value itself when it belongs to them
 * @param value - the number to place
 * @returns 0 to 100
 * @throws RangeError when the list is empty or anything is not finite
 * @example midRank([1, 2, 2, 3], 2) // 50
 */
export function midRank(values: readonly number[], value: number): number {
  assertFinite(values);
  assertFinite([value]);
  const below = values.filter((other) => other < value).length;
  const equal = values.filter((other) => other === value).length;
  return (100 * (below + equal / 2)) / values.length;
}
