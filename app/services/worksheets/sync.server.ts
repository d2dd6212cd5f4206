import { createHash } from "node:crypto";
import type { Transaction } from "sequelize";
import type { TownActor } from "#app/context.ts";
import { worksheetProblems } from "#app/domain/calibration/worksheet.ts";
import type { SyncAnswer } from "#app/domain/calibration/worksheet-sync.ts";
import { now } from "#app/lib/clock.server.ts";
import { inTransaction, isDuplicate } from "#app/lib/db.server.ts";
import { notFound } from "#app/lib/errors.ts";
import { Calibration } from "#app/models/calibration.server.ts";
import { Material } from "#app/models/material.server.ts";
import { Truck } from "#app/models/truck.server.ts";
import { StoredWorksheet } from "#app/models/worksheet.server.ts";
import { WorksheetOp } from "#app/models/worksheet-op.server.ts";
import { WorksheetVersion } from "#app/models/worksheet-version.server.ts";
import { recordAudit } from "../audit.server.ts";
import { storeCalibration } from "./finish.server.ts";
import { isSameSheet, SheetSchema, storedAnswer, type SyncRequest } from "./sheet-schema.server.ts";

export type Answered = { status: number; body: unknown };
type Step = { actor: TownActor; request: SyncRequest; transaction: Transaction };

function fingerprint({ clientRef, baseVersion, sheet, isFinish, settles }: SyncRequest) {
  return createHash("sha256")
    .update(JSON.stringify([clientRef, baseVersion, sheet, isFinish, settles]))
    .digest("hex");
}

/** Every id that the sheet names must be the town's; the truck's row is locked, so that one truck finishes one sheet at a time. */
async function townTruck({ actor, request: { sheet }, transaction }: Step) {
  const truck = await Truck.findOne({
    where: { id: sheet.truckId, townId: actor.townId },
    lock: transaction.LOCK.UPDATE,
    transaction,
  });
  if (!truck) throw notFound("truck");
  const material = await Material.findOne({
    attributes: ["id"],
    where: { id: sheet.materialId, townId: actor.townId },
    transaction,
  });
  if (!material) throw notFound("material");
  if (sheet.countsFromCalibrationId !== null) {
    const earlier = await Calibration.findOne({
      attributes: ["id"],
      where: { id: sheet.countsFromCalibrationId, townId: actor.townId, truckId: truck.id },
      transaction,
    });
    if (!earlier) throw notFound("earlier calibration");
  }
  return truck;
}

async function keepBoth(step: Step, worksheet: StoredWorksheet): Promise<Answered> {
  const { actor, request, transaction } = step;
  const kept = await WorksheetVersion.create(
    {
      worksheetId: worksheet.id,
      baseVersion: request.baseVersion,
      content: request.sheet,
      device: request.device,
      byUserId: actor.userId,
      createdAt: now(),
    },
    { transaction },
  );
  const detail = { keptVersionId: kept.id, baseVersion: request.baseVersion, version: worksheet.version };
  await recordAudit(
    actor,
    { action: "worksheet.conflict", entity: "worksheet", entityId: worksheet.id, detail },
    transaction,
  );
  const body = {
    outcome: "conflict",
    theirs: SheetSchema.parse(worksheet.content),
    version: worksheet.version,
    device: worksheet.device,
    keptVersionId: kept.id,
    calibrationId: worksheet.calibrationId,
  } satisfies SyncAnswer;
  return { status: 409, body };
}

async function save(step: Step, existing: StoredWorksheet | null) {
  const { actor, request, transaction } = step;
  const { sheet, clientRef, device } = request;
  const content = { truckId: sheet.truckId, materialId: sheet.materialId, content: sheet, device };
  const stamp = { updatedById: actor.userId, updatedAt: now() };
  if (!existing) {
    const created = await StoredWorksheet.create(
      {
        townId: actor.townId,
        clientRef,
        version: 1,
        ...content,
        ...stamp,
        createdById: actor.userId,
        createdAt: now(),
      },
      { transaction },
    );
    const detail = { truckId: sheet.truckId, materialId: sheet.materialId };
    await recordAudit(
      actor,
      { action: "worksheet.start", entity: "worksheet", entityId: created.id, detail },
      transaction,
    );
    return created;
  }
  if (!isSameSheet(SheetSchema.parse(existing.content), sheet)) {
    await existing.update({ ...content, ...stamp, version: existing.version + 1 }, { transaction });
  }
  return existing;
}

