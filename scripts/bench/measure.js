/**
 * One measured figure.
 *
 * @typedef {{ name: string, value: number, unit: string, limit: string | null, isMet: boolean, detail: string }} Measure
 */

/** @param {readonly number[]} values at least one @returns {number} the middle one; the lower of two middles */
export function middleOf(values) {
  const sorted = [...values].sort((a, b) => a - b);
  return sorted[Math.floor((sorted.length - 1) / 2)];
}

/** @param {number} value @returns {number} to three significant digits */
export function short(value) {
  return Number(value.toPrecision(3));
}
