import type { TownActor } from "#app/context.ts";
import { type Band, bandPlace, type BandPlace, commonPracticeBands } from "#app/domain/calibration/band.ts";
import { calibrationRates, rateAtSetting } from "#app/domain/calibration/rates.ts";
import { calibrationMaterial, calibrationCatches, calibrationCounts } from "#app/models/associations.server.ts";
import { inTransaction } from "#app/lib/db.server.ts";
import { notFound } from "#app/lib/errors.ts";
import { now } from "#app/lib/clock.server.ts";
import { Calibration } from "#app/models/calibration.server.ts";
import { type MaterialKind } from "#app/models/material.server.ts";
import { Truck } from "#app/models/truck.server.ts";
import { recordAudit } from "./audit.server.ts";

type Readings = {
  counts: { setting: number; revolutions: number; seconds: number }[];
  catches: { revolutions: number; grossLb: number; tareLb: number }[];
};

export type CalibrationView = Readings & {
  id: number;
  materialName: string;
  materialKind: MaterialKind;
  band: Band | null;
  testedOn: string;
  gateOpeningIn: number;
  state: "ready" | "approved";
  /** lb per lane mile at the truck's working setting and speed; null when that setting was not counted. */
  workingRateLbPerLaneMile: number | null;
  workingPlace: BandPlace | null;
};

export type TruckView = {
  id: number;
  unitNumber: string;
  body: string;
  spreaderKind: Truck["spreaderKind"];
  control: Truck["control"];
  lanesPerPass: number;
  workingSpeedMph: number;
  workingSetting: number;
  isInService: boolean;
  /** Newest first. */
  calibrations: CalibrationView[];
};

/** The common-practice band of a material; null where there is none. */
function bandOf(kind: MaterialKind): Band | null {
  return commonPracticeBands[kind] ?? null;
}

function calibrationView(truck: Truck, calibration: Calibration): CalibrationView {
  const counts = (calibration.counts ?? []).map(({ setting, revolutions, seconds }) => ({
    setting,
    revolutions,
    seconds,
  }));
  const catches = (calibration.catches ?? []).map(({ revolutions, grossLb, tareLb }) => ({
    revolutions,
    grossLb,
    tareLb,
  }));
  const kind = calibration.material?.kind ?? "salt";
  const band = bandOf(kind);
  const rate = rateAtSetting(
    calibrationRates({ counts, catches }),
    truck.workingSetting,
    truck.workingSpeedMph,
    truck.lanesPerPass,
  );
  return {
    id: calibration.id,
    materialName: calibration.material?.name ?? "",
    materialKind: kind,
    band,
    testedOn: calibration.testedOn,
    gateOpeningIn: calibration.gateOpeningIn,
    state: calibration.state,
    counts,
    catches,
    workingRateLbPerLaneMile: rate,
    workingPlace: rate === null || band === null ? null : bandPlace(rate, band),
  };
}

async function readTrucks(townId: number, truckId: number | null): Promise<TruckView[]> {
  const where = truckId === null ? { townId } : { townId, id: truckId };
  const trucks = await Truck.findAll({ where, order: [["unitNumber", "ASC"]], limit: 500 });
  const calibrations = await Calibration.findAll({
    where: truckId === null ? { townId } : { townId, truckId },
    include: [
      calibrationMaterial,
      { association: calibrationCounts, separate: true },
      { association: calibrationCatches, separate: true },
    ],
    order: [
      ["testedOn", "DESC"],
      ["id", "DESC"],
    ],
    limit: 2000,
  });
  return trucks
    .map((truck) => ({
      id: truck.id,
      unitNumber: truck.unitNumber,
      body: truck.body,
      spreaderKind: truck.spreaderKind,
      control: truck.control,
      lanesPerPass: truck.lanesPerPass,
      workingSpeedMph: truck.workingSpeedMph,
      workingSetting: truck.workingSetting,
      isInService: truck.isInService,
      calibrations: calibrations
        .filter((calibration) => calibration.truckId === truck.id)
        .map((calibration) => calibrationView(truck, calibration)),
    }))
    .sort((a, b) => a.unitNumber.localeCompare(b.unitNumber, "en", { numeric: true }));
}

/** The town's trucks by unit number, each with its calibrations. */
export async function listFleet(actor: TownActor): Promise<TruckView[]> {
  return readTrucks(actor.townId, null);
}

/** @throws 404 when the truck is not the town's */
export async function getTruck(actor: TownActor, truckId: number): Promise<TruckView> {
  const [truck] = await readTrucks(actor.townId, truckId);
  if (!truck) throw notFound("truck");
  return truck;
}

/**
 * Approve calibrations that are ready: each becomes the one in force for its truck and material.
 *
 * @param calibrationIds - at most 500; those of other towns or approved before are passed over
 * @returns how many were approved by this call
 */
export async function approveCalibrations(actor: TownActor, calibrationIds: readonly number[]): Promise<number> {
  return inTransaction(async (transaction) => {
    const ready = await Calibration.findAll({
      where: { id: [...calibrationIds].slice(0, 500), townId: actor.townId, state: "ready" },
      lock: transaction.LOCK.UPDATE,
      transaction,
    });
    for (const calibration of ready) {
      await calibration.update({ state: "approved", approvedAt: now(), approvedById: actor.userId }, { transaction });
      await recordAudit(
        actor,
        { action: "calibration.approve", entity: "calibration", entityId: calibration.id },
        transaction,
      );
    }
    return ready.length;
  });
}
