import type { FileProblem } from "#app/domain/file-problem.ts";
import { FileError, type SheetRow } from "#app/lib/file-error.ts";
import { bulkRows } from "#app/lib/bulk.server.ts";
import { type RowOutcome, uploadKinds } from "./kinds.server.ts";
import type { Matching } from "./matching.server.ts";
import { matchingOf } from "./matching.server.ts";
import { fileRows } from "./rows.server.ts";
import {
  answersOf,
  forgetRows,
  keepProblems,
  keepRows,
  type LookedAtRow,
  openProblems,
  stateOf,
} from "./staging.server.ts";
import type { Step } from "./steps.server.ts";
import { storedRows } from "./stored-file.server.ts";
import { runStationCheck } from "./weather-file.server.ts";

type Counts = { rowsRead: number; rowsOk: number; rowsCheck: number; rowsError: number; rowsLeftOut: number };

const countOf = { ok: "rowsOk", check: "rowsCheck", error: "rowsError", "left-out": "rowsLeftOut" } as const;

/** Writes rows while the next ones are read: one batch at a time is under way. */
export function rowWriter(step: Step) {
  const counts: Counts = { rowsRead: 0, rowsOk: 0, rowsCheck: 0, rowsError: 0, rowsLeftOut: 0 };
  let waiting: LookedAtRow[] = [];
  let underWay = Promise.resolve();
  const flush = async () => {
    await underWay;
    const rows = waiting;
    waiting = [];
    const progress = { ...counts };
    underWay = step.write(progress, (transaction) => keepRows(step.upload.id, rows, transaction));
    // Whoever waits for it next hears of a failure; until then it must not count as unheard.
    underWay.catch(() => {});
  };
  return {
    counts,
    add: async (row: LookedAtRow) => {
      counts.rowsRead++;
      counts[countOf[row.state]]++;
      waiting.push(row);
      if (waiting.length >= bulkRows) await flush();
    },
    finish: async () => {
      await flush();
      await underWay;
    },
  };
}

/** A row that says word for word what an earlier one said. The earlier one is found by a number made of its text. */
function twinFinder() {
  const rowByNumber = new Map<number, number>();
  return (text: string, row: number): FileProblem | null => {
    // Two rounds of FNV-1a: 52 bits, so that of 250,000 rows no two are taken for twins by accident.
    let [high, low] = [0x811c9dc5, 0x9dc5811c];
    for (let place = 0; place < text.length; place++) {
      const code = text.charCodeAt(place);
      high = Math.imul(high ^ code, 0x01000193);
      low = Math.imul(low ^ (code + 31), 0x01000197);
    }
    const number = (high >>> 0) * 0x100000 + ((low >>> 0) & 0xfffff);
    const earlier = rowByNumber.get(number);
    if (earlier === undefined) {
      rowByNumber.set(number, row);
      return null;
    }
    const message = `Row ${earlier} says the same. Leave one of them out, or say that both are right.`;
    return { row, column: null, value: null, code: "twice", severity: "check", message };
  };
}

function formulaChecks(formulaRows: ReadonlyMap<number, number>, matching: Matching): FileProblem[] {
  return matching.columns.flatMap(({ index, head, field }): FileProblem[] => {
    const count = formulaRows.get(index) ?? 0;
    if (field === null || count === 0) return [];
    const message = `“${head}” holds formulas in ${count.toLocaleString("en-US")} rows. What they last came to is taken.`;
    return [{ row: null, column: field, value: null, code: "formulas", severity: "check", message }];
  });
}

/** The rows under the heads. */
async function* dataRows(step: Step, matching: Matching, formulaRows: Map<number, number>): AsyncGenerator<SheetRow[]> {
  for await (const batch of storedRows(step.upload, matching.sheetName)) {
    const under = batch.filter(({ row }) => row > matching.headRow);
    for (const { formulaColumns } of under) {
      for (const column of formulaColumns ?? []) formulaRows.set(column, (formulaRows.get(column) ?? 0) + 1);
    }
    if (under.length > 0) yield under;
  }
}

