import { QueryTypes, type Transaction } from "sequelize";
import type { TownActor } from "#app/context.ts";
import { missingFields } from "#app/domain/upload/field.ts";
import { plainHead } from "#app/domain/upload/match-columns.ts";
import type { MeasureUnit } from "#app/domain/upload/measure.ts";
import { db, inTransaction } from "#app/lib/db.server.ts";
import { conflict, notFound } from "#app/lib/errors.ts";
import { Upload } from "#app/models/upload.server.ts";
import { recordAudit } from "../audit.server.ts";
import { uploadHandlers } from "./handlers.server.ts";
import { uploadKinds } from "./kinds.server.ts";
import { type Matching, matchingOf } from "./matching.server.ts";
import { forgetRows } from "./staging.server.ts";
import { queueStep, settledNow, startNow } from "./steps.server.ts";

/** The upload, locked; looked at before it is locked, because while it is taken in that would last. */
async function lockUpload(actor: TownActor, uploadId: number, transaction: Transaction): Promise<Upload> {
  const where = { id: uploadId, townId: actor.townId };
  const seen = await Upload.findOne({ attributes: ["id", "state"], where, transaction });
  if (!seen) throw notFound("upload");
  if (seen.state === "accepting") throw conflict("This file is being taken in just now. Look at it again in a moment.");
  return Upload.findOne({ where, lock: transaction.LOCK.UPDATE, transaction, rejectOnEmpty: true });
}

export type AcceptOutcome =
  | { ok: true }
  | { ok: false; reason: "accepted-before" | "errors-stand" | "nothing-ready" | "not-checked" }
  /** Something changed meanwhile; `message` says what. */
  | { ok: false; reason: "not-now"; message: string };

/**
 * Ask for a checked file's good rows to be taken in: all in one transaction, or none.
 *
 * @param choice.leaveOut - whether rows with errors are left behind on purpose
 * @param choice.isReplacing - whether rows of earlier files of the same days give way
 * @throws 404 when the upload is not the town's
 */
export async function acceptUpload(
  actor: TownActor,
  uploadId: number,
  choice: { leaveOut: boolean; isReplacing: boolean },
): Promise<AcceptOutcome> {
  const outcome = await inTransaction(async (transaction) => {
    const upload = await lockUpload(actor, uploadId, transaction);
    if (upload.state === "accepted") return { ok: false, reason: "accepted-before" } as const;
    if (upload.state !== "checked") return { ok: false, reason: "not-checked" } as const;
    const canGo = upload.rowsError === 0 || (choice.leaveOut && uploadKinds[upload.kind].canLeaveOut);
    if (!canGo) return { ok: false, reason: "errors-stand" } as const;
    if (upload.rowsOk + upload.rowsCheck === 0) return { ok: false, reason: "nothing-ready" } as const;
    await upload.update({ isReplacing: choice.isReplacing }, { transaction });
    return { ok: true, dedupeKey: await queueStep(actor, upload, "upload-accept", transaction) } as const;
  });
  if (!outcome.ok) return outcome;
  await startNow(outcome.dedupeKey, uploadHandlers, actor.requestId);
  const after = await Upload.findByPk(uploadId, { attributes: ["state", "failure"] });
  return after?.state === "checked" && after.failure !== null
    ? { ok: false, reason: "not-now", message: after.failure }
    : { ok: true };
}

/**
 * Give an upload up: what was read of it is forgotten, the file and its name stay in the history.
 *
 * @returns false when it had been accepted, which is not taken back this way
 * @throws 404 when the upload is not the town's; 409 while it is being taken in
 */
export async function cancelUpload(actor: TownActor, uploadId: number): Promise<boolean> {
  const isCancelled = await inTransaction(async (transaction) => {
    const upload = await lockUpload(actor, uploadId, transaction);
    if (upload.state === "accepted") return false;
    const none = { rowsOk: 0, rowsCheck: 0, rowsError: 0, rowsLeftOut: 0, failure: null };
    await upload.update({ state: "cancelled", run: upload.run + 1, ...none, ...settledNow(actor) }, { transaction });
    await db.query("DELETE FROM upload_answer WHERE upload_id = ?", {
      type: QueryTypes.DELETE,
      replacements: [uploadId],
      transaction,
    });
    await recordAudit(actor, { action: "upload.cancel", entity: "upload", entityId: uploadId }, transaction);
    return true;
  });
  if (isCancelled) {
    await forgetRows(uploadId, async (work) => {
      await inTransaction(async (transaction) => {
        // Opened again meanwhile by the same file, its new rows stay.
        const where = { id: uploadId, state: "cancelled" };
        if (await Upload.findOne({ attributes: ["id"], where, lock: transaction.LOCK.UPDATE, transaction })) {
          await work(transaction);
        }
      });
    });
  }
  return isCancelled;
}

