import { randomUUID } from "node:crypto";
import type { Transaction } from "sequelize";
import type { TownActor } from "#app/context.ts";
import { now } from "#app/lib/clock.server.ts";
import { isDuplicate } from "#app/lib/db.server.ts";
import { Calibration } from "#app/models/calibration.server.ts";
import { CalibrationCatch } from "#app/models/calibration-catch.server.ts";
import { CalibrationCount } from "#app/models/calibration-count.server.ts";
import { Material } from "#app/models/material.server.ts";
import { Truck } from "#app/models/truck.server.ts";
import { recordAudit } from "../audit.server.ts";
import { NotNow, type Stored, CalibrationShape, type StagedRow } from "./staged.server.ts";

type Staged = ReturnType<typeof CalibrationShape.parse>;

async function storeOne(actor: TownActor, uploadId: number, staged: Staged, transaction: Transaction) {
  const { truckId, materialId, testedOn, gateOpeningIn, counts, catches } = staged;
  const calibration = await Calibration.create(
    {
      clientRef: randomUUID(),
      townId: actor.townId,
      truckId,
      materialId,
      testedOn,
      gateOpeningIn,
      uploadId,
      createdById: actor.userId,
      createdAt: now(),
    },
    { transaction },
  );
  const calibrationId = calibration.id;
  await CalibrationCount.bulkCreate(
    counts.map((count) => ({ calibrationId, ...count })),
    { transaction },
  );
  await CalibrationCatch.bulkCreate(
    catches.map((caught, index) => ({ calibrationId, position: index + 1, ...caught })),
    { transaction },
  );
  const detail = { truckId, materialId, testedOn, gateOpeningIn };
  const deed = { action: "calibration.store", entity: "calibration", entityId: calibrationId, detail };
  await recordAudit(actor, deed, transaction);
}

/** Put calibrations with their raw readings into the fleet. */
export async function storeCalibrations(
  actor: TownActor,
  uploadId: number,
  rows: readonly StagedRow[],
  transaction: Transaction,
): Promise<Stored> {
  const calibrations = rows.map(({ staged }) => CalibrationShape.parse(staged));
  const where = { townId: actor.townId };
  const [trucks, materials] = await Promise.all([
    Truck.findAll({ attributes: ["id"], where, transaction }),
    Material.findAll({ attributes: ["id"], where, transaction }),
  ]);
  for (const staged of calibrations) {
    if (!trucks.some(({ id }) => id === staged.truckId) || !materials.some(({ id }) => id === staged.materialId)) {
      throw new NotNow("A truck or material of this file is no longer the town’s. Check the file again.");
    }
    try {
      await storeOne(actor, uploadId, staged, transaction);
    } catch (error) {
      if (!isDuplicate(error)) throw error;
      throw new NotNow("Some of this was stored meanwhile by somebody else. Check the file again to see what is left.");
    }
  }
  return { rowCount: calibrations.length, seasonStartYears: [], days: [] };
}
