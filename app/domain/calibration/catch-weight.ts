import { mean } from "#app/domain/stats/mean.ts";
import { sampleStandardDeviation } from "#app/domain/stats/sample-standard-deviation.ts";
import { type Lb, lb } from "#app/domain/units.ts";

/** Material caught over counted shaft revolutions: container and all, and the container alone. */
export type Catch = { revolutions: number; grossLb: number; tareLb: number };

/**
 * Net weight of one catch for each revolution.
 *
 * @param one - revolutions > 0; gross above tare, tare ≥ 0, both lb
 * @returns lb per revolution
 * @throws RangeError when the catch lies outside those ranges
 * @example weightPerRevolution({ revolutions: 3, grossLb: 23.4, tareLb: 3 }) // 6.8
 */
export function weightPerRevolution({ revolutions, grossLb, tareLb }: Catch): Lb {
  if (!(revolutions > 0)) throw new RangeError(`a catch needs more than 0 revolutions, not ${revolutions}`);
  if (!(tareLb >= 0)) throw new RangeError(`tare must be ≥ 0 lb, not ${tareLb}`);
  if (!(grossLb > tareLb)) throw new RangeError(`gross must be above tare, not ${grossLb} lb against ${tareLb} lb`);
  return lb((grossLb - tareLb) / revolutions);
}

/**
 * What the spreader lays for each revolution of its shaft: the mean over the catches of net weight by revolutions.
 *
 * Each catch counts the same, however many revolutions it took.
 *
 * @param catches - one or more
 * @returns lb per revolution, for the one gate opening and material of these catches
 * @throws RangeError when there is no catch, or one has no revolutions or no net weight
 *
 * Source: Minnesota Snow and Ice Control Field Handbook for Snowplow Operators (2005), calibration insert: sum of the
 * three weights per revolution, divided by three.
 * @example lbPerRevolution([{ revolutions: 1, grossLb: 14.1, tareLb: 2 }]) // 12.1
 */
export function lbPerRevolution(catches: readonly Catch[]): Lb {
  return lb(mean(catches.map(weightPerRevolution)));
}

/**
 * How far the catches differ among themselves: their coefficient of variation, with n − 1 in the deviation.
 *
 * @param catches - any number
 * @returns percent of the mean, or null under two catches
 * @throws RangeError when a catch has no revolutions or no net weight
 * @example three catches of 12.1, 12.6 and 11.9 lb per revolution // 2.955…
 */
export function catchVariationPercent(catches: readonly Catch[]): number | null {
  if (catches.length < 2) return null;
  const weights = catches.map(weightPerRevolution);
  return (100 * sampleStandardDeviation(weights)) / mean(weights);
}
