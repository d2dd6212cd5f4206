import { type LbPerMin, lbPerMin, mph } from "#app/domain/units.ts";
import { applicationRate } from "./application-rate.ts";
import type { Band } from "./band.ts";
import { type Catch, catchVariationPercent, lbPerRevolution } from "./catch-weight.ts";
import { type Count, type SettingCount, settingsWithLimit } from "./count-rate.ts";

export type SettingRate = SettingCount & { lbPerMin: LbPerMin };

/** What one calibration says: one truck, one material, one gate opening. */
export type CalibrationRates = { lbPerRev: number; catchVariationPercent: number | null; settings: SettingRate[] };

/**
 * The rates that follow from the readings of one calibration.
 *
 * @param readings - counts (each setting once) and one or more catches
 * @returns lb per revolution, the catches' variation in percent (null under two), and each setting's count and
 *   discharge in lb/min, ascending by setting
 * @throws RangeError when there is no catch or a reading is out of range
 * @example calibrationRates({ counts: [{ setting: 4, revolutions: 20, seconds: 60 }],
 *   catches: [{ revolutions: 1, grossLb: 12, tareLb: 2 }] }).settings[0].lbPerMin // 200
 */
export function calibrationRates({
  counts,
  catches,
}: {
  counts: readonly Count[];
  catches: readonly Catch[];
}): CalibrationRates {
  const lbPerRev = lbPerRevolution(catches);
  return {
    lbPerRev,
    catchVariationPercent: catchVariationPercent(catches),
    settings: settingsWithLimit(counts).map((setting) => ({
      ...setting,
      lbPerMin: lbPerMin(setting.revPerMin * lbPerRev),
    })),
  };
}

/**
 * The application rate at one setting and speed.
 *
 * @param speedMph - > 0
 * @param lanesPerPass - a whole number from 1 up
 * @returns lb per lane mile, unrounded, or null when that setting was not counted
 * @throws RangeError when speed or lanes are out of range
 * @example rateAtSetting(rates, 4, 25, 1) // 480 at 200 lb/min
 */
export function rateAtSetting(
  rates: CalibrationRates,
  setting: number,
  speedMph: number,
  lanesPerPass: number,
): number | null {
  const found = rates.settings.find((one) => one.setting === setting);
  return found ? applicationRate(found.lbPerMin, mph(speedMph), lanesPerPass) : null;
}

export type RateTableRow = SettingRate & { cells: { speedMph: number; lbPerLaneMile: number }[] };

/**
 * Application rates of every counted setting at every speed.
 *
 * @param lanesPerPass - a whole number from 1 up
 * @param speedsMph - each > 0, kept in their order
 * @returns one row a setting, ascending, with a rate in lb per lane mile for each speed, unrounded
 * @throws RangeError when a speed or the lanes are out of range
 * @example rateTable(rates, 1, [20, 25])
 */
export function rateTable(rates: CalibrationRates, lanesPerPass: number, speedsMph: readonly number[]): RateTableRow[] {
  return rates.settings.map((setting) => ({
    ...setting,
    cells: speedsMph.map((speedMph) => ({
      speedMph,
      lbPerLaneMile: applicationRate(setting.lbPerMin, mph(speedMph), lanesPerPass),
    })),
  }));
}

/**
 * The slowest and fastest speed at which a setting lands in the band. The slower the truck, the higher the rate.
 *
 * @param lanesPerPass - a whole number from 1 up
 * @param band - low above 0
 * @returns mph, unrounded and not limited to what a truck can drive, or null when that setting was not counted
 * @throws RangeError when the band's low end is not above 0 or the lanes are out of range
 * @example speedsInBand(rates, 4, 1, { lowLbPerLaneMile: 250, highLbPerLaneMile: 300 }) // 40 to 48 at 200 lb/min
 */
export function speedsInBand(
  rates: CalibrationRates,
  setting: number,
  lanesPerPass: number,
  band: Band,
): { slowestMph: number; fastestMph: number } | null {
  const found = rates.settings.find((one) => one.setting === setting);
  if (!found) return null;
  if (!(band.lowLbPerLaneMile > 0)) throw new RangeError("the band must begin above 0 lb per lane mile");
  // At one mile an hour the rate is what the discharge gives over 60 minutes; it falls in proportion to the speed.
  const rateAtOneMph = applicationRate(found.lbPerMin, mph(1), lanesPerPass);
  return {
    slowestMph: rateAtOneMph / band.highLbPerLaneMile,
    fastestMph: rateAtOneMph / band.lowLbPerLaneMile,
  };
}
