/** Why a file as a whole cannot be read. `message` is a sentence for whoever chose the file. */
export class FileError extends Error {
  readonly code: string;

  constructor(code: string, message: string) {
    super(message);
    this.name = "FileError";
    this.code = code;
  }
}

/** One row of a sheet, as its file has it: text, or a figure where the file itself says that it is one. */
export type SheetRow = {
  /** As a spreadsheet counts, from 1. */
  row: number;
  cells: readonly (string | number)[];
  /** Columns whose cell is a formula: its last result is taken. */
  formulaColumns?: readonly number[];
};

/** What is read of one file at the most. */
export const sheetLimits = { rows: 250_000, columns: 200, cellCharacters: 32_000, recordCharacters: 64_000 };

/** @throws FileError when the row has more columns than are read */
export function assertWidth(row: number, columnCount: number): void {
  if (columnCount <= sheetLimits.columns) return;
  throw new FileError("too-wide", `Row ${row} has ${columnCount} columns; ${sheetLimits.columns} are the most.`);
}

/** @throws FileError when there are more rows than are read */
export function assertLength(rowCount: number): void {
  if (rowCount <= sheetLimits.rows) return;
  const most = sheetLimits.rows.toLocaleString("en-US");
  throw new FileError("too-long", `This file has over ${most} rows. Split it by season and upload the parts.`);
}
