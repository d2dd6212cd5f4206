import { type DisclosurePolicy, defaultPolicy } from "./policy.ts";

/**
 * The multiple of the base that lies nearest; halves go up.
 *
 * @param value - finite
 * @param base - > 0, in the unit of the value
 * @throws RangeError when the value is not finite or the base is not above 0
 * @example roundTo(388, 10) // 390
 */
export function roundTo(value: number, base: number): number {
  if (!Number.isFinite(value)) throw new RangeError(`a figure to round must be finite, not ${value}`);
  if (!(base > 0)) throw new RangeError(`a rounding base must be above 0, not ${base}`);
  // Fifteen digits cut off what binary fractions add, such as 0.30000000000000004.
  return Number((Math.round(value / base) * base).toPrecision(15));
}

/**
 * The value as it may be published: a multiple of the base, with no more significant digits than allowed.
 *
 * @param value - finite
 * @param base - > 0, in the unit of the value
 * @param significantDigits - 1 to 15
 * @throws RangeError when an argument lies outside its range
 * @example protectedNumber(12345, 10, 3) // 12300
 */
export function protectedNumber(value: number, base: number, significantDigits: number): number {
  return Number(roundTo(value, base).toPrecision(significantDigits));
}

/** A half-open range between two borders, in words, with an en dash. */
function rangeWords(low: number, high: number | null) {
  return high === null ? `${low} and more` : `${low}–${high - 1}`;
}

/**
 * A number of towns as a band.
 *
 * @param towns - at least the policy's first band border
 * @throws RangeError when there are fewer
 * @example townBand(17) // "15–24"
 */
export function townBand(towns: number, { townBands }: Pick<DisclosurePolicy, "townBands"> = defaultPolicy): string {
  const low = townBands.findLast((border) => towns >= border);
  if (low === undefined) throw new RangeError(`${towns} towns are too few for a band`);
  return rangeWords(low, townBands[townBands.indexOf(low) + 1] ?? null);
}

/**
 * The words for a range of lane miles.
 *
 * @param range - borders in lane miles, half-open; null at an open end
 * @example laneMileBandWords({ from: null, to: 50 }) // "under 50"
 */
export function laneMileBandWords({ from, to }: { from: number | null; to: number | null }): string {
  if (from === null) return to === null ? "any size" : `under ${to}`;
  return rangeWords(from, to);
}

/**
 * The lane mile bands of a policy, ascending.
 *
 * @example laneMileRanges([50, 150]) // [{from: null, to: 50}, {from: 50, to: 150}, {from: 150, to: null}]
 */
export function laneMileRanges(borders: readonly number[]): { from: number | null; to: number | null }[] {
  return [null, ...borders].map((from, place) => ({ from, to: borders[place] ?? null }));
}

/**
 * A town's lane miles as a band.
 *
 * @param laneMiles - ≥ 0
 * @throws RangeError when lane miles are not a number
 * @example laneMileBand(149.6) // "50–149"
 */
export function laneMileBand(
  laneMiles: number,
  { laneMileBands }: Pick<DisclosurePolicy, "laneMileBands"> = defaultPolicy,
): string {
  const range = laneMileRanges(laneMileBands).find(({ to }) => laneMiles < (to ?? Number.POSITIVE_INFINITY));
  if (!range) throw new RangeError(`lane miles must be a number, not ${laneMiles}`);
  return laneMileBandWords(range);
}
