import { cellProblem, type FileProblem, type FileRow, type RowStyle } from "#app/domain/file-problem.ts";
import type { MeasureUnit } from "#app/domain/upload/measure.ts";
import type { SheetRow } from "#app/lib/file-error.ts";
import type { Matching } from "./matching.server.ts";

/** What somebody has said of a row, by subject: a field, "stands:" and a code, or "left-out". */
export type RowAnswers = ReadonlyMap<string, string>;

/** Figures that a workbook holds as such are written the way the rest of the file is. */
function textOf(cell: string | number, matching: Matching) {
  if (typeof cell === "string") {
    // An apostrophe that keeps a spreadsheet from reading a formula is not part of the text.
    return cell.replace(/^'(?=[=+\-@])/, "");
  }
  const text = String(cell);
  return matching.decimalMark === "comma" ? text.replace(".", ",") : text;
}

/** How the file is written, for the readers of rows. */
export function styleOf(matching: Matching): RowStyle {
  const units = new Map<string, MeasureUnit>();
  for (const { field, unit } of matching.columns) if (field !== null && unit !== null) units.set(field, unit);
  return { decimalMark: matching.decimalMark, dateOrder: matching.dateOrder, units };
}

/**
 * Rows of a sheet as rows of a file: cells by field, with what somebody has said they should be.
 *
 * @returns a function for all rows of one file
 */
export function fileRows(matching: Matching): (sheetRow: SheetRow, answers: RowAnswers | undefined) => FileRow {
  const style = styleOf(matching);
  const used = matching.columns.flatMap(({ index, field }) => (field === null ? [] : [{ index, field }]));
  return (sheetRow, answers) => {
    const cells = new Map<string, string>();
    for (const { index, field } of used) {
      const cell = sheetRow.cells[index];
      cells.set(field, answers?.get(field) ?? (cell === undefined ? "" : textOf(cell, matching)));
    }
    return { row: sheetRow.row, cells, style };
  };
}

/** A row's cells as text, for keeping and showing. */
export function cellTexts(sheetRow: SheetRow): string[] {
  return sheetRow.cells.map(String);
}

const spreadsheetError = /^#(?:REF!|DIV\/0!|N\/A|NAME\?|NUM!|NULL!|VALUE!|SPILL!|ERROR!)$/;

/** Cells that hold a spreadsheet's error in the place of a value. */
export function spreadsheetErrors(fileRow: FileRow): FileProblem[] {
  const found: FileProblem[] = [];
  for (const [field, text] of fileRow.cells) {
    if (!text.startsWith("#") || !spreadsheetError.test(text)) continue;
    const message = "A formula came to an error here, or was never worked out. Give the value itself.";
    found.push(cellProblem(fileRow, field, "spreadsheet-error", message));
  }
  return found;
}
