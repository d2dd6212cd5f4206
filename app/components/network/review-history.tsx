import { Heading } from "#app/components/layout/answer.tsx";
import { fieldFigure } from "#app/components/season/field-words.ts";
import { type FigureField, figureFields, figureFieldWords } from "#app/domain/season/figure-fields.ts";
import { formatInstant } from "#app/lib/format.ts";

type Content = Record<Exclude<FigureField, "stock">, number | null>;
type History = {
  versions: readonly { version: number; sentAt: string; content: Content }[];
  notes: readonly { version: number; field: FigureField; note: string }[];
  questions: readonly {
    id: number;
    question: string;
    askedAt: string;
    answer: string | null;
    answeredAt: string | null;
  }[];
};

/** Fields that differ between two versions sent, in words. */
function changesBetween(before: Content, after: Content) {
  return figureFields.flatMap((field) => {
    if (field === "stock" || before[field] === after[field]) return [];
    const words = `${figureFieldWords[field]} from ${fieldFigure(field, before[field])} to ${fieldFigure(field, after[field])}`;
    return [words];
  });
}

/** What has passed between the town and the coordinator: versions with what changed, notes, questions and answers. */
export function ReviewHistory({ history: { versions, notes, questions } }: { history: History }) {
  if (versions.length < 2 && notes.length === 0 && questions.length === 0) return null;
  return (
    <section>
      <Heading>What has passed so far</Heading>
      <ol>
        {versions.map(({ version, sentAt, content }, place) => {
          const before = versions[place - 1];
          const changes = before ? changesBetween(before.content, content) : [];
          const own = notes.filter((note) => note.version === version);
          return (
            <li key={version} className="border-b border-rule py-2.5">
              <p>
                <b>Sent {formatInstant(sentAt)}</b>
                {before !== undefined &&
                  (changes.length === 0 ? ", with the same figures." : `, with ${changes.join("; ")}.`)}
              </p>
              {own.map(({ field, note }) => (
                <p key={field} className="ml-4">
                  You noted on {figureFieldWords[field].toLowerCase()}: {note}
                </p>
              ))}
            </li>
          );
        })}
        {questions.map(({ id, question, askedAt, answer, answeredAt }) => (
          <li key={`question-${id}`} className="border-b border-rule py-2.5">
            <p>
              <b>Asked {formatInstant(askedAt)}:</b> {question}
            </p>
            <p className="ml-4">
              {answer === null
                ? "Not answered yet."
                : `${answeredAt === null ? "" : `${formatInstant(answeredAt)}: `}${answer}`}
            </p>
          </li>
        ))}
      </ol>
    </section>
  );
}