export type ColumnChoice = { field: string | null; unit: MeasureUnit | null };
export type MatchChoice = {
  columns: readonly ColumnChoice[];
  decimalMark: Matching["decimalMark"];
  dateOrder: Matching["dateOrder"];
};
export type MatchOutcome = { ok: true } | { ok: false; message: string };

async function rememberColumns(actor: TownActor, upload: Upload, matching: Matching, transaction: Transaction) {
  for (const { head, field, unit } of matching.columns) {
    const plain = plainHead(head).slice(0, 120);
    if (plain === "") continue;
    await db.query("REPLACE INTO column_match VALUES (?, ?, ?, ?, ?)", {
      type: QueryTypes.INSERT,
      replacements: [actor.townId, upload.kind, plain, field ?? "", unit],
      transaction,
    });
  }
}

/**
 * Settle what the columns hold, remember it for the town's next file, and check the rows.
 *
 * @param choice.columns - for each column of the file, in its order
 * @returns why it cannot be read so, in a sentence
 * @throws 404 when the upload is not the town's; 409 when it is not waiting for this
 */
export async function matchColumns(actor: TownActor, uploadId: number, choice: MatchChoice): Promise<MatchOutcome> {
  const outcome = await inTransaction(async (transaction) => {
    const upload = await lockUpload(actor, uploadId, transaction);
    const before = matchingOf(upload);
    if (before === null || !["matching", "checked", "failed"].includes(upload.state)) {
      throw conflict("This upload has moved on meanwhile. Open it again to see where it stands.");
    }
    const fields = await uploadKinds[upload.kind].fields(actor);
    const chosen = choice.columns.flatMap(({ field }) => field ?? []);
    const twice = fields.find(({ key }) => chosen.filter((field) => field === key).length > 1);
    if (twice)
      return { ok: false, message: `Two columns are taken for the ${twice.label}. Choose one of them.` } as const;
    const missing = missingFields(fields, new Set(chosen));
    if (missing.length > 0) {
      return { ok: false, message: `No column is chosen for: ${missing.join(", ")}.` } as const;
    }
    const columns = before.columns.map((column, index) => {
      const { field = null, unit = null } = choice.columns[index] ?? {};
      const known = fields.find(({ key }) => key === field);
      const isMeasured = known?.dimensions !== undefined;
      return {
        ...column,
        field: known?.key ?? null,
        unit: isMeasured ? (unit ?? known.unit ?? null) : null,
        isCertain: true,
      };
    });
    const { decimalMark, dateOrder } = choice;
    const matching: Matching = { ...before, columns, decimalMark, dateOrder };
    await upload.update({ matching }, { transaction });
    await rememberColumns(actor, upload, matching, transaction);
    const detail = { columns: columns.map(({ head, field, unit }) => ({ head, field, unit })) };
    await recordAudit(actor, { action: "upload.match", entity: "upload", entityId: uploadId, detail }, transaction);
    return { ok: true, dedupeKey: await queueStep(actor, upload, "upload-check", transaction) } as const;
  });
  if (!outcome.ok) return outcome;
  await startNow(outcome.dedupeKey, uploadHandlers, actor.requestId);
  return { ok: true };
}

/**
 * Look for the heads in another sheet or another row.
 *
 * @throws 404 when the upload is not the town's; 409 when it is not waiting for this
 */
export async function lookElsewhere(
  actor: TownActor,
  uploadId: number,
  place: { sheetName: string | null; headRow: number | null },
): Promise<void> {
  const dedupeKey = await inTransaction(async (transaction) => {
    const upload = await lockUpload(actor, uploadId, transaction);
    const before = matchingOf(upload);
    if (before === null || !["matching", "checked", "failed"].includes(upload.state)) {
      throw conflict("This upload has moved on meanwhile. Open it again to see where it stands.");
    }
    const isOtherSheet = place.sheetName !== null && place.sheetName !== before.sheetName;
    const sheetName = place.sheetName ?? before.sheetName;
    // In another sheet the heads are looked for anew.
    const headRow = isOtherSheet ? 0 : (place.headRow ?? before.headRow);
    const matching: Matching = { ...before, sheetName, headRow };
    await upload.update({ matching }, { transaction });
    return queueStep(actor, upload, "upload-read", transaction);
  });
  await startNow(dedupeKey, uploadHandlers, actor.requestId);
}

/** Begin the last step of an upload again after a fault of ours. @throws 404 as findUpload */
export async function startAgain(actor: TownActor, uploadId: number): Promise<void> {
  const dedupeKey = await inTransaction(async (transaction) => {
    const upload = await lockUpload(actor, uploadId, transaction);
    if (!["failed", "checked"].includes(upload.state)) return null;
    return queueStep(actor, upload, matchingOf(upload) === null ? "upload-read" : "upload-check", transaction);
  });
  if (dedupeKey !== null) await startNow(dedupeKey, uploadHandlers, actor.requestId);
}
