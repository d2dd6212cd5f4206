import type { TownActor } from "#app/context.ts";
import type { BandPlace, MaterialKind } from "#app/domain/calibration/band.ts";
import { dueReason } from "#app/domain/calibration/due.ts";
import { rateSheet } from "#app/domain/calibration/rate-sheet.ts";
import type { TruckFacts } from "#app/domain/fleet/truck.ts";
import { now } from "#app/lib/clock.server.ts";
import { notFound } from "#app/lib/errors.ts";
import { calibrationMaterial } from "#app/models/associations.server.ts";
import { Calibration } from "#app/models/calibration.server.ts";
import { Material } from "#app/models/material.server.ts";
import { Truck } from "#app/models/truck.server.ts";
import { TruckMaterial } from "#app/models/truck-material.server.ts";
import { TruckWork, type WorkPart } from "#app/models/truck-work.server.ts";
import { type BandInForce, bandsOfTown, type TownBands } from "../bands.server.ts";
import { dischargeReadings, type LiquidReading, liquidsOf, type Readings, readingsOf } from "./readings.server.ts";

export type WorkingRate = {
  lbPerLaneMile: number;
  /** k = 2; null after a single catch. */
  plusMinusLbPerLaneMile: number | null;
  place: BandPlace | null;
};

/** One calibration as a line of a list. */
export type CalibrationLine = {
  id: number;
  materialId: number;
  materialName: string;
  testedOn: string;
  /** Null for liquid alone. */
  gateOpeningIn: number | null;
  state: "ready" | "approved";
  /** At the truck's working setting and speed; null when that setting was not measured. */
  working: WorkingRate | null;
  /** Of liquid alone; a dry calibration's are on its own page. */
  liquids: LiquidReading[];
};

export type Due = ReturnType<typeof dueReason>;

/** One truck with one material: what is in force, what waits, and whether it is due. */
export type MaterialLine = {
  materialId: number;
  materialName: string;
  materialKind: MaterialKind;
  band: BandInForce;
  sinceOn: string | null;
  inForce: CalibrationLine | null;
  ready: CalibrationLine[];
  due: Due;
};

export type TruckLine = TruckFacts & { id: number; materials: MaterialLine[] };

type TruckPoint = Pick<TruckFacts, "lanesPerPass" | "workingSpeedMph" | "workingSetting">;

/**
 * What a truck lays at its working setting and speed, by one calibration.
 *
 * @returns lb per lane mile with its ± and place; null when that setting was not measured
 */
export function workingRateOf(truck: TruckPoint, readings: Readings, band: BandInForce): WorkingRate | null {
  const measured = dischargeReadings(readings);
  if (measured === null) return null;
  const rows = rateSheet({
    ...measured,
    lanesPerPass: truck.lanesPerPass,
    speedsMph: [truck.workingSpeedMph],
    band,
  });
  const cell = rows.find(({ setting }) => setting === truck.workingSetting)?.cells[0];
  return cell ? { lbPerLaneMile: cell.lbPerLaneMile, plusMinusLbPerLaneMile: cell.plusMinus, place: cell.place } : null;
}

/** A truck's facts, as every page of the fleet shows them. */
export function truckFacts(truck: Truck): TruckFacts & { id: number } {
  const { id, unitNumber, body, spreaderKind, control, lanesPerPass, workingSpeedMph, workingSetting } = truck;
  const { workingRpm, gateMaxIn, capacityTons, isInService } = truck;
  const point = { lanesPerPass, workingSpeedMph, workingSetting, workingRpm };
  return { id, unitNumber, body, spreaderKind, control, ...point, gateMaxIn, capacityTons, isInService };
}

type Gathered = {
  trucks: Truck[];
  materials: Material[];
  carried: TruckMaterial[];
  work: TruckWork[];
  /** Newest first. */
  calibrations: Calibration[];
  readings: Map<number, Readings>;
  /** Of the calibrations without a gate. */
  liquids: Map<number, LiquidReading[]>;
  bands: TownBands;
};

/** In force: the newest approved. Waiting: those ready. The others are history, and a list needs none of their readings. */
function inForceOrReady(newestFirst: readonly Calibration[]): Calibration[] {
  const seen = new Set<string>();
  return newestFirst.filter(({ state, truckId, materialId }) => {
    if (state === "ready") return true;
    const pair = `${truckId} ${materialId}`;
    return !seen.has(pair) && seen.add(pair);
  });
}

