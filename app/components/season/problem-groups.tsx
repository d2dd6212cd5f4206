import { Timetable } from "#app/components/ui/timetable.tsx";
import type { FileProblem } from "#app/domain/file-problem.ts";
import { countWords, sentenceStart } from "#app/lib/words.ts";

const mostShown = 50;

type Severity = FileProblem["severity"];
/** Problems that are shown together: all of one kind in one column, or those that stand alone. */
export type ProblemGroup = { key: string; severity: Severity; column: string | null; problems: FileProblem[] };

/**
 * Problems of one kind together, so that one look settles many rows. Kinds that occur once are put into one list:
 * a heading for each of them would hide how little there is to do.
 */
export function groupProblems(problems: readonly FileProblem[]): ProblemGroup[] {
  const kinds = new Map<string, FileProblem[]>();
  for (const problem of problems) {
    const key = `${problem.severity} ${problem.code} ${problem.column ?? ""}`;
    kinds.set(key, [...(kinds.get(key) ?? []), problem]);
  }
  return (["error", "check"] as const).flatMap((severity) => {
    const own = [...kinds].filter(([, [first]]) => first?.severity === severity);
    const many = own
      .filter(([, { length }]) => length > 1)
      .sort(([, one], [, other]) => other.length - one.length)
      .map(([key, found]) => ({
        key: key.trim().replaceAll(" ", "-"),
        severity,
        column: found[0]?.column ?? null,
        problems: found,
      }));
    const single = own.flatMap(([, found]) => (found.length === 1 ? found : [])).sort(byRow);
    return single.length === 0
      ? many
      : [...many, { key: `${severity}-single`, severity, column: null, problems: single }];
  });
}

function byRow(one: FileProblem, other: FileProblem) {
  return (one.row ?? 0) - (other.row ?? 0);
}

const verbs: Record<Severity, string> = { error: "to correct", check: "to look at" };

/** "Two rows to correct in truck"; the list of single ones names no column. */
function groupTitle({ severity, column, problems }: ProblemGroup) {
  const rows = new Set(problems.map(({ row }) => row)).size;
  if (problems.every(({ row }) => row === null)) return `The file ${severity === "error" ? "as a whole" : "in all"}`;
  if (column !== null) return `${sentenceStart(countWords(rows, "row", "rows"))} ${verbs[severity]} in ${column}`;
  return `${sentenceStart(countWords(problems.length, "thing", "things"))} ${verbs[severity]}, row by row`;
}

/** How the summary beside the list names a group. */
export function groupKind(group: ProblemGroup) {
  const { key, severity, column, problems } = group;
  const rows = [...new Set(problems.flatMap(({ row }) => row ?? []))];
  const rowWords = rows.length === 0 ? "" : `${rows.length === 1 ? "row" : "rows"} ${firstRows(rows)}`;
  return {
    key,
    count: problems.length,
    to: `#${key}`,
    label: column === null ? verbs[severity] : `${verbs[severity]} in ${column}`,
    detail: rowWords,
  };
}

function firstRows(rows: readonly number[]) {
  return rows.length > 6 ? `${rows.slice(0, 6).join(", ")} and ${rows.length - 6} more` : rows.join(", ");
}

/** What is wrong in one group: row, column where it differs, what the file says, and what to do. */
export function ProblemList({ group }: { group: ProblemGroup }) {
  const { key, column, problems } = group;
  const shown = problems.slice(0, mostShown);
  const title = groupTitle(group);
  return (
    <section id={key} className="border-t-2 border-line pt-2.5 pb-7">
      <h2 className="text-l leading-snug font-semibold">{title}</h2>
      <Timetable
        caption={`${title}: what stands there and what to do`}
        isCaptionHidden
        columns={[
          { key: "row", label: "row", foldPrefix: "Row", widthClass: "sm:w-14" },
          ...(column === null ? [{ key: "column", label: "column", widthClass: "sm:w-42" }] : []),
          { key: "says", label: "your file says", widthClass: "sm:w-36" },
          { key: "do", label: "what to do", isProse: true },
        ]}
        rows={shown.map((problem, position) => ({
          key: `${problem.row ?? 0} ${position}`,
          cells: {
            row: problem.row ?? "all",
            column: problem.column ?? "several",
            says: problem.value ?? (problem.column === null ? "–" : "nothing"),
            do: problem.message,
          },
        }))}
      />
      {problems.length > shown.length && (
        <p className="mt-2 text-note text-gravel">
          {problems.length - shown.length} more are in the list you can download.
        </p>
      )}
    </section>
  );
}
