function descending(contributions: readonly number[]) {
  const wrong = contributions.find((one) => !(one >= 0 && Number.isFinite(one)));
  if (wrong !== undefined) throw new RangeError(`a contribution must be 0 or more, not ${wrong}`);
  return [...contributions].sort((a, b) => b - a);
}

function sum(values: readonly number[]) {
  return values.reduce((total, value) => total + value, 0);
}

/**
 * Whether a sum would let its second largest contributor tell the largest to within p percent.
 *
 * @param contributions - one a contributor, holdings merged, each ≥ 0, in any order
 * @param p - percent
 * @returns true when the sum without its two largest is less than p percent of the largest
 * @throws RangeError when a contribution is negative or not finite
 *
 * Source: Handbook on Statistical Disclosure Control (ESSnet), sensitivity rules for magnitude tables, p% rule.
 * @example pPercentUnsafe([50000, 49000, 1000], 10) // true
 */
export function pPercentUnsafe(contributions: readonly number[], p: number): boolean {
  const [largest = 0, , ...others] = descending(contributions);
  return sum(others) < (p / 100) * largest;
}

/**
 * Whether the n largest contributors make up more than k percent of a sum.
 *
 * @param contributions - one a contributor, holdings merged, each ≥ 0, in any order
 * @param n - how many count as the largest, ≥ 1
 * @param k - percent
 * @throws RangeError when a contribution is negative or not finite
 *
 * Source: Handbook on Statistical Disclosure Control (ESSnet), sensitivity rules for magnitude tables, dominance rule.
 * @example dominanceUnsafe([5200, 4900, 120, 80], 2, 85) // true
 */
export function dominanceUnsafe(contributions: readonly number[], n: number, k: number): boolean {
  const sorted = descending(contributions);
  return sum(sorted.slice(0, n)) > (k / 100) * sum(sorted);
}
