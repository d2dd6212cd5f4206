import { mean } from "#app/domain/stats/mean.ts";
import { sampleStandardDeviation } from "#app/domain/stats/sample-standard-deviation.ts";
import { type Catch, weightPerRevolution } from "./catch-weight.ts";
import type { Count } from "./count-rate.ts";

/**
 * The 97.5 % point of Student's t for 1 to 30 degrees of freedom.
 *
 * Source: R 4.2.2 `qt(0.975, 1:30)`, equal to SciPy 1.17.1 `t.ppf` to the digits given.
 */
const studentT975 = [
  12.706204736, 4.30265272975, 3.18244630528, 2.7764451052, 2.57058183564, 2.44691185114, 2.36462425159, 2.3060041352,
  2.2621571628, 2.22813885199, 2.20098516009, 2.17881282967, 2.16036865646, 2.14478668792, 2.13144954556, 2.11990529922,
  2.10981557783, 2.10092204024, 2.09302405441, 2.08596344727, 2.07961384473, 2.0738730679, 2.06865761042, 2.06389856163,
  2.05953855275, 2.05552943864, 2.05183051648, 2.0484071418, 2.04522964213, 2.0422724563,
];
/** Beyond the table the last entry is kept: a little too wide, never too narrow. */
function studentT(degreesOfFreedom: number) {
  return studentT975[Math.min(degreesOfFreedom, studentT975.length) - 1] ?? Number.POSITIVE_INFINITY;
}

/** Coverage factor for about 95 %. Source: NIST Technical Note 1297 (1994), section 6. */
export const coverageFactor = 2;
/** Whole revolutions are counted: the true number lies within half a one, evenly likely. */
const countHalfWidthRev = 0.5;

/** Standard uncertainty of an error that is evenly likely within ± the half-width. Source: NIST TN 1297, section 4.6. */
export function rectangular(halfWidth: number) {
  return halfWidth / Math.sqrt(3);
}

/**
 * What repeated catches say about lb per revolution.
 *
 * @param catches - any number
 * @returns mean, standard uncertainty of the mean (both lb per revolution) and the mean's 95 % t interval, or null
 *   under two catches: one catch says nothing of its own uncertainty
 * @throws RangeError when a catch has no revolutions or no net weight
 * @example three catches of 12.1, 12.6 and 11.9 lb per revolution // 12.2, interval 11.30 to 13.10
 */
export function repeatUncertainty(
  catches: readonly Catch[],
): { meanLbPerRev: number; standardLbPerRev: number; lowLbPerRev: number; highLbPerRev: number } | null {
  if (catches.length < 2) return null;
  const weights = catches.map(weightPerRevolution);
  const meanLbPerRev = mean(weights);
  const standardLbPerRev = sampleStandardDeviation(weights) / Math.sqrt(weights.length);
  const halfWidthLbPerRev = studentT(weights.length - 1) * standardLbPerRev;
  return {
    meanLbPerRev,
    standardLbPerRev,
    lowLbPerRev: meanLbPerRev - halfWidthLbPerRev,
    highLbPerRev: meanLbPerRev + halfWidthLbPerRev,
  };
}

/**
 * Relative standard uncertainty of a count of whole revolutions.
 *
 * @param revolutions - counted in all, not brought to a minute, > 0
 * @returns a share of the count, 0.0144 for 20 revolutions
 * @throws RangeError when revolutions are not above 0
 * @example countUncertaintyRatio(20) // 0.01443…
 */
export function countUncertaintyRatio(revolutions: number): number {
  if (!(revolutions > 0)) throw new RangeError(`revolutions must be above 0, not ${revolutions}`);
  return rectangular(countHalfWidthRev) / revolutions;
}

export type UncertaintySource = "catches" | "scale" | "count" | "timer" | "speed";

/**
 * The uncertainty of an application rate, as a share of the rate, with its largest source.
 *
 * Rate is a product and quotient of its readings, so the squares of their relative uncertainties add. Errors of timer
 * and speed are taken as evenly likely within their half-widths, that of the scale within half its smallest step.
 *
 * @param readings - two or more catches; the count at the setting in question; half-widths and the scale's step are
 *   0 or left out when unknown; the speed is needed with its half-width
 * @returns each source's ratio, `combinedRatio`, `expandedRatio` (k = 2, about 95 %) and the largest source, or null
 *   under two catches
 * @throws RangeError when a reading is out of range
 *
 * Source: JCGM 100:2008 (GUM), section 5.1; NIST Technical Note 1297 (1994).
 * @example rateUncertainty({ catches, count: { setting: 4, revolutions: 20, seconds: 60 } })?.expandedRatio
 */
export function rateUncertainty({
  catches,
  count,
  scaleStepLb = 0,
  timerHalfWidthSeconds = 0,
  speedMph = 1,
  speedHalfWidthMph = 0,
}: {
  catches: readonly Catch[];
  count: Count;
  scaleStepLb?: number;
  timerHalfWidthSeconds?: number;
  speedMph?: number;
  speedHalfWidthMph?: number;
}): {
  ratios: Record<UncertaintySource, number>;
  combinedRatio: number;
  expandedRatio: number;
  largest: UncertaintySource;
} | null {
  const repeat = repeatUncertainty(catches);
  if (!repeat) return null;
  const meanNetLb = mean(catches.map(({ grossLb, tareLb }) => grossLb - tareLb));
  const ratios = {
    catches: repeat.standardLbPerRev / repeat.meanLbPerRev,
    scale: rectangular(scaleStepLb / 2) / meanNetLb,
    count: countUncertaintyRatio(count.revolutions),
    timer: rectangular(timerHalfWidthSeconds) / count.seconds,
    speed: rectangular(speedHalfWidthMph) / speedMph,
  };
  const combinedRatio = Math.hypot(...Object.values(ratios));
  const sources = ["catches", "scale", "count", "timer", "speed"] as const;
  return {
    ratios,
    combinedRatio,
    expandedRatio: coverageFactor * combinedRatio,
    largest: sources.reduce((largest, source) => (ratios[source] > ratios[largest] ? source : largest)),
  };
}
