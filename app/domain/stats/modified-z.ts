import { assertFinite } from "./assert-finite.ts";
import { mean } from "./mean.ts";
import { median } from "./median.ts";
import { medianAbsoluteDeviation } from "./median-absolute-deviation.ts";

/** The median absolute deviation of a standard normal distribution is 0.6745. */
const normalMedianDeviation = 0.6745;
/** A normal standard deviation is 1.253314 (the root of π/2) times the mean absolute deviation. */
const normalMeanDeviationFactor = 1.253314;

/**
 * How far a value stands from the median, in robust standard deviations.
 *
 * When more than half of the values are equal, the mean absolute deviation about the median takes the place of the
 * median absolute deviation. A usual limit for a doubtful value is 3.5 either way.
 *
 * @param values - one or more finite numbers in any order
 * @param value - the number to place
 * @returns the score, or null when the values do not spread at all
 * @throws RangeError when the list is empty or anything is not finite
 *
 * Source: B. Iglewicz and D. C. Hoaglin, How to Detect and Handle Outliers, ASQC 1993.
 * @example modifiedZ([210, 225, 240, 255, 260, 275, 280, 300, 310, 720], 720) // 10.17…
 */
export function modifiedZ(values: readonly number[], value: number): number | null {
  assertFinite([value]);
  const middle = median(values);
  const deviation = medianAbsoluteDeviation(values);
  if (deviation > 0) return (normalMedianDeviation * (value - middle)) / deviation;
  const meanDeviation = mean(values.map((other) => Math.abs(other - middle)));
  return meanDeviation > 0 ? (value - middle) / (normalMeanDeviationFactor * meanDeviation) : null;
}
