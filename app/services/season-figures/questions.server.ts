import { QueryTypes } from "sequelize";
import type { TownActor } from "#app/context.ts";
import { seasonLabel } from "#app/domain/dates.ts";
import { seasonAnswerLetter } from "#app/emails/season.ts";
import { now } from "#app/lib/clock.server.ts";
import { db, inTransaction } from "#app/lib/db.server.ts";
import { env } from "#app/lib/env.server.ts";
import { notFound } from "#app/lib/errors.ts";
import { FigureQuestion } from "#app/models/figure-question.server.ts";
import { recordAudit } from "../audit.server.ts";
import { coordinators } from "../mail-recipients.server.ts";
import { queueMail } from "../outbox.server.ts";

/**
 * Answer what the coordinator asked about the town's season. The figures stay as they are.
 *
 * @returns false when somebody of the town answered it first
 * @throws 404 when the question is not about a figure of the town
 */
export async function answerQuestion(actor: TownActor, questionId: number, answer: string): Promise<boolean> {
  return inTransaction(async (transaction) => {
    const [asked] = await db.query<{ figureId: number; seasonStartYear: number; answer: string | null }>(
      `SELECT q.figure_id AS figureId, f.season_start_year AS seasonStartYear, q.answer
         FROM figure_question q JOIN season_figure f ON f.id = q.figure_id
        WHERE q.id = ? AND f.town_id = ? FOR UPDATE`,
      { type: QueryTypes.SELECT, replacements: [questionId, actor.townId], transaction },
    );
    if (!asked) throw notFound("question");
    if (asked.answer !== null) return false;
    await FigureQuestion.update(
      { answer, answeredAt: now(), answeredById: actor.userId },
      { where: { id: questionId }, transaction },
    );
    await recordAudit(
      actor,
      { action: "season-figure.answer", entity: "season_figure", entityId: asked.figureId, detail: { answer } },
      transaction,
    );
    for (const { userId, ...to } of await coordinators("season-question", transaction)) {
      const letter = seasonAnswerLetter({
        ...to,
        townName: actor.townName,
        season: seasonLabel(asked.seasonStartYear),
        address: `${env.publicOrigin}/network/review/${asked.figureId}`,
        answer,
      });
      await queueMail(`season-answer:${questionId}:${userId}`, letter, transaction);
    }
    return true;
  });
}
