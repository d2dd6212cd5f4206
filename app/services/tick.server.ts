import type { WorkerActor } from "#app/context.ts";
import { publishQueuedEdition } from "./publish-edition.server.ts";
import { runDueJobs } from "./jobs.server.ts";
import { sendDueMail } from "./outbox.server.ts";
import { uploadHandlers } from "./uploads/handlers.server.ts";
import { releaseStalledUploads } from "./uploads/steps.server.ts";
import { forgetEndedSessions } from "./sessions.server.ts";

/** Do everything that is due: jobs, then mail, then tidying. */
export async function tick(actor: WorkerActor): Promise<{ jobs: number; mails: number }> {
  const jobs = await runDueJobs({ "publish-edition": publishQueuedEdition, ...uploadHandlers }, actor.requestId);
  await releaseStalledUploads();
  const mails = await sendDueMail();
  await forgetEndedSessions();
  return { jobs, mails };
}