async function settle(step: Step): Promise<Answered> {
  const { actor, request, transaction } = step;
  const truck = await townTruck(step);
  const existing = await StoredWorksheet.findOne({
    where: { townId: actor.townId, clientRef: request.clientRef },
    lock: transaction.LOCK.UPDATE,
    transaction,
  });
  if (existing) {
    const isSame = isSameSheet(SheetSchema.parse(existing.content), request.sheet);
    const isBehind = existing.version !== request.baseVersion || existing.state === "finished";
    if (isBehind && !isSame) return keepBoth(step, existing);
    await WorksheetVersion.update(
      { settledAt: now() },
      { where: { worksheetId: existing.id, id: request.settles, settledAt: null }, transaction },
    );
    if (existing.state === "finished" && existing.calibrationId !== null) {
      const { version, calibrationId } = existing;
      return { status: 200, body: { outcome: "finished", version, calibrationId } satisfies SyncAnswer };
    }
  }
  const worksheet = await save(step, existing);
  const { version } = worksheet;
  if (!request.isFinish) return { status: 200, body: { outcome: "saved", version } satisfies SyncAnswer };

  const problems = worksheetProblems(request.sheet, truck).filter(({ severity }) => severity === "error");
  if (problems.length > 0) {
    return { status: 422, body: { outcome: "not-finished", version, problems } satisfies SyncAnswer };
  }
  const stored = await storeCalibration(actor, request.sheet, transaction);
  if (!stored.ok) {
    return { status: 422, body: { outcome: "not-finished", version, problems: stored.problems } satisfies SyncAnswer };
  }
  const { calibrationId } = stored;
  await worksheet.update({ state: "finished", calibrationId }, { transaction });
  const detail = { calibrationId };
  await recordAudit(
    actor,
    { action: "worksheet.finish", entity: "worksheet", entityId: worksheet.id, detail },
    transaction,
  );
  return { status: 200, body: { outcome: "finished", version, calibrationId } satisfies SyncAnswer };
}

/**
 * Take one message from a phone: save the worksheet, keep both when it met a newer one, finish it into a calibration.
 * A message that was answered before is answered the same again and changes nothing.
 *
 * @param request - checked for its shape; `baseVersion` is the server's version that the sheet grew from
 * @returns the status and the body to answer: 200 saved or finished, 409 met another version (both are kept), 422
 *   saved and not finished because of errors in its figures, or a message id that was used for something else
 * @throws 404 when truck, material or the calibration whose counts it uses is not the town's
 */
export async function receiveWorksheet(actor: TownActor, request: SyncRequest): Promise<Answered> {
  const { opId } = request;
  const requestSha256 = fingerprint(request);
  for (let attempt = 1; ; attempt++) {
    const before = await WorksheetOp.findOne({ where: { townId: actor.townId, opId } });
    if (before) {
      if (before.requestSha256 === requestSha256) return storedAnswer(before.response);
      return { status: 422, body: { outcome: "refused", message: "This message was used for something else before." } };
    }
    try {
      return await inTransaction(async (transaction) => {
        // First of all, so that the same message arriving twice at once waits here and then finds the answer.
        const op = await WorksheetOp.create(
          { townId: actor.townId, opId, requestSha256, response: {}, createdAt: now() },
          { transaction },
        );
        const answered = await settle({ actor, request, transaction });
        await op.update({ response: answered }, { transaction });
        return answered;
      });
    } catch (error) {
      if (!isDuplicate(error) || attempt === 5) throw error;
    }
  }
}
