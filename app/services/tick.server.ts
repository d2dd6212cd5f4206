import type { WorkerActor } from "#app/context.ts";
import { hourMs, now } from "#app/lib/clock.server.ts";
import { publishQueuedEdition } from "./publish-edition.server.ts";
import { runDueJobs } from "./jobs.server.ts";
import { sendDueMail } from "./outbox.server.ts";
import { remindTowns } from "./seasons.server.ts";
import { forgetEndedSessions } from "./sessions.server.ts";
import { fetchQueuedWeather } from "./stations.server.ts";

/** Reminders are due by the day; looking for them at every turn would be idle work. */
let lookedForRemindersAt = 0;

async function remindOnceAnHour() {
  if (now().getTime() - lookedForRemindersAt < hourMs) return;
  await remindTowns();
  lookedForRemindersAt = now().getTime();
}

/** Do everything that is due: jobs, reminders, then mail, then tidying. */
export async function tick(actor: WorkerActor): Promise<{ jobs: number; mails: number }> {
  const jobs = await runDueJobs(
    { "publish-edition": publishQueuedEdition, "fetch-weather": fetchQueuedWeather },
    actor.requestId,
  );
  await remindOnceAnHour();
  const mails = await sendDueMail();
  await forgetEndedSessions();
  return { jobs, mails };
}
