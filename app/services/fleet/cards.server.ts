import type { TownActor } from "#app/context.ts";
import type { Band } from "#app/domain/calibration/band.ts";
import { type CabCard, cabCard } from "#app/domain/calibration/card.ts";
import { cardSpeeds } from "#app/domain/fleet/card-speeds.ts";
import { env } from "#app/lib/env.server.ts";
import { type QrDrawing, qrDrawing } from "#app/lib/qr.ts";
import { type CalibrationDetail, getCalibration } from "./calibration.server.ts";
import { listFleet, type MaterialLine, type TruckLine, workingRateOf } from "./read.server.ts";
import { dischargeReadings } from "./readings.server.ts";

export type PrintedCard = {
  calibrationId: number;
  card: CabCard;
  townName: string;
  band: Band | null;
  workingSpeedMph: number;
  workingRpm: number | null;
  /** ± of the rates, percent, k = 2, at the working setting; null after a single catch. */
  plusMinusPercent: number | null;
  /** What the card counts for. A card of anything but what is in force says so in large type. */
  standing: "in-force" | "ready" | "history";
  /** Leads to the record. */
  address: string;
  qr: QrDrawing;
};

function plusMinusPercent({ truck, readings, band }: CalibrationDetail): number | null {
  const working = workingRateOf(truck, readings, band);
  if (!working || working.plusMinusLbPerLaneMile === null) return null;
  return (100 * working.plusMinusLbPerLaneMile) / working.lbPerLaneMile;
}

function printed(actor: TownActor, calibration: CalibrationDetail): PrintedCard | null {
  const { id, truck, gateOpeningIn, readings, band, state, inForceId } = calibration;
  const measured = dischargeReadings(readings);
  if (measured === null || gateOpeningIn === null) return null;
  const address = `${env.publicOrigin}/fleet/calibrations/${id}`;
  return {
    calibrationId: id,
    card: cabCard({
      ...measured,
      unitNumber: truck.unitNumber,
      materialName: calibration.materialName,
      gateOpeningIn,
      gateScaleMark: calibration.gateScaleMark,
      testedOn: calibration.testedOn,
      testedBy: calibration.testerName ?? "",
      lanesPerPass: truck.lanesPerPass,
      speedsMph: cardSpeeds(truck.workingSpeedMph),
      workingSpeedMph: truck.workingSpeedMph,
      band,
    }),
    townName: actor.townName,
    band,
    workingSpeedMph: truck.workingSpeedMph,
    workingRpm: truck.workingRpm,
    plusMinusPercent: plusMinusPercent(calibration),
    standing: state === "ready" ? "ready" : id === inForceId ? "in-force" : "history",
    address,
    qr: qrDrawing(address),
  };
}

/**
 * The cab card of one calibration.
 *
 * @returns null when no setting was measured, as after liquids alone
 * @throws 404 when the calibration is not the town's
 */
export async function getCard(actor: TownActor, calibrationId: number): Promise<PrintedCard | null> {
  return printed(actor, await getCalibration(actor, calibrationId));
}

/** A truck and material without a card in the batch: it is due, or in date without a feed setting measured. */
export type LeftOut = { truckId: number; unitNumber: string; materialName: string; line: MaterialLine };

function pairs(trucks: readonly TruckLine[]) {
  return trucks
    .filter(({ isInService }) => isInService)
    .flatMap((truck) => truck.materials.map((line) => ({ truck, line })));
}

/** The cards of everything in force and in date, by unit number; what is due gets none, and is named instead. */
export async function listCards(actor: TownActor): Promise<{ cards: PrintedCard[]; leftOut: LeftOut[] }> {
  const all = pairs(await listFleet(actor));
  const inDate = all.filter(({ line }) => line.due.state === "in-date");
  const ids = inDate.flatMap(({ line }) => (line.inForce ? [line.inForce.id] : []));
  const cards: PrintedCard[] = [];
  // One after the other: a large fleet must not take every connection of the pool.
  for (const id of ids) {
    const card = await getCard(actor, id);
    if (card) cards.push(card);
  }
  const leftOut = all
    .filter(({ line }) => !cards.some(({ calibrationId }) => calibrationId === line.inForce?.id))
    .map(({ truck, line }) => ({
      truckId: truck.id,
      unitNumber: truck.unitNumber,
      materialName: line.materialName,
      line,
    }));
  return { cards, leftOut };
}
