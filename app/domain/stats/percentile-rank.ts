import { assertFinite } from "./assert-finite.ts";

/** How many of the sorted values come before the first that fails `isBefore`. */
function countBefore(sorted: readonly number[], isBefore: (value: number) => boolean) {
  let [low, high] = [0, sorted.length];
  while (low < high) {
    const middle = Math.floor((low + high) / 2);
    if (isBefore(sorted[middle] ?? Number.NaN)) low = middle + 1;
    else high = middle;
  }
  return low;
}

/**
 * A function that gives any value's mid-rank among the values: `midRank` for placing many.
 *
 * @param values - one or more finite numbers in any order; sorted once
 * @returns value => 0 to 100; throws RangeError when the value is not finite
 * @throws RangeError when the list is empty or holds anything not finite
 * @example [1, 2, 3].map(midRankAmong([1, 2, 2, 3])) // [12.5, 50, 87.5]
 */
export function midRankAmong(values: readonly number[]): (value: number) => number {
  assertFinite(values);
  const sorted = [...values].sort((a, b) => a - b);
  return (value) => {
    assertFinite([value]);
    const below = countBefore(sorted, (other) => other < value);
    const notAbove = countBefore(sorted, (other) => other <= value);
    return (100 * (below + notAbove)) / 2 / sorted.length;
  };
}

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
  return midRankAmong(values)(value);
}
