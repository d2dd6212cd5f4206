import type { TownActor } from "#app/context.ts";
import { driftPercent, isDriftClear } from "#app/domain/calibration/drift.ts";
import { Calibration } from "#app/models/calibration.server.ts";
import type { Truck } from "#app/models/truck.server.ts";
import type { BandInForce } from "../bands.server.ts";
import { type WorkingRate, workingRateOf } from "./read.server.ts";
import { type LiquidReading, liquidsOf, type Readings, readingsOf } from "./readings.server.ts";

export type HistoryLine = {
  id: number;
  testedOn: string;
  /** Null for liquid alone. */
  gateOpeningIn: number | null;
  state: "ready" | "approved";
  working: WorkingRate | null;
  /** Of liquid alone; empty beside a dry rate. */
  liquids: LiquidReading[];
  /** Against the one before, at the working setting and speed; null for the first, or when one was not measured there. */
  driftPercent: number | null;
  /** Whether the two differ by more than they can be wrong; null when that is not known. */
  isDriftClear: boolean | null;
};

export type History = {
  /** Oldest first. */
  lines: HistoryLine[];
  readings: ReadonlyMap<number, Readings>;
};

function drift(before: WorkingRate | null | undefined, working: WorkingRate | null) {
  if (!before || !working) return { driftPercent: null, isDriftClear: null };
  const [earlier, later] = [before.plusMinusLbPerLaneMile, working.plusMinusLbPerLaneMile];
  return {
    driftPercent: driftPercent(before.lbPerLaneMile, working.lbPerLaneMile),
    isDriftClear:
      earlier === null || later === null
        ? null
        : isDriftClear(
            { lbPerLaneMile: before.lbPerLaneMile, plusMinus: earlier },
            { lbPerLaneMile: working.lbPerLaneMile, plusMinus: later },
          ),
  };
}

/**
 * Every calibration of one truck with one material, and how far each moved from the one before.
 *
 * @param truck - found to be the actor's town's
 * @returns oldest first, at most 200, with the raw readings by calibration
 */
export async function historyOf(
  actor: TownActor,
  truck: Truck,
  materialId: number,
  band: BandInForce,
): Promise<History> {
  const rows = await Calibration.findAll({
    where: { townId: actor.townId, truckId: truck.id, materialId },
    order: [
      ["testedOn", "DESC"],
      ["id", "DESC"],
    ],
    limit: 200,
  });
  const withoutGate = rows.filter(({ gateOpeningIn }) => gateOpeningIn === null);
  const [readings, liquids] = await Promise.all([
    readingsOf(rows.map(({ id }) => id)),
    liquidsOf(withoutGate.map(({ id }) => id)),
  ]);
  const lines: HistoryLine[] = [];
  for (const { id, testedOn, gateOpeningIn, state } of rows.reverse()) {
    const own = readings.get(id);
    const working = own ? workingRateOf(truck, own, band) : null;
    // What was never approved was never in force, so nothing is measured against it but its own line.
    const before = lines.findLast((line) => line.state === "approved");
    lines.push({
      id,
      testedOn,
      gateOpeningIn,
      state,
      working,
      liquids: liquids.get(id) ?? [],
      ...drift(before?.working, working),
    });
  }
  return { lines, readings };
}
