import { assertFinite } from "#app/domain/stats/assert-finite.ts";
import { type DisclosurePolicy, defaultPolicy } from "./policy.ts";
import { roundTo } from "./rounding.ts";

/** A half-open stretch of the scale and the number of towns in it; null at an open end. */
export type Bin = { from: number | null; to: number | null; towns: number };

/** Widths tried, in rounding bases. The first is two, so that a border tells less than a rounded figure does. */
const widthsInBases = [2, 5, 10, 20, 50, 100, 200, 500, 1000];

function binsOfWidth(sorted: readonly number[], width: number, townsPerBin: number): Bin[] {
  const bins: Bin[] = [];
  let from: number | null = null;
  let first = 0;
  for (;;) {
    const lastNeeded = sorted[first + townsPerBin - 1];
    if (lastNeeded === undefined) return bins;
    const to = roundTo((Math.floor(lastNeeded / width) + 1) * width, width);
    const next = sorted.findIndex((value, place) => place >= first && value >= to);
    // What is left must fill a bin of its own; otherwise this one takes it and stays open.
    if (next === -1 || sorted.length - next < townsPerBin) {
      bins.push({ from, to: null, towns: sorted.length - first });
      return bins;
    }
    bins.push({ from, to, towns: next - first });
    from = to;
    first = next;
  }
}

/**
 * The distribution as counts in bins that each hold at least three towns.
 *
 * Borders are multiples of the base; the outermost bins are open, so no end tells the least or the most. Bins grow
 * until no more than half of them hold exactly the fewest allowed: a row of threes says nothing of the shape.
 *
 * @param values - one a contributor, in any order
 * @param base - rounding base, > 0, in the unit of the values
 * @param policy - fewest towns a bin, fewest values for any bins
 * @returns ascending, first `from` and last `to` null; empty under twelve values or when only one bin would be left
 * @throws RangeError when a value is not finite or the base is not above 0
 * @example protectedBins(twentyRates, 10)[0] // { from: null, to: 250, towns: 4 }
 */
export function protectedBins(
  values: readonly number[],
  base: number,
  { townsPerBin, quartilesFrom }: Pick<DisclosurePolicy, "townsPerBin" | "quartilesFrom"> = defaultPolicy,
): Bin[] {
  if (values.length < quartilesFrom) return [];
  assertFinite(values);
  const sorted = [...values].sort((a, b) => a - b);
  for (const widthInBases of widthsInBases) {
    const bins = binsOfWidth(sorted, widthInBases * base, townsPerBin);
    if (bins.length < 2) return [];
    const barelyFilled = bins.filter(({ towns }) => towns === townsPerBin).length;
    if (barelyFilled * 2 <= bins.length) return bins;
  }
  return [];
}
