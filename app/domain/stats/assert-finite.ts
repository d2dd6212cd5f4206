/**
 * Refuse an empty list and anything in it that is no finite number.
 *
 * The statistics library orders texts as texts and carries NaN through to a wrong, finite result without an error.
 *
 * @param values - any list
 * @throws RangeError naming the place of the first bad value, counted from 0
 * @example assertFinite([1, NaN]) // RangeError: value 1 is NaN
 */
export function assertFinite(values: readonly number[]): void {
  if (values.length === 0) throw new RangeError("a statistic needs at least one value");
  values.forEach((value, place) => {
    if (!Number.isFinite(value)) throw new RangeError(`value ${place} is ${value}; a statistic needs finite numbers`);
  });
}
