/* global require, setTimeout, process */
/*
 * Reads one sheet of a workbook in a thread of its own, with a heap of its own: whatever the file does, the application
 * goes on. Plain JavaScript, given to the thread as text, because the build bundles everything else into one file.
 *
 * workerData: { path, sheetName: string | null, isNamesOnly: boolean, modules: { exceljs, yauzl }, limits }
 * Messages: { names }, { rows: [row, cells, formulaColumns][] }, { end: true }, { refusal: { code, message } }
 */
const { parentPort, workerData } = require("node:worker_threads");
const { path, sheetName, isNamesOnly, modules, limits } = workerData;
const ExcelJS = require(modules.exceljs);
const yauzl = require(modules.yauzl);

const batchRows = 1000;

class Refusal extends Error {
  constructor(code, message) {
    super(message);
    this.code = code;
  }
}

function openZip() {
  const options = { lazyEntries: true, autoClose: false, strictFileNames: true, validateEntrySizes: true };
  return new Promise((resolve, reject) => {
    yauzl.open(path, options, (error, zip) => (error ? reject(error) : resolve(zip)));
  });
}

/** Every entry of the archive, or the reason why it is not unpacked. */
function listEntries(zip) {
  return new Promise((resolve, reject) => {
    const entries = new Map();
    let unpackedBytes = 0;
    zip.on("error", reject);
    zip.on("end", () => resolve(entries));
    zip.on("entry", (entry) => {
      const name = entry.fileName;
      unpackedBytes += entry.uncompressedSize;
      const ratio = entry.uncompressedSize / Math.max(1, entry.compressedSize);
      const refusal = entry.isEncrypted()
        ? ["encrypted", "This workbook is locked with a password. Save it without one."]
        : zip.entryCount > limits.entries
          ? ["zip-entries", `This workbook has over ${limits.entries} parts, so it is not opened.`]
          : unpackedBytes > limits.unpackedBytes || (ratio > limits.ratio && entry.uncompressedSize > 1_000_000)
            ? ["zip-bomb", "This workbook grows to more than is unpacked here. Save the one sheet you need as CSV."]
            : /vbaProject|\.bin$/i.test(name) && /vba/i.test(name)
              ? ["macros", "This workbook holds macros. Save it as .xlsx, without them."]
              : /\.(?:zip|xlsx|xlsm|docx|jar)$/i.test(name)
                ? ["zip-nested", "This workbook holds another archive, so it is not opened."]
                : entries.has(name)
                  ? ["zip-doubled", "This workbook holds a part twice, so it is not opened."]
                  : null;
      if (refusal) return reject(new Refusal(...refusal));
      entries.set(name, entry);
      zip.readEntry();
    });
    zip.readEntry();
  });
}

function streamOf(zip, entry) {
  return new Promise((resolve, reject) => {
    zip.openReadStream(entry, (error, stream) => (error ? reject(error) : resolve(stream)));
  });
}

/** The pieces of an XML part. A document type could make the parser expand entities: no workbook has one. */
async function* xmlPieces(zip, entry) {
  let opening = "";
  for await (const piece of await streamOf(zip, entry)) {
    if (opening.length < 4096) {
      opening += piece.toString("latin1");
      if (/<!DOCTYPE|<!ENTITY/i.test(opening.replaceAll("\0", ""))) {
        throw new Refusal(
          "doctype",
          "This workbook holds a document type, which no spreadsheet writes. It is not opened.",
        );
      }
    }
    yield piece;
  }
}

const { Readable } = require("node:stream");

/** The reader of the library, fed with the parts in the order in which they build on each other. */
class SheetReader extends ExcelJS.stream.xlsx.WorkbookReader {
  async prepare(part) {
    await this._parseRels(part("xl/_rels/workbook.xml.rels"));
    await this._parseWorkbook(part("xl/workbook.xml"));
    const styles = part("xl/styles.xml");
    if (styles) await this._parseStyles(styles);
  }

  sheets() {
    return (this.model?.sheets ?? []).filter(({ state }) => state === undefined || state === "visible");
  }

  async *rows(part, sheet) {
    const strings = part("xl/sharedStrings.xml");
    this.sharedStrings = [];
    if (strings) for await (const _event of this._parseSharedStrings(strings)) void _event;
    const relation = this.workbookRels.find(({ Id }) => Id === sheet.rId);
    const target = relation?.Target?.replace(/^\/?(?:xl\/)?/, "xl/");
    const stream = target === undefined ? null : part(target);
    if (!stream) throw new Refusal("no-sheet", `The sheet “${sheet.name}” is missing from this workbook.`);
    for (const { value } of this._parseWorksheet(stream, "0")) yield* value;
  }
}

/** Days are counted from the end of 1899, or from 1904 in workbooks of an old kind. The 29th of February 1900 is skipped. */
function dateText(serial, is1904) {
  const days = is1904 ? serial + 1462 : serial;
  const minutes = Math.round((days - 25569) * 1440);
  if (!Number.isFinite(minutes) || days < 0 || days > 200_000) return String(serial);
  const text = new Date(minutes * 60_000).toISOString();
  const [day, clock] = [text.slice(0, 10), text.slice(11, 16)];
  if (days < 1) return clock;
  return clock === "00:00" ? day : `${day} ${clock}`;
}

