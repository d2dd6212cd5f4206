import { Timetable } from "#app/components/ui/timetable.tsx";
import type { FileProblem } from "#app/domain/file-problem.ts";
import { countWords, sentenceStart } from "#app/lib/words.ts";

const mostShown = 50;

/** Problems of one kind together, so that one look settles many rows. */
export function groupProblems(problems: readonly FileProblem[]) {
  const groups = new Map<string, FileProblem[]>();
  for (const problem of problems) {
    const key = `${problem.severity} ${problem.code} ${problem.column ?? ""}`;
    groups.set(key, [...(groups.get(key) ?? []), problem]);
  }
  return [...groups]
    .map(([key, own]) => ({ key: key.replaceAll(" ", "-"), severity: own[0]?.severity ?? "error", problems: own }))
    .sort(
      (a, b) =>
        Number(b.severity === "error") - Number(a.severity === "error") || b.problems.length - a.problems.length,
    );
}

export function groupTitle(problems: readonly FileProblem[]) {
  const [first] = problems;
  if (!first) return "";
  const rows = first.row === null ? "The file" : sentenceStart(countWords(problems.length, "row", "rows"));
  return first.column === null ? rows : `${rows}, column ${first.column}`;
}

/** What is wrong in one kind of problem: row, what the file says, and what to do. */
export function ProblemGroup({ id, problems }: { id: string; problems: readonly FileProblem[] }) {
  const shown = problems.slice(0, mostShown);
  return (
    <section id={id} className="border-t-2 border-line pt-2.5 pb-6">
      <h2 className="text-l leading-snug font-semibold">{groupTitle(problems)}</h2>
      <Timetable
        caption={`${groupTitle(problems)}: what stands there and what to do`}
        isCaptionHidden
        columns={[
          { key: "row", label: "row" },
          { key: "says", label: "your file says" },
          { key: "do", label: "what to do" },
        ]}
        rows={shown.map((problem, position) => ({
          key: `${problem.row ?? 0} ${position}`,
          cells: {
            row: problem.row ?? "–",
            says: problem.value ?? "nothing",
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
