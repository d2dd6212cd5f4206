import { mean } from "#app/domain/stats/mean.ts";
import { sampleStandardDeviation } from "#app/domain/stats/sample-standard-deviation.ts";
import { type LbPerMin, lbPerMin } from "#app/domain/units.ts";
import type { Catch } from "./catch-weight.ts";
import type { Count } from "./count-rate.ts";
import { calibrationRates } from "./rates.ts";
import { type SettingTimedCatch, timedDischarge } from "./timed-catch.ts";
import { coverageFactor, rateUncertainty } from "./uncertainty.ts";

/** Readings by either method: counts and catches, or timed catches in their place. */
export type DischargeReadings = {
  counts?: readonly Count[];
  catches?: readonly Catch[];
  timedCatches?: readonly SettingTimedCatch[];
};

/** What leaves the spreader at one feed setting; `revPerMin` is null after timed catches. */
export type SettingDischarge = {
  setting: number;
  isAtHydraulicLimit: boolean;
  revPerMin: number | null;
  lbPerMin: LbPerMin;
  /** ± as a share of the discharge, k = 2, about 95 %; null when one catch says nothing of its own uncertainty. */
  expandedRatio: number | null;
};

function countedDischarges(counts: readonly Count[], catches: readonly Catch[]): SettingDischarge[] {
  let carrying: Count | undefined;
  return calibrationRates({ counts, catches }).settings.map((setting) => {
    // At the hydraulic limit a setting carries the count of the last one that still rose, and so its uncertainty.
    if (!setting.isAtHydraulicLimit) carrying = counts.find((count) => count.setting === setting.setting);
    return {
      ...setting,
      expandedRatio: carrying ? (rateUncertainty({ catches, count: carrying })?.expandedRatio ?? null) : null,
    };
  });
}

function timedDischarges(timedCatches: readonly SettingTimedCatch[]): SettingDischarge[] {
  const settings = [...new Set(timedCatches.map(({ setting }) => setting))].sort((a, b) => a - b);
  return settings.map((setting) => {
    const discharges = timedCatches.filter((one) => one.setting === setting).map(timedDischarge);
    const meanLbPerMin = mean(discharges);
    const standardLbPerMin =
      discharges.length < 2 ? null : sampleStandardDeviation(discharges) / Math.sqrt(discharges.length);
    return {
      setting,
      isAtHydraulicLimit: false,
      revPerMin: null,
      lbPerMin: lbPerMin(meanLbPerMin),
      expandedRatio: standardLbPerMin === null ? null : (coverageFactor * standardLbPerMin) / meanLbPerMin,
    };
  });
}

/**
 * What leaves the spreader at each feed setting.
 *
 * @param readings - counts (each setting once) with one or more catches; or timed catches, which are averaged by setting
 * @returns ascending by setting, lb/min, unrounded
 * @throws RangeError when both kinds of readings are given or neither, or when a reading is out of range
 *
 * Source: three timed catches averaged, New Hampshire salt applicator course (NHDES 2014); uncertainty of a mean,
 * JCGM 100:2008 (GUM), 4.2, expanded with k = 2 as in NIST Technical Note 1297 (1994), section 6.
 * @example settingDischarges({ timedCatches: [{ setting: 3, seconds: 30, grossLb: 37, tareLb: 2 }] })[0].lbPerMin // 70
 */
export function settingDischarges({
  counts = [],
  catches = [],
  timedCatches = [],
}: DischargeReadings): SettingDischarge[] {
  const isCounted = counts.length > 0 || catches.length > 0;
  if (isCounted === timedCatches.length > 0) {
    throw new RangeError("rates need counts and catches, or timed catches, and not both");
  }
  return isCounted ? countedDischarges(counts, catches) : timedDischarges(timedCatches);
}
