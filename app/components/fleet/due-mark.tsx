import { TextLink } from "#app/components/ui/text-link.tsx";
import type { DueReasonCode, DueStateOfLine } from "./due-words.ts";
import { dueReasonWords, dueWords } from "./due-words.ts";

const glyphs: Record<DueStateOfLine, string> = {
  "in-date": "M1.2 5.4 4 8.4 9 2l1 1L4 10.4.2 6.4z",
  due: "M5 0a5 5 0 1 1 0 10A5 5 0 0 1 5 0zm0 1.6v6.8a3.4 3.4 0 0 0 0-6.8z",
  overdue: "M5 0a5 5 0 1 1 0 10A5 5 0 0 1 5 0z",
  never: "M5 0a5 5 0 1 1 0 10A5 5 0 0 1 5 0zm0 1.6a3.4 3.4 0 1 0 0 6.8 3.4 3.4 0 0 0 0-6.8z",
};

const looks: Record<DueStateOfLine, string> = {
  "in-date": "",
  due: "font-bold",
  overdue: "font-bold text-rust",
  never: "text-gravel",
};

type Props = { state: DueStateOfLine; reason?: DueReasonCode | null; to?: string };

/** Whether a truck is to be weighed with a material: a shape, a word, and the reason where there is one. */
export function DueMark({ state, reason = null, to }: Props) {
  return (
    <span className={`whitespace-nowrap ${looks[state]}`}>
      <svg viewBox="0 0 10 11" aria-hidden="true" className="mr-1.5 inline-block size-[0.76em] fill-current">
        <path d={glyphs[state]} />
      </svg>
      {to === undefined ? dueWords[state] : <TextLink to={to}>{dueWords[state]}</TextLink>}
      {reason !== null && dueReasonWords[reason] !== "" && (
        <span className="block text-note font-normal whitespace-normal text-gravel">{dueReasonWords[reason]}</span>
      )}
    </span>
  );
}
