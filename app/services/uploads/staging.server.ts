import { QueryTypes, type Transaction } from "sequelize";
import type { FileProblem } from "#app/domain/file-problem.ts";
import { insertRows } from "#app/lib/bulk.server.ts";
import { db } from "#app/lib/db.server.ts";

export type RowState = "ok" | "check" | "error" | "left-out";

/** A row that has been looked at. `cells` are kept of rows that somebody may have to look at, too. */
export type LookedAtRow = {
  sheetRow: number;
  state: RowState;
  cells: readonly (string | number)[] | null;
  stagedText: string | null;
  problems: FileProblem[];
};

/** Deleted at a time, so that no statement takes longer than a statement may. */
const deletedRows = 20_000;

/** The state that follows from what was found. */
export function stateOf(problems: readonly FileProblem[], isLeftOut: boolean): RowState {
  if (isLeftOut) return "left-out";
  if (problems.some(({ severity }) => severity === "error")) return "error";
  return problems.length > 0 ? "check" : "ok";
}

function problemCells(uploadId: number, sheetRow: number, problems: readonly FileProblem[]) {
  return problems.map(({ column, value, code, severity, message }, position) => [
    uploadId,
    sheetRow,
    position,
    column ?? "",
    value,
    code,
    severity,
    message.slice(0, 400),
  ]);
}

/** Keep problems of a row, or with 0 of the file as a whole. */
export async function keepProblems(
  uploadId: number,
  rows: readonly { sheetRow: number; problems: readonly FileProblem[] }[],
  transaction: Transaction,
): Promise<void> {
  const cells = rows.flatMap(({ sheetRow, problems }) => problemCells(uploadId, sheetRow, problems));
  await insertRows("INSERT INTO upload_problem VALUES (?, ?, ?, ?, ?, ?, ?, ?)", cells, transaction);
}

/** Keep rows that have been looked at; each row of a file once. */
export async function keepRows(
  uploadId: number,
  rows: readonly LookedAtRow[],
  transaction: Transaction,
): Promise<void> {
  await insertRows(
    "INSERT INTO upload_row VALUES (?, ?, ?, ?, ?)",
    rows.map(({ sheetRow, state, cells, stagedText }) => [
      uploadId,
      sheetRow,
      state,
      cells === null ? null : JSON.stringify(cells),
      stagedText,
    ]),
    transaction,
  );
  await keepProblems(uploadId, rows, transaction);
}

/**
 * Forget what an earlier look at the file came to.
 *
 * @param turn - runs one piece of the work in a transaction of its own
 */
export async function forgetRows(
  uploadId: number,
  turn: (work: (transaction: Transaction) => Promise<void>) => Promise<void>,
): Promise<void> {
  for (const table of ["upload_problem", "upload_row"]) {
    let isMore = true;
    while (isMore) {
      await turn(async (transaction) => {
        const deleted = await db.query(`DELETE FROM ${table} WHERE upload_id = ? LIMIT ${deletedRows}`, {
          type: QueryTypes.BULKDELETE,
          replacements: [uploadId],
          transaction,
        });
        isMore = deleted === deletedRows;
      });
    }
  }
}

export type AnswersByRow = Map<number, Map<string, string>>;

/** Everything somebody has said about single rows of the file. */
export async function answersOf(uploadId: number, transaction?: Transaction): Promise<AnswersByRow> {
  const answers = await db.query<{ sheetRow: number; subject: string; answer: string }>(
    "SELECT sheet_row AS sheetRow, subject, answer FROM upload_answer WHERE upload_id = ?",
    { type: QueryTypes.SELECT, replacements: [uploadId], ...(transaction ? { transaction } : {}) },
  );
  const byRow: AnswersByRow = new Map();
  for (const { sheetRow, subject, answer } of answers) {
    const own = byRow.get(sheetRow) ?? new Map<string, string>();
    own.set(subject, answer);
    byRow.set(sheetRow, own);
  }
  return byRow;
}

/** Problems without the checks that somebody has said may stand. */
export function openProblems(
  problems: readonly FileProblem[],
  answers: ReadonlyMap<string, string> | undefined,
): FileProblem[] {
  if (!answers) return [...problems];
  return problems.filter(({ severity, code }) => severity === "error" || !answers.has(`stands:${code}`));
}
