import type { Transaction } from "sequelize";
import type { TownActor } from "#app/context.ts";
import { now } from "#app/lib/clock.server.ts";
import { inTransaction, isDuplicate } from "#app/lib/db.server.ts";
import type { ReceivedFile } from "#app/lib/multipart.server.ts";
import { Upload, type UploadKind } from "#app/models/upload.server.ts";
import { recordAudit } from "../audit.server.ts";
import { uploadHandlers } from "./handlers.server.ts";
import { queueStep, startNow } from "./steps.server.ts";
import { storeFile } from "./stored-file.server.ts";

/** Archives begin with these two letters; a workbook is one. */
function formatOf({ opening }: ReceivedFile): "csv" | "xlsx" {
  return opening[0] === 0x50 && opening[1] === 0x4b ? "xlsx" : "csv";
}

/** A name without folders and invisible characters, as it is shown and given back. */
function plainName(fileName: string) {
  const last = fileName.split(/[/\\]/).at(-1) ?? "";
  const plain = last.replace(/\p{C}/gu, "").trim();
  // By whole characters: half of one cannot be written into a header.
  return [...plain].slice(0, 200).join("") || "file";
}

/**
 * Take a file in: keep it as it came and begin to read it. Nothing goes into the season or the fleet until it is accepted.
 *
 * The same file twice is one upload. Unless it has been accepted, it is read again against what is stored now.
 *
 * @param path - where the received file lies
 * @returns the upload's id, and whether the file was known
 */
export async function receiveUpload(
  actor: TownActor,
  kind: UploadKind,
  file: ReceivedFile,
  path: string,
): Promise<{ uploadId: number; isKnown: boolean }> {
  const keep = () => inTransaction((transaction) => keepFile(actor, kind, file, path, transaction));
  // Sent twice at the same moment, the second finds the first on its second look.
  const { uploadId, isKnown, dedupeKey } = await keep().catch((error: unknown) => {
    if (isDuplicate(error)) return keep();
    throw error;
  });
  if (dedupeKey !== null) await startNow(dedupeKey, uploadHandlers, actor.requestId);
  return { uploadId, isKnown };
}

async function keepFile(
  actor: TownActor,
  kind: UploadKind,
  file: ReceivedFile,
  path: string,
  transaction: Transaction,
): Promise<{ uploadId: number; isKnown: boolean; dedupeKey: string | null }> {
  const known = await Upload.findOne({
    where: { townId: actor.townId, kind, sha256: file.sha256 },
    lock: transaction.LOCK.UPDATE,
    transaction,
  });
  if (known && ["accepted", "accepting", "checking", "received"].includes(known.state)) {
    return { uploadId: known.id, isKnown: true, dedupeKey: null };
  }
  if (known) {
    // What has been answered in it stays; a file given up before begins anew.
    const isUnderWay = known.state === "checked";
    const fresh = isUnderWay ? {} : { matching: null };
    await known.update({ ...fresh, createdAt: now(), settledAt: null, settledById: null }, { transaction });
    const step = await queueStep(actor, known, isUnderWay ? "upload-check" : "upload-read", transaction);
    const detail = { kind, sha256: file.sha256, again: true };
    await recordAudit(actor, { action: "upload.receive", entity: "upload", entityId: known.id, detail }, transaction);
    return { uploadId: known.id, isKnown: true, dedupeKey: step };
  }
  const upload = await Upload.create(
    {
      townId: actor.townId,
      kind,
      fileName: plainName(file.fileName),
      byteCount: file.byteCount,
      sha256: file.sha256,
      format: formatOf(file),
      encoding: file.encoding,
      state: "received",
      rowsTotal: formatOf(file) === "csv" ? Math.max(1, file.lineCount - 1) : null,
      createdById: actor.userId,
      createdAt: now(),
    },
    { transaction },
  );
  await storeFile(upload.id, path, transaction);
  const step = await queueStep(actor, upload, "upload-read", transaction);
  const detail = { kind, sha256: file.sha256, byteCount: file.byteCount };
  await recordAudit(actor, { action: "upload.receive", entity: "upload", entityId: upload.id, detail }, transaction);
  return { uploadId: upload.id, isKnown: false, dedupeKey: step };
}
