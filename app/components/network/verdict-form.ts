import { type FigureField, figureFields } from "#app/domain/season/figure-fields.ts";

export type Verdict =
  | { verdict: "accept"; reason: string | null }
  | { verdict: "return"; question: string; notes: { field: FigureField; note: string }[] }
  | { verdict: "ask"; question: string };

export type VerdictReading = { ok: true; verdict: Verdict } | { ok: false; errors: Record<string, string> };

const longestNote = 500;
const longestQuestion = 2000;

/**
 * What the coordinator decided, out of the form's texts.
 *
 * @param needsReason - whether the checks found something: accepting then takes a reason
 * @returns the verdict, or what is wrong by field
 */
export function readVerdict(values: Readonly<Record<string, string>>, needsReason: boolean): VerdictReading {
  const text = (name: string) => (values[name] ?? "").trim();
  if (values.verdict === "accept") {
    const reason = text("reason");
    if (needsReason && (reason.length < 4 || reason.length > longestQuestion)) {
      return { ok: false, errors: { reason: "Say why it stands although the checks found something." } };
    }
    return { ok: true, verdict: { verdict: "accept", reason: reason === "" ? null : reason } };
  }
  if (values.verdict === "ask") {
    const question = text("ask");
    if (question.length < 8 || question.length > longestQuestion) {
      return { ok: false, errors: { ask: "Write the question: a sentence, at most 2,000 letters." } };
    }
    return { ok: true, verdict: { verdict: "ask", question } };
  }
  const question = text("note");
  const notes = figureFields.map((field) => ({ field, note: text(`note-${field}`) })).filter(({ note }) => note !== "");
  const errors: Record<string, string> = {};
  for (const { field, note } of notes) {
    if (note.length > longestNote) errors[`note-${field}`] = `At most ${longestNote} letters.`;
  }
  if (question.length > longestQuestion) errors.note = "At most 2,000 letters.";
  if (notes.length === 0 && question.length < 8) {
    errors.note = "Write the question that goes back with it: a sentence, or a note on a field.";
  }
  if (Object.keys(errors).length > 0) return { ok: false, errors };
  return { ok: true, verdict: { verdict: "return", question, notes } };
}
