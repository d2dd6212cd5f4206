import { type LbPerMin, lbPerMin } from "#app/domain/units.ts";

/** Material caught over a stretch of time, without counting revolutions. */
export type TimedCatch = { grossLb: number; tareLb: number; seconds: number };

/** A timed catch with the feed setting at which it was taken. */
export type SettingTimedCatch = TimedCatch & { setting: number };

const secondsPerMinute = 60;

/**
 * The discharge that a timed catch shows.
 *
 * @param one - gross above tare, tare ≥ 0, both lb; seconds > 0
 * @returns lb/min, unrounded
 * @throws RangeError when the catch lies outside those ranges
 *
 * Source: unit identity. The New Hampshire salt applicator course (NHDES 2014) catches for 30 seconds, three times.
 * @example timedDischarge({ grossLb: 37, tareLb: 2, seconds: 30 }) // 70
 */
export function timedDischarge({ grossLb, tareLb, seconds }: TimedCatch): LbPerMin {
  if (!(tareLb >= 0 && grossLb > tareLb)) throw new RangeError("gross must be above tare, and tare 0 lb or more");
  if (!(seconds > 0)) throw new RangeError(`a timed catch needs more than 0 seconds, not ${seconds}`);
  return lbPerMin(((grossLb - tareLb) * secondsPerMinute) / seconds);
}
