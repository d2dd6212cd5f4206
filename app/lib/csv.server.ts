import { Readable } from "node:stream";
import { CsvError, parse } from "csv-parse";
import { stringify } from "csv-stringify/sync";
import type { FileProblem, FileRow } from "#app/domain/file-problem.ts";

const limits = { rows: 50_000, columns: 200, recordCharacters: 64_000 };

export type CsvTable = { rows: FileRow[]; problems: FileProblem[] };

function refusal(code: string, message: string): CsvTable {
  return { rows: [], problems: [{ row: null, column: null, value: null, code, severity: "error", message }] };
}

/** UTF-8 with or without its mark, UTF-16 with one, or Windows-1252: what spreadsheets write. */
function decoderFor(content: Uint8Array): TextDecoder | null {
  if (content[0] === 0xff && content[1] === 0xfe) return new TextDecoder("utf-16le");
  if (content[0] === 0xfe && content[1] === 0xff) return new TextDecoder("utf-16be");
  // No text file holds a zero byte; workbooks and pictures do.
  if (content.includes(0)) return null;
  try {
    new TextDecoder("utf-8", { fatal: true }).decode(content);
    return new TextDecoder("utf-8");
  } catch {
    return new TextDecoder("windows-1252");
  }
}

function* pieces(content: Uint8Array, decoder: TextDecoder) {
  const step = 64 * 1024;
  for (let start = 0; start < content.length; start += step) {
    yield decoder.decode(content.subarray(start, start + step), { stream: true });
  }
  yield decoder.decode();
}

/** The separator that the first line holds most of. */
function separatorOf(content: Uint8Array, decoder: TextDecoder) {
  const firstLine = decoder.decode(content.subarray(0, 4096)).split(/[\r\n]/)[0] ?? "";
  const counts = [",", ";", "\t"].map((separator) => ({ separator, count: firstLine.split(separator).length }));
  return counts.reduce((best, next) => (next.count > best.count ? next : best)).separator;
}

function columnName(head: string) {
  return head
    .trim()
    .toLowerCase()
    .replace(/[\s-]+/g, "_");
}

function headProblem(heads: readonly string[], columns: readonly string[]): CsvTable | null {
  const missing = columns.filter((column) => !heads.includes(column));
  const doubled = columns.filter((column) => heads.filter((head) => head === column).length > 1);
  if (doubled.length > 0)
    return refusal("doubled-columns", `Two columns have the same head: ${doubled.join(", ")}. Keep one.`);
  if (missing.length === 0) return null;
  if (missing.length === columns.length) {
    return refusal(
      "other-columns",
      `This file has other columns. It should begin with the heads ${columns.join(", ")}.`,
    );
  }
  return refusal("missing-columns", `These columns are missing: ${missing.join(", ")}. The template has all of them.`);
}

/**
 * Read a CSV file row by row.
 *
 * @param content - the file's bytes, any of the usual encodings and separators
 * @param columns - the heads it must have, in any order and case
 * @returns the rows by column name, blank rows left out; or one problem that says why it is no such file.
 *   Columns with other heads are left out and named in a check.
 */
export async function readCsv(content: Uint8Array, columns: readonly string[]): Promise<CsvTable> {
  if (content.length === 0) return refusal("empty", "This file is empty. Choose the file again, or save it once more.");
  const decoder = decoderFor(content);
  if (!decoder) {
    return refusal(
      "not-csv",
      "This is not a CSV file. In a spreadsheet, save it as “CSV, comma separated” and upload that.",
    );
  }
  const parser = Readable.from(pieces(content, decoder)).pipe(
    parse({
      bom: true,
      delimiter: separatorOf(content, decoderFor(content) ?? decoder),
      relax_column_count: true,
      relax_quotes: false,
      skip_empty_lines: false,
      max_record_size: limits.recordCharacters,
    }),
  );
  const rows: FileRow[] = [];
  let heads: string[] | null = null;
  let row = 0;
  try {
    for await (const record of parser as AsyncIterable<string[]>) {
      row++;
      if (record.length > limits.columns) {
        return refusal("too-wide", `Row ${row} has ${record.length} columns; ${limits.columns} are the most.`);
      }
      if (record.every((cell) => cell.trim() === "")) continue;
      if (heads === null) {
        heads = record.map(columnName);
        const problem = headProblem(heads, columns);
        if (problem) return problem;
        continue;
      }
      if (rows.length === limits.rows) return refusal("too-long", "This file has over 50,000 rows. Split it.");
      const cells = new Map<string, string>();
      heads.forEach((head, index) => {
        if (columns.includes(head)) cells.set(head, record[index] ?? "");
      });
      rows.push({ row, cells });
    }
  } catch (error) {
    if (!(error instanceof CsvError)) throw error;
    return refusal(
      "broken",
      `The file cannot be read past row ${row + 1}: a quotation mark is opened and not closed, or stands inside a cell.`,
    );
  } finally {
    parser.destroy();
  }
  if (heads === null) return refusal("empty", "This file holds no rows. Choose the file again, or save it once more.");
  if (rows.length === 0) return refusal("only-heads", "This file has its heads but no rows under them.");
  const extra = heads.filter((head) => head !== "" && !columns.includes(head));
  const problems: FileProblem[] =
    extra.length === 0
      ? []
      : [
          {
            row: 1,
            column: null,
            value: null,
            code: "extra-columns",
            severity: "check",
            message: `These columns are not used: ${extra.slice(0, 20).join(", ")}.`,
          },
        ];
  return { rows, problems };
}

/** A text cell that a spreadsheet would take for a formula gets a leading apostrophe; numbers keep their sign. */
function guarded(cell: string | number | null): string | number | null {
  return typeof cell === "string" && /^[=+\-@\t\r\0＝＋－＠]/.test(cell) ? `'${cell}` : cell;
}

/** Rows as CSV after RFC 4180: CRLF line ends, quotes where needed, null as an empty cell. */
export function writeCsv(heads: readonly string[], rows: readonly (readonly (string | number | null)[])[]): string {
  return stringify([heads, ...rows.map((row) => row.map(guarded))], { record_delimiter: "windows" });
}
