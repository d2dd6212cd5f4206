import type { Transaction } from "sequelize";
import type { NetworkActor } from "#app/context.ts";
import { seasonLabel } from "#app/domain/dates.ts";
import { type FigureField, figureFieldWords } from "#app/domain/season/figure-fields.ts";
import { seasonAcceptedLetter, seasonQuestionLetter, seasonReturnedLetter } from "#app/emails/season.ts";
import { now } from "#app/lib/clock.server.ts";
import { inTransaction } from "#app/lib/db.server.ts";
import { env } from "#app/lib/env.server.ts";
import { notFound } from "#app/lib/errors.ts";
import { figureTown } from "#app/models/associations.server.ts";
import { FigureNote } from "#app/models/figure-note.server.ts";
import { FigureQuestion } from "#app/models/figure-question.server.ts";
import { SeasonFigure } from "#app/models/season-figure.server.ts";
import { recordAudit } from "../audit.server.ts";
import { directorsOf, peopleOf } from "../mail-recipients.server.ts";
import { queueMail } from "../outbox.server.ts";
import { getReviewQueue } from "../review.server.ts";
import { amountsOf } from "../season-figures.server.ts";

export type FieldNote = { field: FigureField; note: string };
const changedMeanwhile = { ok: false, reason: "changed-meanwhile" } as const;

/** The figure, held until the transaction ends. @returns null when it is not sent, or not the version looked at */
async function sentFigure(figureId: number, version: number, transaction: Transaction) {
  const figure = await SeasonFigure.findByPk(figureId, {
    include: [figureTown],
    lock: { level: transaction.LOCK.UPDATE, of: SeasonFigure },
    transaction,
  });
  if (!figure || figure.state === "draft") throw notFound("sent season");
  return figure.state === "sent" && figure.version === version ? figure : null;
}

function occasionOf(figure: SeasonFigure) {
  return {
    townName: figure.town?.name ?? "",
    season: seasonLabel(figure.seasonStartYear),
    address: `${env.publicOrigin}/season/${figure.seasonStartYear}`,
  };
}

/**
 * Accept a sent season as it is; it goes into the next edition.
 *
 * @param version - the version the coordinator looked at
 * @param reason - why it stands although the checks found something; null when they found nothing
 * @returns `{ ok: false }` when it was settled or changed meanwhile
 * @throws 404 when nothing was sent under that id
 */
export async function acceptFigure(actor: NetworkActor, figureId: number, version: number, reason: string | null) {
  return inTransaction(async (transaction) => {
    const figure = await sentFigure(figureId, version, transaction);
    if (!figure) return changedMeanwhile;
    const settled = { reviewedAt: now(), reviewedById: actor.userId, version: version + 1 };
    await figure.update({ state: "accepted", reviewNote: reason, ...settled }, { transaction });
    await recordAudit(
      actor,
      {
        action: "season-figure.accept",
        entity: "season_figure",
        entityId: figure.id,
        townId: figure.townId,
        detail: { reason, ...amountsOf(figure) },
      },
      transaction,
    );
    for (const { userId, ...to } of await directorsOf(figure.townId, "season-accepted", transaction)) {
      const letter = seasonAcceptedLetter({ ...to, ...occasionOf(figure) });
      await queueMail(`season-accepted:${figure.id}:${figure.version}:${userId}`, letter, transaction);
    }
    return { ok: true } as const;
  });
}

/**
 * Send a season back with a question and notes on its fields, which go to the town by mail too.
 *
 * @param given - a note on at least one field, or a question about the whole
 * @returns and throws as acceptFigure
 */
export async function returnFigure(
  actor: NetworkActor,
  figureId: number,
  version: number,
  given: { question: string; notes: readonly FieldNote[] },
) {
  return inTransaction(async (transaction) => {
    const figure = await sentFigure(figureId, version, transaction);
    if (!figure) return changedMeanwhile;
    const { question, notes } = given;
    const settled = { reviewedAt: now(), reviewedById: actor.userId, version: version + 1 };
    await figure.update({ state: "returned", reviewNote: question || null, ...settled }, { transaction });
    await FigureNote.bulkCreate(
      notes.map((note) => ({ figureId, version, ...note })),
      { transaction },
    );
    await recordAudit(
      actor,
      {
        action: "season-figure.return",
        entity: "season_figure",
        entityId: figure.id,
        townId: figure.townId,
        detail: { question, notes: [...notes], ...amountsOf(figure) },
      },
      transaction,
    );
    const words = [question, ...notes.map(({ field, note }) => `${figureFieldWords[field]}: ${note}`)];
    for (const { userId, ...to } of await peopleOf(figure.townId, "season-returned", transaction)) {
      const letter = seasonReturnedLetter({ ...to, ...occasionOf(figure), notes: words.filter((word) => word !== "") });
      await queueMail(`season-returned:${figure.id}:${figure.version}:${userId}`, letter, transaction);
    }
    return { ok: true } as const;
  });
}

/** Ask the town something and leave the season sent. Returns and throws as acceptFigure. */
export async function askAboutFigure(actor: NetworkActor, figureId: number, version: number, question: string) {
  return inTransaction(async (transaction) => {
    const figure = await sentFigure(figureId, version, transaction);
    if (!figure) return changedMeanwhile;
    const asked = await FigureQuestion.create(
      { figureId, version, question, askedAt: now(), askedById: actor.userId },
      { transaction },
    );
    await recordAudit(
      actor,
      {
        action: "season-figure.ask",
        entity: "season_figure",
        entityId: figure.id,
        townId: figure.townId,
        detail: { question },
      },
      transaction,
    );
    for (const { userId, ...to } of await directorsOf(figure.townId, "season-question", transaction)) {
      const letter = seasonQuestionLetter({ ...to, ...occasionOf(figure), question });
      await queueMail(`season-question:${asked.id}:${userId}`, letter, transaction);
    }
    return { ok: true } as const;
  });
}

/**
 * Accept every sent season that passed all checks.
 *
 * @returns how many
 */
export async function acceptCleanFigures(actor: NetworkActor, seasonStartYear: number): Promise<number> {
  const { clean } = await getReviewQueue(actor, seasonStartYear);
  let accepted = 0;
  for (const { figure } of clean) {
    const outcome = await acceptFigure(actor, figure.id, figure.version, null);
    if (outcome.ok) accepted++;
  }
  return accepted;
}
