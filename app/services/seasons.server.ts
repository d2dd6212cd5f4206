import type { NetworkActor } from "#app/context.ts";
import { daysBetween, seasonLabel } from "#app/domain/dates.ts";
import { seasonOpenedLetter, seasonReminderLetter } from "#app/emails/season.ts";
import { now } from "#app/lib/clock.server.ts";
import { inTransaction } from "#app/lib/db.server.ts";
import { env } from "#app/lib/env.server.ts";
import { notFound } from "#app/lib/errors.ts";
import { formatDay } from "#app/lib/format.ts";
import { Season } from "#app/models/season.server.ts";
import { Town } from "#app/models/town.server.ts";
import { recordAudit } from "./audit.server.ts";
import { townPeopleBut } from "./mail-recipients.server.ts";
import { queueMail } from "./outbox.server.ts";
import { figureStates, townsDoneWith } from "./season-figures/states.server.ts";

export type SeasonDates = { opensOn: string | null; figuresDueOn: string; closesOn: string | null };
export type SeasonLine = SeasonDates & {
  startYear: number;
  draftCount: number;
  sentCount: number;
  returnedCount: number;
  acceptedCount: number;
  townCount: number;
};

/** Every season the network has opened, newest first, with how many towns are how far. */
export async function listSeasons(_actor: NetworkActor): Promise<SeasonLine[]> {
  const [seasons, figures, townCount] = await Promise.all([
    Season.findAll({ order: [["startYear", "DESC"]] }),
    figureStates(),
    Town.count(),
  ]);
  return seasons.map(({ startYear, opensOn, figuresDueOn, closesOn }) => {
    const count = (state: string) =>
      figures.filter((figure) => figure.seasonStartYear === startYear && figure.state === state).length;
    return {
      startYear,
      opensOn,
      figuresDueOn,
      closesOn,
      draftCount: count("draft"),
      sentCount: count("sent"),
      returnedCount: count("returned"),
      acceptedCount: count("accepted"),
      townCount,
    };
  });
}

/**
 * Open a season to the towns and write to everybody of every town who wants to know.
 *
 * @returns false when it was opened before
 */
export async function openSeason(actor: NetworkActor, startYear: number, dates: SeasonDates): Promise<boolean> {
  return inTransaction(async (transaction) => {
    if (await Season.findByPk(startYear, { transaction })) return false;
    await Season.create({ startYear, ...dates }, { transaction });
    await recordAudit(
      actor,
      { action: "season.open", entity: "season", entityId: startYear, detail: { ...dates } },
      transaction,
    );
    const season = seasonLabel(startYear);
    const dueOn = formatDay(dates.figuresDueOn);
    const address = `${env.publicOrigin}/season/${startYear}`;
    for (const { userId, ...to } of await townPeopleBut([], "season-opened", transaction)) {
      await queueMail(
        `season-opened:${startYear}:${userId}`,
        seasonOpenedLetter({ ...to, season, dueOn, address }),
        transaction,
      );
    }
    return true;
  });
}

/** Move a season's dates. @throws 404 when it is not opened */
export async function changeSeason(actor: NetworkActor, startYear: number, dates: SeasonDates): Promise<void> {
  await inTransaction(async (transaction) => {
    const season = await Season.findByPk(startYear, { lock: transaction.LOCK.UPDATE, transaction });
    if (!season) throw notFound("season");
    const before = { opensOn: season.opensOn, figuresDueOn: season.figuresDueOn, closesOn: season.closesOn };
    await season.update(dates, { transaction });
    await recordAudit(
      actor,
      { action: "season.change", entity: "season", entityId: startYear, detail: { before, ...dates } },
      transaction,
    );
  });
}

/** So many days before the figures are due, towns that have not sent them are reminded: once for each. */
const reminderDays = [21, 3] as const;

/**
 * Queue the reminders that are due today.
 *
 * @returns how many people are written to; a second run on the same day finds the mails queued and adds none
 */
export async function remindTowns(): Promise<number> {
  const today = now().toISOString().slice(0, 10);
  const seasons = await Season.findAll();
  let count = 0;
  for (const { startYear, figuresDueOn } of seasons) {
    const dayCount = daysBetween(today, figuresDueOn);
    const stage = reminderDays.findLast((days) => dayCount <= days);
    if (stage === undefined || dayCount < 0) continue;
    count += await inTransaction(async (transaction) => {
      const done = await townsDoneWith(startYear, transaction);
      const to = await townPeopleBut(done, "season-reminder", transaction);
      for (const { userId, ...person } of to) {
        const letter = seasonReminderLetter({
          ...person,
          season: seasonLabel(startYear),
          dueOn: formatDay(figuresDueOn),
          dayCount,
          address: `${env.publicOrigin}/season/${startYear}`,
        });
        await queueMail(`season-reminder:${startYear}:${stage}:${userId}`, letter, transaction);
      }
      return to.length;
    });
  }
  return count;
}
