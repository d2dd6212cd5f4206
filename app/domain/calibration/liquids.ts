import { lbPerShortTon, minutesPerHour } from "#app/domain/units.ts";

const secondsPerMinute = 60;

function refuseUnlessPositive(figures: Record<string, number>) {
  for (const [name, value] of Object.entries(figures)) {
    if (!(value > 0 && Number.isFinite(value))) throw new RangeError(`${name} must be above 0, not ${value}`);
  }
}

function refuseLanes(lanes: number) {
  if (!Number.isInteger(lanes)) throw new RangeError(`lanes must be a whole number, not ${lanes}`);
}

/**
 * What a pump or nozzles give, from a timed catch.
 *
 * @param gallons - US gallons, > 0
 * @param seconds - > 0
 * @returns US gallons a minute, unrounded
 * @throws RangeError when a figure is not above 0
 *
 * Source: unit identity.
 * @example timedGalPerMin({ gallons: 0.5, seconds: 30 }) // 1
 */
export function timedGalPerMin({ gallons, seconds }: { gallons: number; seconds: number }): number {
  refuseUnlessPositive({ gallons, seconds });
  return (gallons * secondsPerMinute) / seconds;
}

/**
 * Liquid put on each ton of dry material at the spreader.
 *
 * @param galPerMin - US gallons a minute, > 0
 * @param dryLbPerMin - discharge of the dry material, lb/min, > 0
 * @returns US gallons for a short ton, unrounded
 * @throws RangeError when a figure is not above 0
 *
 * Source: unit identity.
 * @example prewetGalPerTon({ galPerMin: 1, dryLbPerMin: 200 }) // 10
 */
export function prewetGalPerTon({ galPerMin, dryLbPerMin }: { galPerMin: number; dryLbPerMin: number }): number {
  refuseUnlessPositive({ galPerMin, dryLbPerMin });
  return (galPerMin * lbPerShortTon) / dryLbPerMin;
}

/**
 * The pump output for wanted gallons a ton: the inverse of `prewetGalPerTon`.
 *
 * @param galPerTon - US gallons for a short ton, > 0
 * @param dryLbPerMin - lb/min, > 0
 * @returns US gallons a minute, unrounded
 * @throws RangeError when a figure is not above 0
 *
 * Source: unit identity.
 * @example prewetGalPerMin({ galPerTon: 10, dryLbPerMin: 200 }) // 1
 */
export function prewetGalPerMin({ galPerTon, dryLbPerMin }: { galPerTon: number; dryLbPerMin: number }): number {
  refuseUnlessPositive({ galPerTon, dryLbPerMin });
  return (galPerTon * dryLbPerMin) / lbPerShortTon;
}

/**
 * Liquid alone laid on one mile of one lane.
 *
 * @param galPerMin - all nozzles together, US gallons a minute, > 0
 * @param speedMph - > 0
 * @param lanes - wetted in one pass, a whole number from 1 up
 * @returns US gallons per lane mile, unrounded
 * @throws RangeError when a figure is out of range
 *
 * Source: unit identity.
 * @example directGalPerLaneMile({ galPerMin: 20, speedMph: 30, lanes: 1 }) // 40
 */
export function directGalPerLaneMile({
  galPerMin,
  speedMph,
  lanes,
}: {
  galPerMin: number;
  speedMph: number;
  lanes: number;
}): number {
  refuseUnlessPositive({ galPerMin, speedMph, lanes });
  refuseLanes(lanes);
  return (galPerMin * minutesPerHour) / (speedMph * lanes);
}

/**
 * The nozzle output for wanted gallons per lane mile: the inverse of `directGalPerLaneMile`.
 *
 * @param galPerLaneMile - US gallons, > 0
 * @param speedMph - > 0
 * @param lanes - a whole number from 1 up
 * @returns US gallons a minute, unrounded
 * @throws RangeError when a figure is out of range
 *
 * Source: unit identity.
 * @example directGalPerMin({ galPerLaneMile: 40, speedMph: 30, lanes: 1 }) // 20
 */
export function directGalPerMin({
  galPerLaneMile,
  speedMph,
  lanes,
}: {
  galPerLaneMile: number;
  speedMph: number;
  lanes: number;
}): number {
  refuseUnlessPositive({ galPerLaneMile, speedMph, lanes });
  refuseLanes(lanes);
  return (galPerLaneMile * speedMph * lanes) / minutesPerHour;
}
