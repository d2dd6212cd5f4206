import { assertFinite } from "#app/domain/stats/assert-finite.ts";
import { mean } from "#app/domain/stats/mean.ts";

/**
 * The values with each replaced by the mean of at least k that lie nearest to it in order.
 *
 * The sorted values are cut into as many groups of k as there is room for, as even in size as can be, larger ones
 * first. The mean of all stays what it was.
 *
 * @param values - k or more, in any order
 * @param k - fewest values to a group, a whole number from 1 up
 * @returns in the order of the values, unrounded
 * @throws RangeError when there are fewer than k values, or one is not finite
 *
 * Source: Handbook on Statistical Disclosure Control (ESSnet), section 3.4, microaggregation; the even cut is our own.
 * @example microaggregate([1, 9, 2, 8], 2) // [1.5, 8.5, 1.5, 8.5]
 */
export function microaggregate(values: readonly number[], k: number): number[] {
  assertFinite(values);
  if (!Number.isInteger(k) || k < 1) throw new RangeError(`k must be a whole number from 1 up, not ${k}`);
  if (values.length < k) throw new RangeError(`${values.length} values do not fill a group of ${k}`);
  const places = values.map((value, place) => ({ value, place })).sort((a, b) => a.value - b.value);
  const groupCount = Math.floor(values.length / k);
  const smallest = Math.floor(values.length / groupCount);
  const larger = values.length % groupCount;
  const result = new Array<number>(values.length);
  let start = 0;
  for (let group = 0; group < groupCount; group++) {
    const members = places.slice(start, start + smallest + (group < larger ? 1 : 0));
    const centre = mean(members.map(({ value }) => value));
    for (const { place } of members) result[place] = centre;
    start += members.length;
  }
  return result;
}