/** What was found of a row, as it is kept. */
export function lookedAt(
  sheetRow: number,
  cells: readonly (string | number)[],
  { staged, problems }: RowOutcome,
  answers: ReadonlyMap<string, string> | undefined,
): LookedAtRow {
  const open = openProblems(problems, answers);
  const state = stateOf(open, answers?.has("left-out") ?? false);
  return {
    sheetRow,
    state,
    cells: state === "ok" && answers === undefined ? null : cells,
    stagedText: staged === null || staged === undefined ? null : JSON.stringify(staged),
    problems: open,
  };
}

/** Look at every row of the file. Starts from nothing, so that it may be run again after it was cut off. */
export async function runCheck(step: Step, given: Matching | null = matchingOf(step.upload)): Promise<void> {
  const { upload, actor, write } = step;
  const { reading } = uploadKinds[upload.kind];
  await forgetRows(upload.id, (work) => write({ rowsRead: 0 }, work));
  if (reading.by === "station") return runStationCheck(step);
  if (given === null) throw new Error("A file is checked before its columns are matched.");
  const toFileRow = fileRows(given);
  const answers = await answersOf(upload.id);
  const writer = rowWriter(step);
  const formulaRows = new Map<number, number>();
  if (reading.by === "row") {
    const read = await reading.reader(actor);
    const findTwin = twinFinder();
    for await (const batch of dataRows(step, given, formulaRows)) {
      for (const sheetRow of batch) {
        const own = answers.get(sheetRow.row);
        const outcome = read(toFileRow(sheetRow, own));
        const row = lookedAt(sheetRow.row, sheetRow.cells, outcome, own);
        const twin =
          row.stagedText !== null && row.state !== "left-out" ? findTwin(row.stagedText, sheetRow.row) : null;
        await writer.add(
          twin
            ? lookedAt(sheetRow.row, sheetRow.cells, { ...outcome, problems: [...outcome.problems, twin] }, own)
            : row,
        );
      }
    }
  } else {
    const sheetRows: SheetRow[] = [];
    for await (const batch of dataRows(step, given, formulaRows)) {
      sheetRows.push(...batch);
      if (sheetRows.length > reading.mostRows) {
        const most = reading.mostRows.toLocaleString("en-US");
        throw new FileError("too-long", `A file of this kind has at most ${most} rows. Split it.`);
      }
    }
    const kept = sheetRows.filter(({ row }) => !answers.get(row)?.has("left-out"));
    const outcomes = await reading.check(
      actor,
      kept.map((sheetRow) => toFileRow(sheetRow, answers.get(sheetRow.row))),
    );
    for (const sheetRow of sheetRows) {
      const outcome = outcomes.get(sheetRow.row) ?? { staged: null, problems: [] };
      await writer.add(lookedAt(sheetRow.row, sheetRow.cells, outcome, answers.get(sheetRow.row)));
    }
  }
  await writer.finish();
  if (writer.counts.rowsRead === 0) {
    throw new FileError("only-heads", "This file has its heads but no rows under them.");
  }
  const wholeFile = openProblems(fileChecks(given, upload.kind, formulaRows), answers.get(0));
  await write({ state: "checked", rowsTotal: writer.counts.rowsRead }, (transaction) =>
    keepProblems(upload.id, [{ sheetRow: 0, problems: wholeFile }], transaction),
  );
}

/** Checks that concern no single row: formulas, and columns that are not used. */
function fileChecks(matching: Matching, kind: keyof typeof uploadKinds, formulaRows: ReadonlyMap<number, number>) {
  const unused = matching.columns.filter(({ field, head }) => field === null && head !== "").map(({ head }) => head);
  const checks = formulaChecks(formulaRows, matching);
  if (unused.length === 0 || uploadKinds[kind].reading.by === "row") return checks;
  const message = `These columns are not used: ${unused.slice(0, 20).join(", ")}.`;
  const problem: FileProblem = {
    row: null,
    column: null,
    value: null,
    code: "extra-columns",
    severity: "check",
    message,
  };
  return [...checks, problem];
}
