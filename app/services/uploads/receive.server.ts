import type { Transaction } from "sequelize";
import type { TownActor } from "#app/context.ts";
import type { FileProblem } from "#app/domain/file-problem.ts";
import { now } from "#app/lib/clock.server.ts";
import { readCsv } from "#app/lib/csv.server.ts";
import { inTransaction, isDuplicate } from "#app/lib/db.server.ts";
import { sha256 } from "#app/lib/secrets.server.ts";
import { Upload, type UploadKind } from "#app/models/upload.server.ts";
import { recordAudit } from "../audit.server.ts";
import { uploadKinds } from "./kinds.server.ts";

type ReceivedFile = { kind: UploadKind; fileName: string; content: Uint8Array };

/** At most this many problems are kept; a file with more has one cause, not five hundred. */
const mostProblems = 500;

/**
 * Take a file in: keep it as it came, check every row, and keep what the checks made of it. Nothing goes into the
 * season or the fleet until it is accepted.
 *
 * The same file twice is one upload: it is checked again against what is stored now.
 *
 * @returns the upload's id
 */
export async function receiveUpload(actor: TownActor, { kind, fileName, content }: ReceivedFile): Promise<number> {
  const digest = sha256(content);
  const table = await readCsv(content, uploadKinds[kind].columns);
  const keep = async (transaction: Transaction) => {
    const known = await Upload.findOne({
      attributes: ["id", "state"],
      where: { townId: actor.townId, kind, sha256: digest },
      lock: transaction.LOCK.UPDATE,
      transaction,
    });
    if (known?.state === "accepted") return known.id;
    const checked = await uploadKinds[kind].check(actor, table.rows, transaction);
    // Errors first: what is cut off must never be what keeps the file out.
    const problems: FileProblem[] = [...table.problems, ...checked.problems]
      .sort((a, b) => Number(b.severity === "error") - Number(a.severity === "error"))
      .slice(0, mostProblems);
    const outcome = { rowCount: table.rows.length, staged: checked.staged, problems };
    if (known) {
      await known.update({ ...outcome, createdAt: now() }, { transaction });
      return known.id;
    }
    const upload = await Upload.create(
      {
        ...outcome,
        townId: actor.townId,
        kind,
        fileName: fileName.slice(0, 200),
        byteCount: content.length,
        sha256: digest,
        content: Buffer.from(content),
        state: "checked",
        createdById: actor.userId,
        createdAt: now(),
      },
      { transaction },
    );
    const detail = { kind, sha256: digest, rowCount: outcome.rowCount, problemCount: problems.length };
    await recordAudit(actor, { action: "upload.receive", entity: "upload", entityId: upload.id, detail }, transaction);
    return upload.id;
  };
  try {
    return await inTransaction(keep);
  } catch (error) {
    // Somebody else of the town sent the same file in the same moment: theirs is this upload.
    if (!isDuplicate(error)) throw error;
    return inTransaction(keep);
  }
}
