import { lbPerLaneMile, mph } from "#app/domain/units.ts";
import { mean } from "#app/domain/stats/mean.ts";
import { countForRate } from "./application-rate.ts";
import type { Band } from "./band.ts";
import { type Count, settingsWithLimit } from "./count-rate.ts";

/** What one gate opening was found to give. */
export type WeighedOpening = { gateOpeningIn: number; lbPerRev: number };

export type GateAdvice = {
  method: "proportional" | "fitted";
  openingIn: number;
  /** What a rule can be set to; at least one sixteenth. */
  nearestSixteenthIn: number;
  /** The openings between which the line was fitted; null for proportional advice, which rests on one opening. */
  reach: { fromIn: number; toIn: number } | null;
  /** Outside the reach the line is only a guess. Always false for proportional advice, which has no reach. */
  isBeyondReach: boolean;
  /** More than the truck's own recorded maximum; false when none is recorded. */
  isBeyondMax: boolean;
};

/** No advice: a wider gate gave no more ("not-rising"), or the line reaches the target only with the gate shut. */
export type GateRefusal = { method: "refused"; reason: "not-rising" | "gate-shut" };

/** A thousandth of an inch: nobody measures a gate closer. */
const sameOpeningIn = 0.001;
const sixteenthsPerInch = 16;

/**
 * The catch that puts the working setting in the middle of the band at the working speed.
 *
 * @param counts - each setting once; a setting at the hydraulic limit carries the count of the last that rose
 * @param lanesPerPass - a whole number from 1 up
 * @param workingSpeedMph - > 0
 * @returns lb per revolution, unrounded, or null when the working setting is not counted
 * @throws RangeError when a count, the speed or the lanes are out of range, or the band's middle is not above 0
 * @example targetLbPerRev({ counts: [{ setting: 2, revolutions: 12, seconds: 60 }], workingSetting: 2,
 *   workingSpeedMph: 24, lanesPerPass: 1, band: { lowLbPerLaneMile: 250, highLbPerLaneMile: 350 } }) // 10
 */
export function targetLbPerRev({
  counts,
  workingSetting,
  workingSpeedMph,
  lanesPerPass,
  band,
}: {
  counts: readonly Count[];
  workingSetting: number;
  workingSpeedMph: number;
  lanesPerPass: number;
  band: Band;
}): number | null {
  const middle = (band.lowLbPerLaneMile + band.highLbPerLaneMile) / 2;
  if (!(middle > 0)) throw new RangeError("the band's middle must be above 0 lb per lane mile");
  const counted = settingsWithLimit(counts).find(({ setting }) => setting === workingSetting);
  if (!counted) return null;
  // Count and catch stand in the rate as a product: the count that a catch of 1 lb would need, shared over the real one.
  return countForRate(lbPerLaneMile(middle), 1, mph(workingSpeedMph), lanesPerPass) / counted.revPerMin;
}

/** One entry for each opening; catches at the same opening are averaged. */
function byOpening(weighed: readonly WeighedOpening[]): WeighedOpening[] {
  const groups: { gateOpeningIn: number; catches: number[] }[] = [];
  for (const { gateOpeningIn, lbPerRev } of [...weighed].sort((a, b) => a.gateOpeningIn - b.gateOpeningIn)) {
    if (!(gateOpeningIn > 0 && lbPerRev > 0 && Number.isFinite(gateOpeningIn) && Number.isFinite(lbPerRev))) {
      throw new RangeError(`an opening and its catch must be above 0, not ${gateOpeningIn} in and ${lbPerRev} lb`);
    }
    const last = groups.at(-1);
    if (last && gateOpeningIn - last.gateOpeningIn <= sameOpeningIn) last.catches.push(lbPerRev);
    else groups.push({ gateOpeningIn, catches: [lbPerRev] });
  }
  return groups.map(({ gateOpeningIn, catches }) => ({ gateOpeningIn, lbPerRev: mean(catches) }));
}

/** The least-squares line of catch on opening; two or more openings that differ. */
function fittedLine(openings: readonly WeighedOpening[]) {
  const middleIn = mean(openings.map(({ gateOpeningIn }) => gateOpeningIn));
  const middleLbPerRev = mean(openings.map(({ lbPerRev }) => lbPerRev));
  let products = 0;
  let squares = 0;
  for (const { gateOpeningIn, lbPerRev } of openings) {
    products += (gateOpeningIn - middleIn) * (lbPerRev - middleLbPerRev);
    squares += (gateOpeningIn - middleIn) ** 2;
  }
  return { middleIn, middleLbPerRev, lbPerRevPerIn: products / squares };
}

/**
 * The gate opening that should give the wanted catch. A starting point only: weigh one revolution again at the new gate.
 *
 * In proportion from one weighed opening; by a least-squares line from two or more that differ. Discharge is roughly,
 * not exactly, proportional to the opening.
 *
 * @param weighed - one or more openings in inches with their lb per revolution, same truck and material
 * @param targetLbPerRev - lb per revolution, > 0
 * @param gateMaxIn - the truck's own recorded maximum, inches; null when not recorded
 * @returns inches, unrounded and to the nearest sixteenth, with the reach of the fit; or why there is no advice
 * @throws RangeError when nothing was weighed or a figure is not above 0
 * @example gateAdvice({ weighed: [{ gateOpeningIn: 2, lbPerRev: 12 }], targetLbPerRev: 9, gateMaxIn: 4 }) // 1.5 in
 */
export function gateAdvice({
  weighed,
  targetLbPerRev: target,
  gateMaxIn,
}: {
  weighed: readonly WeighedOpening[];
  targetLbPerRev: number;
  gateMaxIn: number | null;
}): GateAdvice | GateRefusal {
  if (!(target > 0 && Number.isFinite(target))) throw new RangeError(`the target must be above 0 lb, not ${target}`);
  const openings = byOpening(weighed);
  const [first, last] = [openings[0], openings.at(-1)];
  if (!first || !last) throw new RangeError("advice needs one weighed opening at least");
  if (openings.length === 1) {
    return { method: "proportional", ...advised((first.gateOpeningIn * target) / first.lbPerRev, null, gateMaxIn) };
  }
  const { middleIn, middleLbPerRev, lbPerRevPerIn } = fittedLine(openings);
  if (!(lbPerRevPerIn > 0)) return { method: "refused", reason: "not-rising" };
  const openingIn = middleIn + (target - middleLbPerRev) / lbPerRevPerIn;
  if (!(openingIn > 0)) return { method: "refused", reason: "gate-shut" };
  const reach = { fromIn: first.gateOpeningIn, toIn: last.gateOpeningIn };
  return { method: "fitted", ...advised(openingIn, reach, gateMaxIn) };
}

function advised(openingIn: number, reach: GateAdvice["reach"], gateMaxIn: number | null) {
  return {
    openingIn,
    nearestSixteenthIn: Math.max(1, Math.round(openingIn * sixteenthsPerInch)) / sixteenthsPerInch,
    reach,
    isBeyondReach:
      reach !== null && (openingIn < reach.fromIn - sameOpeningIn || openingIn > reach.toIn + sameOpeningIn),
    isBeyondMax: gateMaxIn !== null && openingIn > gateMaxIn + sameOpeningIn,
  };
}