function isDateFormat(format) {
  if (typeof format !== "string") return false;
  const bare = format.replace(/"[^"]*"|\\.|\[(?!h|m|s)[^\]]*\]/gi, "");
  return /[dmyhs]/i.test(bare) && !/^general$/i.test(bare) && !/[#?]|0\.0|^0+$/.test(bare.replace(/\.0+$/, ""));
}

function tidyNumber(value) {
  // What a cell shows: fifteen digits, without the noise of binary fractions.
  return Number(value.toPrecision(15));
}

function plainText(value) {
  return value.richText ? value.richText.map(({ text }) => text ?? "").join("") : null;
}

function cellValue(cell, is1904) {
  let { value } = cell;
  let isFormula = false;
  if (value !== null && typeof value === "object" && !(value instanceof Date) && "formula" in value) {
    isFormula = true;
    // Asked of the cell: the copy that its value is leaves out a result of nought.
    value = cell.result ?? Number.NaN;
    // What was never worked out, or came to an error, has no figure.
    if (typeof value === "number" && Number.isNaN(value)) return { value: "#ERROR!", isFormula };
    if (typeof value === "number" && isDateFormat(cell.numFmt)) value = dateText(value, is1904);
  }
  if (value === null || value === undefined) return { value: "", isFormula };
  if (value instanceof Date) {
    const minutes = Math.round(value.getTime() / 60_000);
    if (!Number.isFinite(minutes)) return { value: "#ERROR!", isFormula };
    return { value: dateText(minutes / 1440 + 25569, false), isFormula };
  }
  if (typeof value === "number") {
    return { value: Number.isFinite(value) ? tidyNumber(value) : "#ERROR!", isFormula };
  }
  if (typeof value === "boolean") return { value: value ? "TRUE" : "FALSE", isFormula };
  if (typeof value === "object") {
    const text = plainText(value) ?? value.text ?? value.error ?? "";
    return { value: typeof text === "string" ? text : (plainText(text) ?? ""), isFormula };
  }
  return { value: String(value), isFormula };
}

function readRow(row, is1904) {
  const cells = [];
  const formulas = [];
  row.eachCell({ includeEmpty: false }, (cell, column) => {
    const { value, isFormula } = cellValue(cell, is1904);
    if (value === "" && !isFormula) return;
    if (column > limits.columns) {
      const message = `Row ${row.number} has ${column} columns; ${limits.columns} are the most.`;
      throw new Refusal("too-wide", message);
    }
    while (cells.length < column) cells.push("");
    cells[column - 1] = typeof value === "string" ? value.slice(0, limits.cellCharacters) : value;
    if (isFormula) formulas.push(column - 1);
  });
  return { cells, formulas };
}

/** A batch goes out only when the last one was taken, so that a slow reader does not fill the memory. */
let taken = Promise.resolve();
let take = () => {};
parentPort.on("message", () => take());
async function send(message) {
  await taken;
  taken = new Promise((resolve) => (take = resolve));
  parentPort.postMessage(message);
}

async function main() {
  const zip = await openZip();
  const entries = await listEntries(zip);
  for (const name of ["[Content_Types].xml", "xl/workbook.xml", "xl/_rels/workbook.xml.rels"]) {
    if (!entries.has(name))
      throw new Refusal("no-workbook", "This archive is no workbook. Save it as .xlsx or as CSV.");
  }
  const part = (name) => {
    const entry = entries.get(name);
    return entry ? Readable.from(xmlPieces(zip, entry)) : null;
  };
  const reader = new SheetReader(Readable.from([]), { styles: "cache", sharedStrings: "cache", worksheets: "emit" });
  await reader.prepare(part);
  const sheets = reader.sheets();
  if (sheets.length === 0) throw new Refusal("no-sheet", "This workbook has no sheet that can be seen.");
  await send({ names: sheets.map(({ name }) => name) });
  if (isNamesOnly) return;
  const sheet = sheets.find(({ name }) => name === sheetName) ?? sheets[0];
  const is1904 = reader.properties?.model?.date1904 === true;
  let rows = [];
  let lastRow = 0;
  for await (const row of reader.rows(part, sheet)) {
    if (!Number.isInteger(row.number) || row.number <= lastRow || row.number > 1_048_576) {
      throw new Refusal("broken", `This workbook cannot be read past row ${lastRow}: its rows are not in order.`);
    }
    lastRow = row.number;
    const { cells, formulas } = readRow(row, is1904);
    if (cells.every((cell) => typeof cell === "string" && cell.trim() === "")) continue;
    rows.push([row.number, cells, formulas]);
    if (rows.length === batchRows) {
      await send({ rows });
      rows = [];
    }
  }
  if (rows.length > 0) await send({ rows });
}

main()
  .then(() => send({ end: true }))
  .catch((error) => {
    const refusal =
      error instanceof Refusal
        ? { code: error.code, message: error.message }
        : {
            code: "broken",
            message: "This workbook is damaged and cannot be read. Open it in a spreadsheet and save it anew.",
          };
    parentPort.postMessage({ refusal });
  })
  .finally(() => setTimeout(() => process.exit(0), 50));
