import type { TownActor } from "#app/context.ts";
import type { MaterialKind } from "#app/domain/calibration/band.ts";
import { beforeAfter, type Savings } from "#app/domain/calibration/savings.ts";
import { seasonStartYearOf } from "#app/domain/dates.ts";
import type { TruckFacts } from "#app/domain/fleet/truck.ts";
import { notFound } from "#app/lib/errors.ts";
import { calibrationMaterial } from "#app/models/associations.server.ts";
import { Calibration } from "#app/models/calibration.server.ts";
import { Truck } from "#app/models/truck.server.ts";
import { UserAccount } from "#app/models/user-account.server.ts";
import { type BandInForce, bandsOfTown, tolerancePercent } from "../bands.server.ts";
import { lastEventCount } from "../season-figures.server.ts";
import { decide, type Decision } from "./decision.server.ts";
import { type HistoryLine, historyOf } from "./history.server.ts";
import { truckFacts } from "./read.server.ts";
import { type LiquidReading, liquidsOf, type Readings, type Verification, verificationsOf } from "./readings.server.ts";

/** A gate that was changed and weighed again: the earlier opening, and what the change saves. */
export type Changed = { before: HistoryLine; savings: Savings };

export type CalibrationDetail = {
  id: number;
  truck: TruckFacts & { id: number };
  materialId: number;
  materialName: string;
  materialKind: MaterialKind;
  band: BandInForce;
  testedOn: string;
  /** Null for liquid alone. */
  gateOpeningIn: number | null;
  gateScaleMark: string | null;
  note: string;
  state: "ready" | "approved";
  testerName: string | null;
  approverName: string | null;
  approvedOn: string | null;
  readings: Readings;
  verifications: Verification[];
  liquids: LiquidReading[];
  tolerancePercent: number;
  /** Oldest first, this one among them. */
  history: HistoryLine[];
  /** The one in force for this truck and material; null when none is approved. */
  inForceId: number | null;
  decision: Decision;
  changed: Changed | null;
  eventCount: number | null;
};

const noReadings: Readings = { counts: [], catches: [], timedCatches: [] };

async function namesOf(ids: readonly (number | null)[]) {
  const found = ids.filter((id) => id !== null);
  const people = await UserAccount.findAll({ attributes: ["id", "name"], where: { id: found } });
  return new Map<number | null, string>(people.map(({ id, name }) => [id, name]));
}

/** The latest before it that was weighed at another gate, when this one took over its counts or was weighed the same season. */
function changedFrom(own: HistoryLine, calibration: Calibration, history: readonly HistoryLine[]): HistoryLine | null {
  const earlier = history.slice(0, history.indexOf(own));
  const named = earlier.find(({ id }) => id === calibration.countsFromCalibrationId);
  return named ?? null;
}

/**
 * One calibration with all that its page shows.
 *
 * @throws 404 when it is not the town's
 */
export async function getCalibration(actor: TownActor, calibrationId: number): Promise<CalibrationDetail> {
  const where = { id: calibrationId, townId: actor.townId };
  const calibration = await Calibration.findOne({ where, include: [calibrationMaterial] });
  const truck = calibration && (await Truck.findOne({ where: { id: calibration.truckId, townId: actor.townId } }));
  if (!calibration?.material || !truck) throw notFound("calibration");
  const { material, materialId, testedOn, gateOpeningIn } = calibration;
  const bands = await bandsOfTown(actor);
  const band = bands[material.kind];
  const [history, verifications, liquids, tolerance, names, eventCount] = await Promise.all([
    historyOf(actor, truck, materialId, band),
    verificationsOf(calibrationId),
    liquidsOf([calibrationId]),
    tolerancePercent(),
    namesOf([calibration.createdById, calibration.approvedById]),
    lastEventCount(actor),
  ]);
  const own = history.lines.find(({ id }) => id === calibrationId);
  const readings = history.readings.get(calibrationId) ?? noReadings;
  const season = seasonStartYearOf(testedOn);
  const others = history.lines
    .filter((line) => line.id !== calibrationId && seasonStartYearOf(line.testedOn) === season)
    .map((line) => ({ gateOpeningIn: line.gateOpeningIn, readings: history.readings.get(line.id) ?? noReadings }));
  const working = own?.working ?? null;
  const { priceCentsPerTon } = material;
  const facts = truckFacts(truck);
  const before = own ? changedFrom(own, calibration, history.lines) : null;
  return {
    id: calibrationId,
    truck: facts,
    materialId,
    materialName: material.name,
    materialKind: material.kind,
    band,
    testedOn,
    gateOpeningIn,
    gateScaleMark: calibration.gateScaleMark,
    note: calibration.note,
    state: calibration.state,
    testerName: names.get(calibration.createdById) ?? null,
    approverName: names.get(calibration.approvedById) ?? null,
    approvedOn: calibration.approvedAt?.toISOString().slice(0, 10) ?? null,
    readings,
    verifications,
    liquids: liquids.get(calibrationId) ?? [],
    tolerancePercent: tolerance,
    history: history.lines,
    inForceId: history.lines.findLast(({ state }) => state === "approved")?.id ?? null,
    decision: decide({ truck: facts, gateOpeningIn, readings, working, band, others, eventCount, priceCentsPerTon }),
    changed:
      before?.working && working
        ? {
            before,
            savings: beforeAfter({
              beforeLbPerLaneMile: before.working.lbPerLaneMile,
              afterLbPerLaneMile: working.lbPerLaneMile,
              laneMiles: 1,
              eventCount,
              priceCentsPerTon,
            }),
          }
        : null,
    eventCount,
  };
}
