import { type LbPerLaneMile, type LbPerMin, type Mph, lbPerLaneMile, minutesPerHour } from "#app/domain/units.ts";

function refuseOutside(speedMph: number, lanes: number) {
  if (!(speedMph > 0)) throw new RangeError(`speed must be above 0 mph, not ${speedMph}`);
  if (!Number.isInteger(lanes) || lanes < 1)
    throw new RangeError(`lanes must be a whole number from 1 up, not ${lanes}`);
}

/**
 * Minutes a truck takes for one mile, unrounded.
 *
 * @param speedMph - mph, > 0
 * @throws RangeError when the speed is not above 0
 *
 * Source: unit identity, 60 minutes in the hour.
 * @example minutesPerMile(25) // 2.4
 */
export function minutesPerMile(speedMph: number): number {
  refuseOutside(speedMph, 1);
  return minutesPerHour / speedMph;
}

/**
 * What a spreader lays on one mile of one lane.
 *
 * @param discharge - material leaving the spreader, lb/min, ≥ 0
 * @param groundSpeed - mph, > 0
 * @param lanes - lanes covered by one pass, a whole number from 1 up
 * @returns lb per lane mile, unrounded
 * @throws RangeError when an argument lies outside its range
 *
 * Source: unit identity, no empirical constant.
 * @example applicationRate(lbPerMin(200), mph(20), 1) // 600
 */
export function applicationRate(discharge: LbPerMin, groundSpeed: Mph, lanes: number): LbPerLaneMile {
  refuseOutside(groundSpeed, lanes);
  if (discharge < 0) throw new RangeError(`discharge must be 0 lb/min or more, not ${discharge}`);
  return lbPerLaneMile((discharge * minutesPerHour) / (groundSpeed * lanes));
}

/**
 * The shaft count that lays a wanted rate: the inverse of `applicationRate`.
 *
 * @param rate - wanted, lb per lane mile, ≥ 0
 * @param lbPerRev - lb for each revolution at the gate opening in question, > 0
 * @param groundSpeed - mph, > 0
 * @param lanes - lanes covered by one pass, a whole number from 1 up
 * @returns revolutions a minute, unrounded
 * @throws RangeError when an argument lies outside its range
 *
 * Source: unit identity, no empirical constant.
 * @example countForRate(lbPerLaneMile(600), 10, mph(20), 1) // 20
 */
export function countForRate(rate: LbPerLaneMile, lbPerRev: number, groundSpeed: Mph, lanes: number): number {
  refuseOutside(groundSpeed, lanes);
  if (rate < 0) throw new RangeError(`rate must be 0 lb per lane mile or more, not ${rate}`);
  if (!(lbPerRev > 0)) throw new RangeError(`lb per revolution must be above 0, not ${lbPerRev}`);
  return (rate * groundSpeed * lanes) / (minutesPerHour * lbPerRev);
}
