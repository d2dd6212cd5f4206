import type { UploadField } from "#app/domain/upload/field.ts";
import { missingFields } from "#app/domain/upload/field.ts";
import { guessDateOrder, guessDecimalMark } from "#app/domain/upload/file-style.ts";
import { headRowOf, proposeColumns, type RememberedColumn } from "#app/domain/upload/match-columns.ts";
import { FileError, type SheetRow } from "#app/lib/file-error.ts";
import type { Upload } from "#app/models/upload.server.ts";
import { runCheck } from "./check-step.server.ts";
import { uploadKinds } from "./kinds.server.ts";
import { rememberedColumns } from "./knowledge.server.ts";
import { type Matching, matchingOf } from "./matching.server.ts";
import { cellTexts } from "./rows.server.ts";
import type { Step } from "./steps.server.ts";
import { storedRows, storedSeparator, storedSheetNames } from "./stored-file.server.ts";

const rowsLookedAt = 300;
/** Heads further down are not looked for. */
const rowsBeforeHeads = 20;
const shown = { rows: 6, characters: 60 };

async function firstRows(upload: Upload, sheetName: string | null): Promise<SheetRow[]> {
  const rows: SheetRow[] = [];
  for await (const batch of storedRows(upload, sheetName)) {
    rows.push(...batch);
    if (rows.length >= rowsLookedAt) break;
  }
  return rows.slice(0, rowsLookedAt);
}

/** The heads of a row; two that are the same and used for the same thing cannot be told apart later. */
function headsOf(row: SheetRow) {
  return cellTexts(row).map((head) => head.trim().slice(0, 120));
}

type Given = {
  fields: readonly UploadField[];
  remembered: readonly RememberedColumn[];
  sheetNames: string[];
  sheetName: string | null;
  /** Between the columns of a CSV file. */
  separator: string;
  /** The row somebody has said holds the heads; null to look for it. */
  headRow: number | null;
};

/** What the first rows say about the whole file. @throws FileError when there is nothing to read */
function propose(rows: readonly SheetRow[], given: Given): Matching {
  const { fields, remembered, sheetNames, sheetName } = given;
  const texts = rows.slice(0, rowsBeforeHeads).map(cellTexts);
  const said = rows.findIndex(({ row }) => row === given.headRow);
  const place = said === -1 ? headRowOf(texts, fields, remembered) : said;
  const headRow = rows[place];
  if (!headRow) throw new FileError("empty", "This file holds no rows. Choose the file again, or save it once more.");
  const heads = headsOf(headRow);
  const columns = proposeColumns(heads, fields, remembered);
  const under = rows.slice(place + 1);
  const cellsOf = (holds: UploadField["holds"]) => {
    const keys = new Set(fields.filter((field) => field.holds === holds).map(({ key }) => key));
    const places = columns.flatMap(({ index, field }) => (field !== null && keys.has(field) ? [index] : []));
    return under.flatMap(({ cells }) =>
      places.flatMap((index) => (typeof cells[index] === "string" ? [cells[index]] : [])),
    );
  };
  const mark = guessDecimalMark(cellsOf("figure"), given.separator);
  const order = guessDateOrder(cellsOf("day"));
  return {
    sheetNames,
    sheetName,
    headRow: headRow.row,
    columns,
    decimalMark: mark.value,
    isDecimalMarkCertain: mark.isCertain,
    dateOrder: order.value,
    isDateOrderCertain: order.isCertain,
    samples: under.slice(0, shown.rows).map((row) => ({
      row: row.row,
      cells: cellTexts(row).map((cell) => cell.slice(0, shown.characters)),
    })),
  };
}

/** Whether the file can be read without asking: every needed column is there, and none is in doubt. */
function needsNoAnswer(matching: Matching, fields: readonly UploadField[]) {
  const matched = new Set(
    matching.columns.flatMap(({ field, isCertain }) => (field !== null && isCertain ? [field] : [])),
  );
  const isComplete = fields.every(({ key }) => matched.has(key));
  return (
    missingFields(fields, matched).length === 0 &&
    matching.isDecimalMarkCertain &&
    matching.isDateOrderCertain &&
    matching.sheetNames.length <= 1 &&
    // A column that nobody knows may hold what another field waits for.
    (isComplete || matching.columns.every(({ isCertain }) => isCertain))
  );
}

/** Look at a file that has arrived: what its columns hold, and whether that has to be asked. */
export async function runRead(step: Step): Promise<void> {
  const { upload, actor } = step;
  const kind = uploadKinds[upload.kind];
  if (kind.reading.by === "station") {
    await step.write({ state: "checking", matching: null }, async () => {});
    return runCheck(step, null);
  }
  const before = matchingOf(upload);
  const sheetName = before?.sheetName ?? null;
  const rows = await firstRows(upload, sheetName);
  const sheetNames = await storedSheetNames(upload);
  const [fields, remembered] = await Promise.all([kind.fields(actor), rememberedColumns(actor, upload.kind)]);
  const matching = propose(rows, {
    fields,
    remembered,
    sheetNames,
    separator: await storedSeparator(upload),
    sheetName: sheetNames.find((name) => name === sheetName) ?? sheetNames[0] ?? null,
    headRow: before?.headRow ?? null,
  });
  if (matching.samples.length === 0) {
    throw new FileError("only-heads", "This file has its heads but no rows under them.");
  }
  if (before === null && needsNoAnswer(matching, fields)) {
    await step.write({ state: "checking", matching }, async () => {});
    return runCheck(step, matching);
  }
  await step.write({ state: "matching", matching }, async () => {});
}
