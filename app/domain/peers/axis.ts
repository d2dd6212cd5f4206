import type { Band } from "#app/domain/calibration/band.ts";
import { type DisclosurePolicy } from "#app/domain/disclosure/policy.ts";
import { protectedNumber } from "#app/domain/disclosure/rounding.ts";
import { quantileType7 } from "#app/domain/stats/quantile.ts";

/** The scale of a chart: its ends and the step between its numbers, in the indicator's unit. */
export type Axis = { from: number; to: number; step: number };

const fineStep = 50;
const mostSteps = 12;
/** With nothing to go by, wide enough for the rates that towns lay. */
const emptyAxis = { low: 100, high: 500 };

/** The stretch that most of the region lies in, worked out from figures that are themselves published. */
function regionStretch(values: readonly number[], policy: DisclosurePolicy): number[] {
  const at = (p: number) => protectedNumber(quantileType7(values, p), policy.roundingBaseLb, policy.significantDigits);
  if (values.length >= policy.decilesFrom) return [at(0.1), at(0.9)];
  if (values.length >= policy.quartilesFrom) {
    const [lower, upper] = [at(0.25), at(0.75)];
    return [lower - (upper - lower), upper + (upper - lower)];
  }
  if (values.length >= policy.kMin.member) return [at(0.5) / 2, at(0.5) * 1.5];
  return [];
}

/**
 * One axis for all groups of an indicator, rounded outward, never ending at a town's figure.
 *
 * @param regionValues - one a contributor of the whole region, in any order; none when the region is withheld
 * @param band - drawn on the axis with a step beside it on either side; null when there is none
 * @param publishedNumbers - figures already protected that must fit on the axis
 * @returns ends that are multiples of the step, at or above 0
 * @throws RangeError when a value is not finite
 * @example indicatorAxis([], { lowLbPerLaneMile: 250, highLbPerLaneMile: 300 }, defaultPolicy, []) // 200 to 350
 */
export function indicatorAxis(
  regionValues: readonly number[],
  band: Band | null,
  policy: DisclosurePolicy,
  publishedNumbers: readonly number[],
): Axis {
  const bandEnds = band ? [band.lowLbPerLaneMile - fineStep, band.highLbPerLaneMile + fineStep] : [];
  const numbers = [...regionStretch(regionValues, policy), ...bandEnds, ...publishedNumbers];
  const [low, high] =
    numbers.length === 0 ? [emptyAxis.low, emptyAxis.high] : [Math.min(...numbers), Math.max(...numbers)];
  const factor = [1, 2, 4, 10, 20, 40, 100].find((one) => (high - low) / (fineStep * one) <= mostSteps) ?? 1000;
  const step = fineStep * factor;
  const from = Math.max(0, Math.floor(low / step) * step);
  return { from, to: Math.max(from + step, Math.ceil(high / step) * step), step };
}
