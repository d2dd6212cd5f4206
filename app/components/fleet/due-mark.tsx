import { TextLink } from "#app/components/ui/text-link.tsx";
import type { DueReason } from "#app/domain/calibration/due.ts";
import { dueReasonWords, type DueStateOfLine, dueWords } from "./due-words.ts";

const glyphs: Record<DueStateOfLine, string> = {
  "in-date": "M1.2 5.4 4 8.4 9 2l1 1L4 10.4.2 6.4z",
  due: "M5 .5a5 5 0 1 1 0 10 5 5 0 0 1 0-10zm0 1.7v6.6a3.3 3.3 0 0 0 0-6.6z",
  overdue: "M5 .5a5 5 0 1 1 0 10 5 5 0 0 1 0-10z",
  never: "M.5 4.7h9v1.6h-9z",
};

const looks: Record<DueStateOfLine, string> = {
  "in-date": "",
  due: "font-bold",
  overdue: "font-bold text-rust",
  never: "text-gravel",
};

type Props = {
  due: DueReason;
  /** Where the state is explained or mended. */
  to?: string;
  isReasonShown?: boolean;
};

/** Whether a truck is to be weighed with a material: a shape, a word, and the reason where there is one. */
export function DueMark({ due, to, isReasonShown = true }: Props) {
  const reason = isReasonShown ? dueReasonWords(due) : "";
  return (
    <span>
      <span className={`whitespace-nowrap ${looks[due.state]}`}>
        <svg viewBox="0 0 10 11" aria-hidden="true" className="mr-1.5 inline-block h-[0.8em] w-[0.73em] fill-current">
          <path d={glyphs[due.state]} />
        </svg>
        {to === undefined ? dueWords[due.state] : <TextLink to={to}>{dueWords[due.state]}</TextLink>}
      </span>
      {reason !== "" && <span className="block text-note leading-snug text-gravel">{reason}</span>}
    </span>
  );
}

/** What the shapes stand for. */
export function DueKey() {
  const states: DueStateOfLine[] = ["in-date", "due", "overdue", "never"];
  const plain = { reason: null, dueSince: null };
  return (
    <p className="mt-2 flex flex-wrap gap-x-5 text-note text-gravel">
      {states.map((state) => (
        <DueMark key={state} due={{ state, ...plain }} />
      ))}
    </p>
  );
}
