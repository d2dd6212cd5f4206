import { fieldFigure } from "./field-words.ts";
import { Notice } from "#app/components/ui/notice.tsx";
import { type FigureField, figureFieldWords } from "#app/domain/season/figure-fields.ts";

type Note = { version: number; field: FigureField; note: string };
type Content = Record<Exclude<FigureField, "stock">, number | null>;

type Props = {
  question: string | null;
  /** Of the version that was sent back. */
  notes: readonly Note[];
  sent: Content | null;
  now: Content | null;
};

/** What the coordinator says of the season sent back, field by field, with what stands there now. */
export function ReturnNotes({ question, notes, sent, now }: Props) {
  return (
    <Notice title="The coordinator sent it back.">
      {question !== null && <p>{question}</p>}
      {notes.length > 0 && (
        <dl className="mt-2 grid gap-y-2">
          {notes.map(({ field, note }) => {
            const before = field === "stock" ? null : (sent?.[field] ?? null);
            const current = field === "stock" ? null : (now?.[field] ?? null);
            const isChanged = field !== "stock" && sent !== null && now !== null && before !== current;
            return (
              <div key={field} className="border-t border-rule pt-2">
                <dt className="font-semibold">{figureFieldWords[field]}</dt>
                <dd>
                  {note}
                  {field !== "stock" && sent !== null && (
                    <span className="block text-note text-gravel">
                      You sent {fieldFigure(field, before)}
                      {isChanged ? `; it is ${fieldFigure(field, current)} now.` : "; it has not been changed."}
                    </span>
                  )}
                </dd>
              </div>
            );
          })}
        </dl>
      )}
    </Notice>
  );
}
