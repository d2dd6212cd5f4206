import { Readable } from "node:stream";
import { CsvError, parse } from "csv-parse";
import { stringify } from "csv-stringify/sync";
import { assertLength, assertWidth, FileError, sheetLimits, type SheetRow } from "./file-error.ts";
import { decodedPieces, type TextEncodingName } from "./text-encoding.server.ts";

const separators = [",", ";", "\t", "|"];
/** Rows handed on at a time. */
const batchRows = 1000;

/** The first lines without what stands in quotation marks, so that a comma in a note does not count. */
function linesWithoutQuotes(text: string) {
  return text
    .replace(/"(?:[^"]|"")*"?/g, "")
    .split(/\r\n|\n|\r/)
    .filter((line) => line.trim() !== "")
    .slice(0, 12);
}

/**
 * The separator between columns: the one that most of the first lines hold, and hold most often.
 *
 * @param text - the beginning of the file
 * @returns a comma when no line holds any
 * @example separatorOf("a;b\n1,5;2\n") // ";"
 */
export function separatorOf(text: string): string {
  const declared = /^\ufeff?"?sep=([,;|\t])/i.exec(text)?.[1];
  if (declared !== undefined) return declared;
  const lines = linesWithoutQuotes(text);
  const scores = separators.map((separator) => {
    const counts = lines.map((line) => line.split(separator).length - 1);
    const usual = counts.filter((count) => count > 0).sort((a, b) => a - b);
    const middle = usual[Math.floor(usual.length / 2)] ?? 0;
    // Lines that all hold it equally often make it more likely than one line that holds it often.
    const even = counts.filter((count) => count === middle && count > 0).length;
    return { separator, score: even * 100 + middle };
  });
  return scores.reduce((best, next) => (next.score > best.score ? next : best)).separator;
}

/** "sep=;" is an instruction to a spreadsheet, not a row of the table; it still counts as a row. */
function isSeparatorLine(row: number, record: readonly string[]) {
  return row === 1 && /^"?sep=/i.test(record[0] ?? "");
}

function brokenAt(row: number, error: CsvError): FileError {
  if (error.code === "CSV_MAX_RECORD_SIZE") {
    const message = `Row ${row} is longer than ${sheetLimits.recordCharacters.toLocaleString("en-US")} characters. A quotation mark may be opened there and not closed.`;
    return new FileError("row-too-long", message);
  }
  const message = `The file cannot be read past row ${row}: a quotation mark is opened and not closed, or stands inside a cell.`;
  return new FileError("broken", message);
}

/**
 * The rows of a CSV file, read as they are asked for: at no time is more than a piece of the file in memory.
 *
 * @param pieces - the file's bytes in order
 * @param encoding - as found when the file was received
 * @returns batches of rows that are not blank, each with the row number a spreadsheet would show
 * @throws FileError when the file is no text, is too long or too wide, or breaks off inside quotation marks
 */
export async function* csvRows(
  pieces: AsyncIterable<Uint8Array>,
  encoding: TextEncodingName,
): AsyncGenerator<SheetRow[]> {
  if (encoding === "none") {
    const message = "This is neither a CSV file nor a workbook. In a spreadsheet, save it as CSV or as .xlsx.";
    throw new FileError("not-csv", message);
  }
  const texts = decodedPieces(pieces, encoding);
  let opening = "";
  for (let next = await texts.next(); next.done !== true; next = await texts.next()) {
    opening += next.value;
    if (opening.length >= 65_536) break;
  }
  async function* all() {
    yield opening;
    yield* texts;
  }
  const parser = Readable.from(all()).pipe(
    parse({
      bom: true,
      delimiter: separatorOf(opening.slice(0, 65_536)),
      relax_column_count: true,
      relax_quotes: true,
      skip_empty_lines: false,
      max_record_size: sheetLimits.recordCharacters,
    }),
  );
  const records: AsyncIterable<string[]> = parser;
  let batch: SheetRow[] = [];
  let row = 0;
  try {
    for await (const record of records) {
      row++;
      assertLength(row);
      assertWidth(row, record.length);
      if (record.every((cell) => cell.trim() === "") || isSeparatorLine(row, record)) continue;
      batch.push({ row, cells: record });
      if (batch.length === batchRows) {
        yield batch;
        batch = [];
      }
    }
  } catch (error) {
    if (error instanceof CsvError) throw brokenAt(row + 1, error);
    throw error;
  } finally {
    parser.destroy();
  }
  if (batch.length > 0) yield batch;
}

/** A text cell that a spreadsheet would take for a formula gets a leading apostrophe; figures keep their sign. */
function guarded(cell: string | number | null): string | number | null {
  if (typeof cell !== "string" || /^[+-]?\d[\d.,]*$/.test(cell)) return cell;
  return /^[=+\-@\t\r\0＝＋－＠]/.test(cell) ? `'${cell}` : cell;
}

/** Rows as CSV after RFC 4180: CRLF line ends, quotes where needed, null as an empty cell. */
export function writeCsv(heads: readonly string[], rows: readonly (readonly (string | number | null)[])[]): string {
  return stringify([heads.map(guarded), ...rows.map((row) => row.map(guarded))], { record_delimiter: "windows" });
}
