import type { Band } from "#app/domain/calibration/band.ts";
import { bandPlace, type BandPlace } from "#app/domain/calibration/band.ts";
import { lbPerRevolution } from "#app/domain/calibration/catch-weight.ts";
import {
  type GateAdvice,
  gateAdvice,
  type GateRefusal,
  targetLbPerRev,
  type WeighedOpening,
} from "#app/domain/calibration/gate-advice.ts";
import { beforeAfter, type Savings } from "#app/domain/calibration/savings.ts";
import type { TruckFacts } from "#app/domain/fleet/truck.ts";
import type { WorkingRate } from "./read.server.ts";
import type { Readings } from "./readings.server.ts";

export type Decision =
  /** In the band at the working setting and speed: the gate stays. */
  | { kind: "leave" }
  /** No advice, and why. */
  | { kind: "none"; reason: "no-band" | "not-counted" | "timed" | GateRefusal["reason"] }
  | {
      kind: "move";
      advice: GateAdvice;
      /** What the working setting should then lay at the working speed, by the advice: about the band's middle. */
      expected: { lbPerLaneMile: number; place: BandPlace };
      savings: Savings;
    };

type Input = {
  truck: Pick<TruckFacts, "lanesPerPass" | "workingSpeedMph" | "workingSetting" | "gateMaxIn">;
  /** Null for liquid alone. */
  gateOpeningIn: number | null;
  readings: Readings;
  working: WorkingRate | null;
  band: Band | null;
  /** The same truck and material at other openings in the same season: wear between seasons would bend the line. */
  others: readonly { gateOpeningIn: number | null; readings: Readings }[];
  eventCount: number | null;
  priceCentsPerTon: number | null;
};

function adviceFor(
  { truck, readings, others }: Input,
  gateOpeningIn: number,
  target: number,
): GateAdvice | GateRefusal {
  const own: WeighedOpening = { gateOpeningIn, lbPerRev: lbPerRevolution(readings.catches) };
  const weighed = others.flatMap((other): WeighedOpening[] =>
    other.gateOpeningIn === null || other.readings.catches.length === 0
      ? []
      : [{ gateOpeningIn: other.gateOpeningIn, lbPerRev: lbPerRevolution(other.readings.catches) }],
  );
  return gateAdvice({ weighed: [own, ...weighed], targetLbPerRev: target, gateMaxIn: truck.gateMaxIn });
}

/**
 * What to do about the gate after a calibration, with what it would save.
 *
 * @param input - readings of the calibration; `eventCount` and the price null when not known
 * @returns leave it, a new opening, or why there is no advice; savings on one lane mile, its season with one pass an event
 */
export function decide(input: Input): Decision {
  const { truck, gateOpeningIn, readings, working, band, eventCount, priceCentsPerTon } = input;
  if (band === null) return { kind: "none", reason: "no-band" };
  if (readings.timedCatches.length > 0) return { kind: "none", reason: "timed" };
  if (gateOpeningIn === null || working === null || readings.catches.length === 0) {
    return { kind: "none", reason: "not-counted" };
  }
  if (working.place === "in") return { kind: "leave" };
  const target = targetLbPerRev({ ...truck, counts: readings.counts, band });
  if (target === null) return { kind: "none", reason: "not-counted" };
  const advice = adviceFor(input, gateOpeningIn, target);
  if (advice.method === "refused") return { kind: "none", reason: advice.reason };
  // At the advised opening it lays the band's middle; a rule can be set to a sixteenth only, which moves it in proportion.
  const middle = (band.lowLbPerLaneMile + band.highLbPerLaneMile) / 2;
  const expected = (middle * advice.nearestSixteenthIn) / advice.openingIn;
  return {
    kind: "move",
    advice,
    expected: { lbPerLaneMile: expected, place: bandPlace(expected, band) },
    savings: beforeAfter({
      beforeLbPerLaneMile: working.lbPerLaneMile,
      afterLbPerLaneMile: expected,
      laneMiles: 1,
      eventCount,
      priceCentsPerTon,
    }),
  };
}
