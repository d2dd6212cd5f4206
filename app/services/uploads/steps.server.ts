import { setTimeout as sleep } from "node:timers/promises";
import { Op, QueryTypes, type Transaction } from "sequelize";
import { z } from "zod";
import type { TownActor } from "#app/context.ts";
import { now } from "#app/lib/clock.server.ts";
import { db, inTransaction } from "#app/lib/db.server.ts";
import { placesOf, reasonOf } from "#app/lib/error-reason.ts";
import { FileError } from "#app/lib/file-error.ts";
import { log } from "#app/lib/log.server.ts";
import { Upload, type UploadState } from "#app/models/upload.server.ts";
import { type JobHandlers, queueJob, runJobNow } from "../jobs.server.ts";

export type StepName = "upload-read" | "upload-check" | "upload-accept";

/** The state an upload is in while the step is waited for and done. */
const stateOfStep: Record<StepName, UploadState> = {
  "upload-read": "received",
  "upload-check": "checking",
  "upload-accept": "accepting",
};

/** Short work is waited for, so that its outcome is on the page one comes to; the rest goes on by itself. */
const patienceMs = 2_500;

const Payload = z.object({
  uploadId: z.number().int(),
  actor: z.object({
    userId: z.number(),
    name: z.string(),
    role: z.enum(["recorder", "director"]),
    townId: z.number(),
    townName: z.string(),
  }),
});

/**
 * Ask for the next step of an upload, in the transaction that decides on it.
 *
 * @returns the name of the job, for startNow
 */
export async function queueStep(
  actor: TownActor,
  upload: Upload,
  step: StepName,
  transaction: Transaction,
): Promise<string> {
  const run = upload.run + 1;
  await upload.update({ state: stateOfStep[step], run, failure: null }, { transaction });
  const { userId, name, role, townId, townName } = actor;
  const payload = { uploadId: upload.id, actor: { userId, name, role, townId, townName } };
  const dedupeKey = `upload:${upload.id}:${run}`;
  await queueJob({ kind: step, payload, dedupeKey, createdById: userId }, transaction);
  return dedupeKey;
}

/** Begin a queued step at once, and wait a moment for it. */
export async function startNow(dedupeKey: string, handlers: JobHandlers, requestId: string): Promise<void> {
  const work = runJobNow(dedupeKey, handlers, requestId).catch((error: unknown) => {
    log.error(
      { requestId, dedupeKey, reason: reasonOf(error) },
      "a step of an upload broke off; the worker takes it up",
    );
  });
  await Promise.race([work, sleep(patienceMs, undefined, { ref: false })]);
}

/** Thrown when the upload was cancelled, or another process has taken the step over: nothing more is to be done. */
export class StepOver extends Error {}

/** One step of one upload under way. */
export type Step = {
  upload: Upload;
  actor: TownActor;
  /**
   * Write something as part of this step.
   *
   * @throws StepOver when it is no longer this step's turn; what `work` wrote is then undone
   */
  write: (progress: Progress, work: (transaction: Transaction) => Promise<void>) => Promise<void>;
};
type Progress = Partial<
  Pick<
    Upload,
    | "state"
    | "rowsTotal"
    | "rowsRead"
    | "rowsOk"
    | "rowsCheck"
    | "rowsError"
    | "rowsLeftOut"
    | "matching"
    | "failure"
    | "periodStart"
    | "periodEnd"
  >
>;

/**
 * Take a step on. Whoever took it before and still writes is shut out by the number of the run.
 *
 * @returns null when the upload is no longer in that step: it was cancelled, or the step is done
 */
async function beginStep(step: StepName, payload: unknown, requestId: string): Promise<Step | null> {
  const { uploadId, actor } = Payload.parse(payload);
  const state = stateOfStep[step];
  const upload = await inTransaction(async (transaction) => {
    const found = await Upload.findOne({
      where: { id: uploadId, townId: actor.townId, state },
      lock: transaction.LOCK.UPDATE,
      transaction,
    });
    return found ? found.update({ run: found.run + 1 }, { transaction }) : null;
  });
  if (!upload) return null;
  const { run } = upload;
  const write: Step["write"] = (progress, work) =>
    inTransaction(async (transaction) => {
      const where = { id: uploadId, run, state: { [Op.in]: [state, "checking"] } };
      // Locked until the rest is written, so that nobody takes the step over in between.
      const own = await Upload.findOne({ attributes: ["id"], where, lock: transaction.LOCK.UPDATE, transaction });
      if (!own) throw new StepOver();
      if (Object.keys(progress).length > 0) await Upload.update(progress, { where: { id: uploadId }, transaction });
      await work(transaction);
    });
  return { upload, actor: { kind: "town", ...actor, requestId, sessionId: null }, write };
}

/**
 * A job that does one step of an upload. A file that cannot be read is an outcome, not a failed job; a fault of ours
 * leaves the upload in a state from which it can be started again.
 *
 * @param afterFault - the state to fall back to
 */
export function stepHandler(step: StepName, afterFault: UploadState, work: (step: Step) => Promise<void>): JobHandlers {
  return {
    [step]: async (payload, requestId) => {
      const begun = await beginStep(step, payload, requestId);
      if (!begun) return;
      try {
        await work(begun);
      } catch (error) {
        if (error instanceof StepOver) return;
        const isFileFault = error instanceof FileError;
        if (!isFileFault)
          log.error(
            { requestId, uploadId: begun.upload.id, step, reason: reasonOf(error), places: placesOf(error) },
            "a step failed",
          );
        const failure = isFileFault
          ? error.message.slice(0, 400)
          : "Something went wrong on our side, and nothing was taken in. Start this step again.";
        const state = isFileFault ? "failed" : afterFault;
        await begun
          .write({ state, failure }, async () => {})
          .catch((after: unknown) => {
            if (!(after instanceof StepOver)) throw after;
          });
      }
    },
  };
}

/** Now, for columns that say when. */
export function settledNow(actor: TownActor) {
  return { settledAt: now(), settledById: actor.userId };
}

/**
 * Uploads whose step nobody does any more, because the program died at it each time, go back to where somebody can
 * start it again.
 */
export async function releaseStalledUploads(): Promise<void> {
  const failure = "This step was begun three times and broken off each time. Nothing was taken in. Start it again.";
  await db.query(
    `UPDATE upload u SET u.state = IF(u.state = 'accepting', 'checked', 'failed'), u.failure = ?
      WHERE u.state IN ('received', 'checking', 'accepting') AND NOT EXISTS (
        SELECT 1 FROM job j WHERE j.state IN ('ready', 'running') AND j.kind IN ('upload-read', 'upload-check', 'upload-accept')
          AND JSON_VALUE(j.payload, '$.uploadId') = u.id)`,
    { type: QueryTypes.UPDATE, replacements: [failure] },
  );
}
