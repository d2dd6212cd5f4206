import { type CorpusCase, file, heads, line, ready, second, textCase } from "./case.ts";

const good = file(line(), second);
const utf16 = (text: string, isBig: boolean, hasMark: boolean) => {
  const little = Buffer.from(`${hasMark ? "\uFEFF" : ""}${text}`, "utf16le");
  return isBig ? little.swap16() : little;
};
const latin = (text: string) => Buffer.from(text, "latin1");

/** Encodings: what spreadsheets of all ages write, and what only looks like text. */
export const encodingCases: CorpusCase[] = [
  textCase("UTF-8", good, ready(2)),
  textCase("UTF-8 with its mark", `\uFEFF${good}`, ready(2)),
  textCase("UTF-16LE with its mark", utf16(good, false, true), ready(2)),
  textCase("UTF-16BE with its mark", utf16(good, true, true), ready(2)),
  textCase("UTF-16LE without a mark", utf16(good, false, false), ready(2)),
  textCase("UTF-16BE without a mark", utf16(good, true, false), ready(2)),
  textCase("Latin-1 accents in a note", latin(file(line({ note: "Rivi\xe8re" }), second)), ready(2)),
  textCase("Windows-1252 dashes in a note", latin(file(line({ note: "hill \x96 bridge \x80" }), second)), ready(2)),
  textCase("a byte that is no UTF-8", Buffer.concat([Buffer.from(good), Buffer.from([0xff])]), {
    state: "checked",
    ok: 2,
    error: 1,
  }),
  textCase("zero bytes in text", good.replace("snow", "sn\0ow"), {
    state: "failed",
    words: "neither a CSV file nor a workbook",
  }),
  textCase("a picture", Buffer.from("89504e470d0a1a0a0000000d49484452", "hex"), {
    state: "failed",
    words: "neither a CSV file nor a workbook",
  }),
  textCase("heads with invisible marks", good.replace("start_date", "\u200Bstart_date\u200F"), ready(2)),
  textCase("heads in full-width letters", good.replace("truck", "ｔｒｕｃｋ"), ready(2)),
  textCase("emoji in a note", file(line({ note: "❄️🚛" }), second), ready(2)),
  textCase("a decomposed accent in a note", file(line({ note: "Rivie\u0300re" }), second), ready(2)),
];

/** Line ends, separators and quotation marks. */
export const lineCases: CorpusCase[] = [
  textCase("plain line ends", good.replaceAll("\r\n", "\n"), ready(2)),
  textCase("an old Mac's line ends", good.replaceAll("\r\n", "\r"), ready(2)),
  textCase("no line end at the end", good.trimEnd(), ready(2)),
  textCase("blank lines between", good.replaceAll("\r\n", "\r\n\r\n,,,,,,,\r\n"), ready(2)),
  textCase("semicolons", good.replaceAll(",", ";"), ready(2)),
  textCase("tabs", good.replaceAll(",", "\t"), ready(2)),
  textCase("pipes", good.replaceAll(",", "|"), ready(2)),
  textCase("a line that names the separator", `sep=;\r\n${good.replaceAll(",", ";")}`, ready(2)),
  textCase("everything in quotation marks", good.replace(/[^,\r\n]+/g, '"$&"'), ready(2)),
  textCase("quotation marks in quotation marks", file(line({ note: '"the ""long"" hill"' }), second), ready(2)),
  textCase("a quotation mark inside a cell", file(line({ note: '5" of it' }), second), ready(2)),
  textCase("a line end inside quotation marks", file(line({ note: '"two\r\nlines"' }), second), ready(2)),
  textCase("a comma inside quotation marks", file(line({ note: '"hill, bridge"' }), second), ready(2)),
  textCase("separators at the end of each line", good.replaceAll("\r\n", ",,\r\n"), ready(2)),
  textCase("a quotation mark that is never closed", file(line({ note: '"open' }), second), {
    state: "failed",
    words: "a quotation mark is opened and not closed",
  }),
  textCase("a million characters after an open quotation mark", file(line({ note: `"${"x".repeat(1_000_000)}` })), {
    state: "failed",
    words: "Row 2 is longer than 64,000 characters",
  }),
];

/** How many rows and columns, and which. */
export const shapeCases: CorpusCase[] = [
  textCase("a byte-order mark alone", "\uFEFF", { state: "failed", words: "holds no rows" }),
  textCase("blank lines alone", "\r\n\r\n,,,\r\n", { state: "failed", words: "holds no rows" }),
  textCase("heads alone", `${heads}\r\n`, { state: "failed", words: "no rows under them" }),
  textCase("no heads at all", `${line()}\r\n${second}\r\n`, { state: "matching" }),
  textCase("heads in the third row", `Storm log\r\nTown of Lower Sample\r\n${good}`, ready(2)),
  textCase("other heads", "name,colour\r\na,b\r\n", { state: "matching", words: "Which column holds the start day" }),
  textCase("a head twice", `${heads},truck\r\n${line()},12\r\n`, { state: "matching" }),
  textCase("a head left empty", `${heads},\r\n${line()},x\r\n`, ready(1)),
  textCase("a head in other words", good.replace("salt_tons", "Rock stuff put down"), { state: "matching" }),
  textCase(
    "heads in capitals, in another order",
    [..."0"].map(() => "TRUCK,Salt (Tons),Start Date\r\n12,5.5,2024-12-04\r\n").join(""),
    ready(1),
  ),
  textCase("rows that are too short", `${heads}\r\n2024-12-04,04:30\r\n${second}\r\n`, {
    state: "checked",
    ok: 1,
    check: 1,
    problems: [{ row: 2, code: "no-material" }],
  }),
  textCase("rows that are too long", good.replaceAll("5.5,", "5.5,,extra,more"), ready(2)),
  textCase("201 columns", `${heads}${",x".repeat(193)}\r\n${line()}\r\n`, {
    state: "failed",
    words: "Row 1 has 201 columns; 200 are the most",
  }),
  textCase("a million columns", `${"a,".repeat(1_000_000)}\r\n`, { state: "failed", words: "longer than 64,000" }),
  textCase("200 columns", `${heads}${",".repeat(192)}\r\n${line()}\r\n`, ready(1)),
  textCase("a cell of 30,000 characters", file(line({ note: "x".repeat(30_000) }), second), {
    state: "checked",
    ok: 1,
    check: 1,
    problems: [{ row: 2, field: "note", code: "long-text" }],
  }),
  textCase("250,001 rows", `start_date,salt_tons\r\n${"2024-12-04,5.5\r\n".repeat(250_001)}`, {
    state: "failed",
    words: "over 250,000 rows",
  }),
  textCase("a row of totals", `${good}Total,,,,,48,11,\r\n`, {
    state: "checked",
    ok: 2,
    error: 1,
    problems: [{ row: 4, field: "started_on", code: "totals-row", value: "Total" }],
  }),
  textCase("notes under the table", `${good}written by the foreman,,,,,,,\r\n`, {
    state: "checked",
    ok: 2,
    error: 1,
    problems: [{ row: 4, field: "started_on", code: "not-a-date" }],
  }),
  textCase("heads that name an object's own parts", `${heads},__proto__,constructor\r\n${line()},a,b\r\n`, {
    state: "matching",
  }),
  textCase("a head that is a formula", `${heads},=1+1\r\n${line()},2\r\n`, { state: "matching" }),
];
