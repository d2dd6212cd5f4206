import { Op, QueryTypes, type Transaction } from "sequelize";
import { minuteMs, now } from "#app/lib/clock.server.ts";
import { db, inTransaction } from "#app/lib/db.server.ts";
import { reasonOf } from "#app/lib/error-reason.ts";
import { log } from "#app/lib/log.server.ts";
import { Job, type JobState } from "#app/models/job.server.ts";

/** A job whose process died is taken up again after the lease; a living process renews it well before. */
const leaseMs = 20_000;
const renewalMs = 5_000;
const mostAttempts = 3;

export type NewJob = { kind: string; payload: Record<string, unknown>; dedupeKey: string; createdById: number };

/**
 * Put work into the queue, in the transaction that asks for it. Work that failed is put in again.
 *
 * @returns false when the same work waits, runs or is done
 */
export async function queueJob(job: NewJob, transaction: Transaction): Promise<boolean> {
  const known = await Job.findOne({
    where: { dedupeKey: job.dedupeKey },
    lock: transaction.LOCK.UPDATE,
    transaction,
  });
  if (known && known.state !== "failed") return false;
  if (known)
    await known.update({ ...job, state: "ready", attempts: 0, runAfter: now(), lastError: null }, { transaction });
  else await Job.create({ ...job, runAfter: now(), createdAt: now() }, { transaction });
  return true;
}

async function claimJob(dedupeKey: string | null): Promise<Job | null> {
  return inTransaction(async (transaction) => {
    // Raw, because the query builder drops SKIP LOCKED for this database.
    const [due] = await db.query<{ id: number }>(
      `SELECT id FROM job WHERE state = 'ready' AND run_after <= ?${dedupeKey === null ? "" : " AND dedupe_key = ?"}
        ORDER BY run_after, id LIMIT 1 FOR UPDATE SKIP LOCKED`,
      {
        type: QueryTypes.SELECT,
        replacements: dedupeKey === null ? [now()] : [now(), dedupeKey],
        transaction,
      },
    );
    if (!due) return null;
    const job = await Job.findByPk(due.id, { transaction, rejectOnEmpty: true });
    const lockedUntil = new Date(now().getTime() + leaseMs);
    return job.update({ state: "running", attempts: job.attempts + 1, lockedUntil }, { transaction });
  });
}

/** Keeps a running job from being taken for a dead one. @returns how to stop */
function keepClaimed(job: Job) {
  const { id, attempts } = job;
  const timer = setInterval(() => {
    const lockedUntil = new Date(now().getTime() + leaseMs);
    Job.update({ lockedUntil }, { where: { id, state: "running", attempts } }).catch((error: unknown) => {
      log.warn({ jobId: id, reason: reasonOf(error) }, "claim not renewed");
    });
  }, renewalMs);
  return () => clearInterval(timer);
}

/** A job whose process died: run again, but no more often than one that fails by itself. */
async function takeBackAbandonedJobs() {
  const abandoned = { state: "running", lockedUntil: { [Op.lt]: now() } } as const;
  await Job.update(
    { state: "failed", lastError: "The program stopped each time while it was doing this." },
    { where: { ...abandoned, attempts: { [Op.gte]: mostAttempts } } },
  );
  await Job.update({ state: "ready" }, { where: abandoned });
}

/** Does the work of one kind. */
export type JobHandler = (payload: unknown, requestId: string) => Promise<void>;
export type JobHandlers = Record<string, JobHandler>;

/** Notes what became of a job, unless it was taken for dead meanwhile and somebody else has it. */
async function settle(job: Job, outcome: Partial<Pick<Job, "state" | "finishedAt" | "lastError" | "runAfter">>) {
  await Job.update(outcome, { where: { id: job.id, state: "running", attempts: job.attempts } });
}

async function runClaimed(job: Job, handlers: JobHandlers, requestId: string): Promise<boolean> {
  const release = keepClaimed(job);
  try {
    const handler = handlers[job.kind];
    if (!handler) throw new Error(`Nobody does jobs of the kind ${job.kind}.`);
    await handler(job.payload, requestId);
    await settle(job, { state: "done", finishedAt: now(), lastError: null });
    return true;
  } catch (error) {
    const reason = reasonOf(error);
    log.error({ jobId: job.id, kind: job.kind, attempts: job.attempts, reason }, "job failed");
    await settle(
      job,
      job.attempts >= mostAttempts
        ? { state: "failed", lastError: reason }
        : { state: "ready", runAfter: new Date(now().getTime() + job.attempts * minuteMs), lastError: reason },
    );
    return false;
  } finally {
    release();
  }
}

/**
 * Run every job that is due. Handlers must be safe to run twice: a job whose process died is run again, three times in
 * all.
 *
 * @returns how many were finished
 */
export async function runDueJobs(handlers: JobHandlers, requestId: string): Promise<number> {
  await takeBackAbandonedJobs();
  let finished = 0;
  for (;;) {
    const job = await claimJob(null);
    if (!job) return finished;
    if (await runClaimed(job, handlers, requestId)) finished++;
  }
}

/**
 * Run one job now, if nobody has it yet, rather than at the worker's next turn.
 *
 * @param dedupeKey - as it was queued with; its transaction must have ended
 */
export async function runJobNow(dedupeKey: string, handlers: JobHandlers, requestId: string): Promise<void> {
  const job = await claimJob(dedupeKey);
  if (job) await runClaimed(job, handlers, requestId);
}

export type JobLine = { id: number; kind: string; dedupeKey: string; state: JobState; lastError: string | null };

/** The newest jobs of one kind, newest first. */
export async function listJobs(kind: string, limit = 20): Promise<JobLine[]> {
  const jobs = await Job.findAll({ where: { kind }, order: [["id", "DESC"]], limit });
  return jobs.map(({ id, dedupeKey, state, lastError }) => ({ id, kind, dedupeKey, state, lastError }));
}
