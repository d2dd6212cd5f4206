import { z } from "zod";
import { type FigureField, figureFields, isFigureField } from "#app/domain/season/figure-fields.ts";
import { FigureNote } from "#app/models/figure-note.server.ts";
import { FigureQuestion } from "#app/models/figure-question.server.ts";
import { FigureVersion } from "#app/models/figure-version.server.ts";

const Amount = z.number().nullable().optional();
const Content = z.object({
  laneMiles: Amount,
  eventCount: Amount,
  saltLb: Amount,
  mixLb: Amount,
  mixSaltShare: Amount,
  sandLb: Amount,
  brineGal: Amount,
  wettedSaltLb: Amount,
  materialCostCents: Amount,
});

export type SentVersion = {
  version: number;
  sentAt: string;
  /** In storage units; null = not reported. Stock is no figure and not in it. */
  content: Record<Exclude<FigureField, "stock">, number | null>;
};

export type NoteView = { version: number; field: FigureField; note: string };
export type QuestionView = {
  id: number;
  version: number;
  question: string;
  askedAt: string;
  answer: string | null;
  answeredAt: string | null;
};

export type FigureHistory = {
  /** Every version that was sent, oldest first. */
  versions: SentVersion[];
  /** Notes of every time it was sent back, oldest first, in the fields' order. */
  notes: NoteView[];
  /** Oldest first. */
  questions: QuestionView[];
};

function sentVersion({ version, sentAt, content }: FigureVersion): SentVersion {
  const known = Content.parse(content);
  return {
    version,
    sentAt: sentAt.toISOString(),
    content: {
      laneMiles: known.laneMiles ?? null,
      eventCount: known.eventCount ?? null,
      saltLb: known.saltLb ?? null,
      mixLb: known.mixLb ?? null,
      mixSaltShare: known.mixSaltShare ?? null,
      sandLb: known.sandLb ?? null,
      brineGal: known.brineGal ?? null,
      wettedSaltLb: known.wettedSaltLb ?? null,
      materialCostCents: known.materialCostCents ?? null,
    },
  };
}

/**
 * What has passed between a town and the coordinator about one season: versions sent, notes by field, questions.
 *
 * @param figureId - of a figure whose reader was checked before
 */
export async function figureHistory(figureId: number): Promise<FigureHistory> {
  const where = { figureId };
  const [versions, notes, questions] = await Promise.all([
    FigureVersion.findAll({ where, order: [["version", "ASC"]] }),
    FigureNote.findAll({ where, order: [["version", "ASC"]] }),
    FigureQuestion.findAll({ where, order: [["id", "ASC"]] }),
  ]);
  return {
    versions: versions.map(sentVersion),
    notes: notes
      .flatMap(({ version, field, note }) => (isFigureField(field) ? [{ version, field, note }] : []))
      .toSorted((a, b) => a.version - b.version || figureFields.indexOf(a.field) - figureFields.indexOf(b.field)),
    questions: questions.map(({ id, version, question, askedAt, answer, answeredAt }) => ({
      id,
      version,
      question,
      askedAt: askedAt.toISOString(),
      answer,
      answeredAt: answeredAt?.toISOString() ?? null,
    })),
  };
}
