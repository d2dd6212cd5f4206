import { randomUUID } from "node:crypto";
import type { Transaction } from "sequelize";
import type { TownActor } from "#app/context.ts";
import { now } from "#app/lib/clock.server.ts";
import { inTransaction, isDuplicate } from "#app/lib/db.server.ts";
import { conflict, notFound } from "#app/lib/errors.ts";
import { Calibration } from "#app/models/calibration.server.ts";
import { CalibrationCatch } from "#app/models/calibration-catch.server.ts";
import { CalibrationCount } from "#app/models/calibration-count.server.ts";
import { Material } from "#app/models/material.server.ts";
import { SeasonFigure } from "#app/models/season-figure.server.ts";
import { Truck } from "#app/models/truck.server.ts";
import { Upload } from "#app/models/upload.server.ts";
import { recordAudit } from "../audit.server.ts";
import { StagedCalibrations, StagedSeasons } from "./kinds.server.ts";
import { storedProblems } from "./read.server.ts";
import { storeTrucks } from "./store-trucks.server.ts";

async function storeSeasons(actor: TownActor, upload: Upload, transaction: Transaction) {
  for (const { seasonStartYear, amounts } of StagedSeasons.parse(upload.staged)) {
    const where = { townId: actor.townId, seasonStartYear };
    const figure = await SeasonFigure.findOne({ where, lock: transaction.LOCK.UPDATE, transaction });
    if (figure && figure.state !== "draft" && figure.state !== "returned") {
      throw conflict(
        "This season was sent in meanwhile, so the file was not taken. Ask the coordinator to send it back first.",
      );
    }
    const before = figure ? { version: figure.version, saltLb: figure.saltLb, laneMiles: figure.laneMiles } : null;
    const saved = figure
      ? await figure.update({ ...amounts, uploadId: upload.id, version: figure.version + 1 }, { transaction })
      : await SeasonFigure.create({ ...where, ...amounts, uploadId: upload.id, createdAt: now() }, { transaction });
    const detail = { seasonStartYear, before, after: amounts };
    await recordAudit(
      actor,
      { action: "season-figure.fill", entity: "season_figure", entityId: saved.id, detail },
      transaction,
    );
  }
}

async function storeCalibrations(actor: TownActor, upload: Upload, transaction: Transaction) {
  const staged = StagedCalibrations.parse(upload.staged);
  const [trucks, materials] = await Promise.all([
    Truck.findAll({ attributes: ["id"], where: { townId: actor.townId }, transaction }),
    Material.findAll({ attributes: ["id"], where: { townId: actor.townId }, transaction }),
  ]);
  for (const { truckId, materialId, testedOn, gateOpeningIn, counts, catches } of staged) {
    if (!trucks.some(({ id }) => id === truckId) || !materials.some(({ id }) => id === materialId)) {
      throw conflict("A truck or material of this file is no longer the town's. Upload the file again.");
    }
    const calibration = await Calibration.create(
      {
        clientRef: randomUUID(),
        townId: actor.townId,
        truckId,
        materialId,
        testedOn,
        gateOpeningIn,
        uploadId: upload.id,
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
    await recordAudit(
      actor,
      { action: "calibration.store", entity: "calibration", entityId: calibrationId, detail },
      transaction,
    );
  }
}

const storeKind = {
  "season-figures": storeSeasons,
  calibrations: storeCalibrations,
  trucks: storeTrucks,
};

/**
 * Take everything a checked file holds, in one transaction: all of it or none.
 *
 * @returns `{ ok: false }` when errors stand or it was accepted before, so that the page can say so
 * @throws 404 when the upload is not the town's; 409 when what it fills was changed meanwhile
 */
export async function acceptUpload(actor: TownActor, uploadId: number) {
  try {
    return await inTransaction(async (transaction) => {
      const where = { id: uploadId, townId: actor.townId };
      const upload = await Upload.findOne({ where, lock: transaction.LOCK.UPDATE, transaction });
      if (!upload) throw notFound("upload");
      if (upload.state === "accepted") return { ok: false, reason: "accepted-before" } as const;
      if (storedProblems(upload).some((problem) => problem.severity === "error")) {
        return { ok: false, reason: "errors-stand" } as const;
      }
      await storeKind[upload.kind](actor, upload, transaction);
      await upload.update({ state: "accepted", settledAt: now(), settledById: actor.userId }, { transaction });
      await recordAudit(actor, { action: "upload.accept", entity: "upload", entityId: upload.id }, transaction);
      return { ok: true, kind: upload.kind } as const;
    });
  } catch (error) {
    if (isDuplicate(error))
      throw conflict("Some of this was stored meanwhile by somebody else. Upload the file again to see what is left.");
    throw error;
  }
}
