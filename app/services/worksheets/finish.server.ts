import { QueryTypes, type Transaction } from "sequelize";
import type { TownActor } from "#app/context.ts";
import { type Worksheet, type WorksheetReadings, worksheetReadings } from "#app/domain/calibration/worksheet.ts";
import type { Finding } from "#app/domain/finding.ts";
import { dayMs, now } from "#app/lib/clock.server.ts";
import { db } from "#app/lib/db.server.ts";
import { Calibration } from "#app/models/calibration.server.ts";
import { CalibrationCatch } from "#app/models/calibration-catch.server.ts";
import { CalibrationCount } from "#app/models/calibration-count.server.ts";
import { CalibrationLiquid } from "#app/models/calibration-liquid.server.ts";
import { CalibrationTimedCatch } from "#app/models/calibration-timed-catch.server.ts";
import { CalibrationVerification } from "#app/models/calibration-verification.server.ts";
import { recordAudit } from "../audit.server.ts";

type Stored = { ok: true; calibrationId: number } | { ok: false; problems: Finding[] };

function refused(code: string, field: string, message: string): Stored {
  return { ok: false, problems: [{ code, severity: "error", field, message }] };
}

/**
 * A truck weighed again at the same gate on the same day is a second calibration, not the same one. The unique key takes
 * no two calibrations without a gate for the same, so their numbers rest on the truck's lock alone.
 */
async function nextSameDayNumber(sheet: Worksheet, gateOpeningIn: number | null, transaction: Transaction) {
  const [row] = await db.query<{ last: number | null }>(
    `SELECT MAX(same_day_number) AS last FROM calibration
      WHERE truck_id = ? AND material_id = ? AND tested_on = ? AND gate_opening_in <=> ?`,
    {
      type: QueryTypes.SELECT,
      replacements: [sheet.truckId, sheet.materialId, sheet.testedOn, gateOpeningIn],
      transaction,
    },
  );
  return (row?.last ?? 0) + 1;
}

async function storeReadings(calibrationId: number, readings: WorksheetReadings, transaction: Transaction) {
  const { counts, catches, timedCatches, verification, liquids } = readings;
  await CalibrationCount.bulkCreate(
    counts.map(({ setting, revolutions, seconds, engineRpm }) => ({
      calibrationId,
      setting,
      revolutions,
      seconds,
      rpm: engineRpm,
    })),
    { transaction },
  );
  await CalibrationCatch.bulkCreate(
    catches.map(({ revolutions, grossLb, tareLb }, index) => ({
      calibrationId,
      position: index + 1,
      revolutions,
      grossLb,
      tareLb,
    })),
    { transaction },
  );
  await CalibrationTimedCatch.bulkCreate(
    timedCatches.map(({ setting, seconds, grossLb, tareLb }, index) => ({
      calibrationId,
      position: index + 1,
      setting,
      seconds,
      grossLb,
      tareLb,
    })),
    { transaction },
  );
  await CalibrationVerification.bulkCreate(
    verification.map(({ speedMph, commandedLbPerLaneMile, seconds, grossLb, tareLb }, index) => ({
      calibrationId,
      position: index + 1,
      speedMph,
      commandedLbPerLaneMile,
      seconds,
      grossLb,
      tareLb,
    })),
    { transaction },
  );
  await CalibrationLiquid.bulkCreate(
    liquids.map((liquid, index) => ({
      calibrationId,
      position: index + 1,
      kind: liquid.kind,
      gallons: liquid.gallons,
      seconds: liquid.seconds,
      speedMph: liquid.kind === "direct" ? liquid.speedMph : null,
      lanes: liquid.kind === "direct" ? liquid.lanes : null,
      dryLbPerMin: liquid.kind === "prewet" ? liquid.dryLbPerMin : null,
    })),
    { transaction },
  );
}

/**
 * Make a calibration of a worksheet without errors: ready, for the director to approve.
 *
 * @param sheet - its truck is locked by this transaction, its ids are proven to be the town's
 * @returns the calibration's id, or why it cannot be stored; the sheet's `clientRef` becomes the calibration's, so that
 *   the database itself refuses a second one of the same sheet
 */
export async function storeCalibration(actor: TownActor, sheet: Worksheet, transaction: Transaction): Promise<Stored> {
  // A yard west of Greenwich is a day behind in the evening, never ahead by more than one.
  const lastDay = new Date(now().getTime() + dayMs).toISOString().slice(0, 10);
  if (sheet.testedOn > lastDay)
    return refused("future", "testedOn", "This day has not come yet. Give the day of the test.");
  const readings = worksheetReadings(sheet);
  if (!readings) {
    return refused(
      "no-readings",
      "catches",
      "A calibration needs a gate opening with its counts and catches, or timed catches of liquid alone.",
    );
  }
  const { gateOpeningIn, gateScaleMark } = readings;
  const calibration = await Calibration.create(
    {
      clientRef: sheet.clientRef,
      townId: actor.townId,
      truckId: sheet.truckId,
      materialId: sheet.materialId,
      testedOn: sheet.testedOn,
      gateOpeningIn,
      gateScaleMark,
      method: sheet.method,
      countsFromCalibrationId: sheet.countsFromCalibrationId,
      sameDayNumber: await nextSameDayNumber(sheet, gateOpeningIn, transaction),
      note: sheet.note.trim(),
      createdById: actor.userId,
      createdAt: now(),
    },
    { transaction },
  );
  await storeReadings(calibration.id, readings, transaction);
  const { truckId, materialId, testedOn } = sheet;
  const detail = { truckId, materialId, testedOn, gateOpeningIn };
  await recordAudit(
    actor,
    { action: "calibration.store", entity: "calibration", entityId: calibration.id, detail },
    transaction,
  );
  return { ok: true, calibrationId: calibration.id };
}
