import { countWords, listWords, sentenceStart } from "#app/lib/words.ts";

/** What of an upload its sentences need. */
export type UploadSummary = {
  counts: { total: number | null; read: number; ok: number; check: number; error: number; leftOut: number };
  groups: readonly {
    code: string;
    severity: "error" | "check";
    rowCount: number;
    names: { sort: string; values: { value: string; rowCount: number }[] } | null;
    rows: { value: string | null }[];
  }[];
};

const nounOfSort: Record<string, string> = { truck: "truck", material: "material", "storm-kind": "kind of storm" };

/** The question that one answer settles for a whole group; null where each row has to be looked at. */
function question(group: UploadSummary["groups"][number]): string | null {
  const [first] = group.names?.values ?? [];
  if (group.names && first) {
    const noun = nounOfSort[group.names.sort] ?? "thing";
    const others = group.names.values.length - 1;
    return others === 0
      ? `which ${noun} is “${first.value}”`
      : `which ${noun}s are “${first.value}” and ${countWords(others, "other", "others")}`;
  }
  const [row] = group.rows;
  if (group.code === "tons-or-pounds" && row?.value) return `was ${row.value} in pounds`;
  return null;
}

/** The sentence a checked file's page opens with: how much is ready, and which answers settle most of the rest. */
export function checkedAnswer({ counts, groups }: UploadSummary): string {
  const { ok, check, error, leftOut } = counts;
  const rows = ok + check + error;
  const open = check + error;
  if (rows === 0) return "Every row of this file is left out.";
  const about = leftOut === 0 ? "" : ` ${sentenceStart(countWords(leftOut, "row is", "rows are"))} left out.`;
  if (open === 0) {
    return rows === 1
      ? `The row of this file is ready.${about}`
      : `All ${rows.toLocaleString("en-US")} rows are ready.${about}`;
  }
  const ready =
    ok === 0
      ? `${rows === 1 ? "The row" : "No row"} of this file is ${rows === 1 ? "not " : ""}ready yet.`
      : `${ok.toLocaleString("en-US")} of ${rows.toLocaleString("en-US")} rows are ready.`;
  const asked = groups.flatMap((group) => {
    const words = question(group);
    return words === null ? [] : [{ words, rowCount: group.rowCount }];
  });
  const most = asked.slice(0, 2);
  if (most.length === 0) {
    return error === 0
      ? `${ready} ${sentenceStart(countWords(open, "row waits", "rows wait"))} for a look.`
      : `${ready} ${sentenceStart(countWords(error, "row has", "rows have"))} to be put right.`;
  }
  const settled = Math.min(
    open,
    most.reduce((sum, { rowCount }) => sum + rowCount, 0),
  );
  const which =
    settled === open
      ? open === 1
        ? "The other one falls"
        : `The other ${open.toLocaleString("en-US")} fall`
      : `${sentenceStart(countWords(settled, "", "").trim())} of the other ${open.toLocaleString("en-US")} fall`;
  return `${ready} ${which} to ${countWords(most.length, "answer", "answers")}: ${listWords(most.map(({ words }) => words))}?`;
}

/** How far a step has got. The number of rows is an estimate until the file has been read to its end. */
export function progressAnswer(state: string, { read, total }: UploadSummary["counts"], ready: number): string {
  if (state === "accepting") return `Taking in ${countWords(ready, "row", "rows")}: all of them or none.`;
  if (state === "received" || read === 0) return "The file has arrived and is being read.";
  const of = total === null || total < read ? "" : ` of about ${total.toLocaleString("en-US")}`;
  return `Checking row ${read.toLocaleString("en-US")}${of}.`;
}

/** Bytes as a person says them. */
export function sizeWords(byteCount: number): string {
  if (byteCount < 1000) return `${byteCount} bytes`;
  if (byteCount < 1_000_000) return `${Math.round(byteCount / 1000)} kB`;
  return `${(byteCount / 1_000_000).toFixed(1)} MB`;
}
