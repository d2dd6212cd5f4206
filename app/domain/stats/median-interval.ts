import { assertFinite } from "./assert-finite.ts";

const wantedCoverage = 0.95;

/**
 * The two order statistics that enclose the median of what the values were drawn from, in at least 95 of 100 cases.
 *
 * Exact for any distribution: the number of values below the median is binomial with n and one half.
 *
 * @param n - number of values, a whole number ≥ 0
 * @returns ranks counted from 1 and their coverage (0 to 1), or null when even the whole range covers less (n under 6)
 * @throws RangeError when n is no whole number ≥ 0
 *
 * Source: the binomial distribution with one half; no empirical constant.
 * @example medianIntervalRanks(10) // { lowerRank: 2, upperRank: 9, coverage: 0.978… }
 */
export function medianIntervalRanks(n: number): { lowerRank: number; upperRank: number; coverage: number } | null {
  if (!Number.isInteger(n) || n < 0) throw new RangeError(`n must be a whole number ≥ 0, not ${n}`);
  // The log keeps the first terms of a large n from vanishing.
  let logTerm = -n * Math.LN2;
  let tail = 0;
  let best: { lowerRank: number; upperRank: number; coverage: number } | null = null;
  for (let rank = 1; rank <= n / 2; rank++) {
    tail += Math.exp(logTerm);
    const coverage = 1 - 2 * tail;
    if (coverage < wantedCoverage) break;
    best = { lowerRank: rank, upperRank: n + 1 - rank, coverage };
    logTerm += Math.log((n - rank + 1) / rank);
  }
  return best;
}

/**
 * The interval between those two order statistics of the values.
 *
 * @param values - finite numbers in any order
 * @returns low and high in the unit of the values, or null under six values
 * @throws RangeError when the list is empty or holds anything not finite
 * @example medianInterval([210, 225, 240, 255, 260, 275, 280, 300, 310, 720]) // { low: 225, high: 310 }
 */
export function medianInterval(values: readonly number[]): { low: number; high: number } | null {
  assertFinite(values);
  const ranks = medianIntervalRanks(values.length);
  if (!ranks) return null;
  const sorted = [...values].sort((a, b) => a - b);
  const low = sorted[ranks.lowerRank - 1];
  const high = sorted[ranks.upperRank - 1];
  return low === undefined || high === undefined ? null : { low, high };
}