async function gather(actor: TownActor, truckId: number | null): Promise<Gathered> {
  const { townId } = actor;
  const ofTruck = truckId === null ? { townId } : { townId, truckId };
  const trucks = await Truck.findAll({ where: truckId === null ? { townId } : { townId, id: truckId }, limit: 500 });
  const [materials, carried, work, calibrations, bands] = await Promise.all([
    Material.findAll({ where: { townId }, order: ["id"] }),
    TruckMaterial.findAll({ where: { truckId: trucks.map(({ id }) => id) } }),
    TruckWork.findAll({
      where: ofTruck,
      order: [
        ["doneOn", "DESC"],
        ["id", "DESC"],
      ],
      limit: 2000,
    }),
    Calibration.findAll({
      where: ofTruck,
      include: [calibrationMaterial],
      order: [
        ["testedOn", "DESC"],
        ["id", "DESC"],
      ],
      limit: 5000,
    }),
    bandsOfTown(actor),
  ]);
  const shown = truckId === null ? inForceOrReady(calibrations) : calibrations;
  const withoutGate = shown.filter(({ gateOpeningIn }) => gateOpeningIn === null);
  const [readings, liquids] = await Promise.all([
    readingsOf(shown.map(({ id }) => id)),
    liquidsOf(withoutGate.map(({ id }) => id)),
  ]);
  return { trucks, materials, carried, work, calibrations: shown, readings, liquids, bands };
}

const noReadings: Readings = { counts: [], catches: [], timedCatches: [] };

function calibrationLine(
  truck: Truck,
  calibration: Calibration,
  { readings, liquids, bands }: Gathered,
): CalibrationLine {
  const band = bands[calibration.material?.kind ?? "salt"];
  return {
    id: calibration.id,
    materialId: calibration.materialId,
    materialName: calibration.material?.name ?? "",
    testedOn: calibration.testedOn,
    gateOpeningIn: calibration.gateOpeningIn,
    state: calibration.state,
    working: workingRateOf(truck, readings.get(calibration.id) ?? noReadings, band),
    liquids: liquids.get(calibration.id) ?? [],
  };
}

function materialLine(truck: Truck, material: Material, all: Gathered, today: string): MaterialLine {
  const own = all.calibrations.filter(({ truckId, materialId }) => truckId === truck.id && materialId === material.id);
  const approved = own.find(({ state }) => state === "approved");
  const sinceOn =
    all.carried.find(({ truckId, materialId }) => truckId === truck.id && materialId === material.id)?.sinceOn ?? null;
  return {
    materialId: material.id,
    materialName: material.name,
    materialKind: material.kind,
    band: all.bands[material.kind],
    sinceOn,
    inForce: approved ? calibrationLine(truck, approved, all) : null,
    ready: own.filter(({ state }) => state === "ready").map((calibration) => calibrationLine(truck, calibration, all)),
    due: dueReason({
      testedOn: approved?.testedOn ?? null,
      today,
      workDoneOn: all.work.filter(({ truckId }) => truckId === truck.id).map(({ doneOn }) => doneOn),
      materialSince: sinceOn,
    }),
  };
}

/** The materials a truck is known to carry; for a truck of which nobody said, those it was weighed with. */
function materialsOf(truck: Truck, { materials, carried, calibrations }: Gathered): Material[] {
  const said = carried.filter(({ truckId }) => truckId === truck.id).map(({ materialId }) => materialId);
  const weighed = calibrations.filter(({ truckId }) => truckId === truck.id).map(({ materialId }) => materialId);
  const ids = said.length > 0 ? said : weighed;
  return materials.filter(({ id }) => ids.includes(id));
}

function truckLine(truck: Truck, all: Gathered, today: string): TruckLine {
  return {
    ...truckFacts(truck),
    materials: materialsOf(truck, all).map((material) => materialLine(truck, material, all, today)),
  };
}

/** Local date of today, as the due rules take it. */
export function todaysDate(): string {
  return now().toISOString().slice(0, 10);
}

/** The town's trucks by unit number, each with its materials: what is in force, what waits, what is due. */
export async function listFleet(actor: TownActor): Promise<TruckLine[]> {
  const all = await gather(actor, null);
  const today = todaysDate();
  return all.trucks
    .map((truck) => truckLine(truck, all, today))
    .sort((a, b) => a.unitNumber.localeCompare(b.unitNumber, "en", { numeric: true }));
}

export type WorkLine = { id: number; doneOn: string; part: WorkPart; note: string };
export type TruckDetail = TruckLine & {
  /** Every calibration of the truck, newest first. */
  calibrations: CalibrationLine[];
  /** Newest first. */
  work: WorkLine[];
};

/** One truck with its whole history. @throws 404 when the truck is not the town's */
export async function getTruck(actor: TownActor, truckId: number): Promise<TruckDetail> {
  const all = await gather(actor, truckId);
  const [truck] = all.trucks;
  if (!truck) throw notFound("truck");
  return {
    ...truckLine(truck, all, todaysDate()),
    calibrations: all.calibrations.map((calibration) => calibrationLine(truck, calibration, all)),
    work: all.work.map(({ id, doneOn, part, note }) => ({ id, doneOn, part, note })),
  };
}
