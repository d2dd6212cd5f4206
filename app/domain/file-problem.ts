import type { DecimalMark } from "./readings.ts";
import type { MeasureUnit } from "./upload/measure.ts";
import type { DateOrder } from "./upload/read-day.ts";

/** One thing wrong, or doubtful, in a file: where it is, what stands there, and what to do about it. */
export type FileProblem = {
  /** Row as a spreadsheet counts, the heads being row 1; null when it concerns the whole file. */
  row: number | null;
  column: string | null;
  /** What the file says, at most 40 characters; null when nothing stands there. */
  value: string | null;
  code: string;
  /** An error keeps the file out; a check is shown and can be accepted. */
  severity: "error" | "check";
  message: string;
};

/** One row of a file by column name. Every known column is there, blank when the file leaves it so. */
export type FileRow = {
  row: number;
  cells: ReadonlyMap<string, string>;
  /** How its file is written; a decimal point, the month first and the columns' own units unless it says otherwise. */
  style?: RowStyle;
};

/** How a file is written, the same for all its rows. */
export type RowStyle = {
  decimalMark: DecimalMark;
  dateOrder: DateOrder;
  /** Units of columns that are in another one than their template's. */
  units: ReadonlyMap<string, MeasureUnit>;
};

/** A cell's text, trimmed; "" when the column is missing. */
export function cellText({ cells }: FileRow, column: string): string {
  return (cells.get(column) ?? "").trim();
}

/** A problem with one cell. */
export function cellProblem(
  fileRow: FileRow,
  column: string,
  code: string,
  message: string,
  severity: FileProblem["severity"] = "error",
): FileProblem {
  const text = cellText(fileRow, column);
  return { row: fileRow.row, column, value: text === "" ? null : text.slice(0, 40), code, severity, message };
}
