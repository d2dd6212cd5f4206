import { type CorpusCase, heads, type Outcome, ready } from "./case.ts";
import { type Part, zip } from "./zip.ts";

const mainSpace = 'xmlns="http://schemas.openxmlformats.org/spreadsheetml/2006/main"';
const relSpace = 'xmlns:r="http://schemas.openxmlformats.org/officeDocument/2006/relationships"';

/** Cells of a row as XML: text, a figure, or XML that is taken as it is. */
export type Cell = string | number | { xml: string };

function letter(column: number) {
  return String.fromCharCode(65 + column);
}

function cellXml(cell: Cell, reference: string) {
  if (typeof cell === "object") return cell.xml.replaceAll("@", reference);
  if (typeof cell === "number") return `<c r="${reference}"><v>${cell}</v></c>`;
  return `<c r="${reference}" t="inlineStr"><is><t>${cell}</t></is></c>`;
}

export function rowXml(number: number, cells: readonly Cell[]): string {
  return `<row r="${number}">${cells.map((cell, column) => cellXml(cell, `${letter(column)}${number}`)).join("")}</row>`;
}

export function sheetXml(rows: string, before = ""): string {
  return `<?xml version="1.0"?>${before}<worksheet ${mainSpace}><sheetData>${rows}</sheetData></worksheet>`;
}

/** Style 1 is a day, style 2 a time of day. */
const styles = `<?xml version="1.0"?><styleSheet ${mainSpace}><numFmts count="1"><numFmt numFmtId="164" formatCode="yyyy\\-mm\\-dd"/></numFmts>
<fonts count="1"><font><sz val="11"/></font></fonts><fills count="1"><fill><patternFill patternType="none"/></fill></fills>
<borders count="1"><border/></borders><cellStyleXfs count="1"><xf numFmtId="0"/></cellStyleXfs>
<cellXfs count="3"><xf numFmtId="0"/><xf numFmtId="164" applyNumberFormat="1"/><xf numFmtId="20" applyNumberFormat="1"/></cellXfs></styleSheet>`;

type Book = { sheets: { name: string; xml: string; isHidden?: boolean }[]; strings?: string; is1904?: boolean };

export function bookParts({ sheets, strings, is1904 = false }: Book): Part[] {
  const relations = sheets
    .map(
      (_, place) =>
        `<Relationship Id="rId${place + 1}" Type="http://schemas.openxmlformats.org/officeDocument/2006/relationships/worksheet" Target="worksheets/sheet${place + 1}.xml"/>`,
    )
    .join("");
  const list = sheets
    .map(
      ({ name, isHidden }, place) =>
        `<sheet name="${name}" sheetId="${place + 1}" ${isHidden ? 'state="hidden" ' : ""}r:id="rId${place + 1}"/>`,
    )
    .join("");
  return [
    {
      name: "[Content_Types].xml",
      content:
        '<?xml version="1.0"?><Types xmlns="http://schemas.openxmlformats.org/package/2006/content-types"><Default Extension="xml" ContentType="application/xml"/></Types>',
    },
    {
      name: "_rels/.rels",
      content:
        '<?xml version="1.0"?><Relationships xmlns="http://schemas.openxmlformats.org/package/2006/relationships"/>',
    },
    {
      name: "xl/workbook.xml",
      content: `<?xml version="1.0"?><workbook ${mainSpace} ${relSpace}><workbookPr${is1904 ? ' date1904="1"' : ""}/><sheets>${list}</sheets></workbook>`,
    },
    {
      name: "xl/_rels/workbook.xml.rels",
      content: `<?xml version="1.0"?><Relationships xmlns="http://schemas.openxmlformats.org/package/2006/relationships">${relations}</Relationships>`,
    },
    { name: "xl/styles.xml", content: styles },
    ...(strings === undefined
      ? []
      : [{ name: "xl/sharedStrings.xml", content: `<?xml version="1.0"?><sst ${mainSpace}>${strings}</sst>` }]),
    ...sheets.map(({ xml }, place) => ({ name: `xl/worksheets/sheet${place + 1}.xml`, content: xml })),
  ];
}

const headRow = rowXml(1, heads.split(","));
const day = (serial: number) => ({ xml: `<c r="@" s="1"><v>${serial}</v></c>` });
const time = (share: number) => ({ xml: `<c r="@" s="2"><v>${share}</v></c>` });
/** 4 and 19 December 2024, counted from the end of 1899. */
const [first, second] = [45630, 45645];
const cells = (serial: Cell, tons: Cell): Cell[] => [
  serial,
  time(0.1875),
  time(0.458333333333),
  "snow",
  "12",
  24,
  tons,
  "",
];
const rows = (one: Cell = 5.5) => headRow + rowXml(2, cells(day(first), one)) + rowXml(3, cells(day(second), 6));
const book = (xml: string) => bookParts({ sheets: [{ name: "Log", xml }] });

function bookCase(name: string, content: Buffer, outcome: Outcome): CorpusCase {
  return { name: `workbook: ${name}`, fileName: "log.xlsx", content, outcome };
}

const sheetCase = (name: string, xml: string, outcome: Outcome) => bookCase(name, zip(book(xml)), outcome);
const refused = (words: string): Outcome => ({ state: "failed", words });
const withPart = (part: Part) => zip([...book(sheetXml(rows())), part]);
const saltWrong = (code: string): Outcome => ({
  state: "checked",
  ok: 1,
  error: 1,
  problems: [{ row: 2, field: "used:salt", code }],
});

export const workbookCases: CorpusCase[] = [
  sheetCase("days, times and figures", sheetXml(rows()), ready(2)),
  bookCase(
    "days counted from 1904",
    zip(
      bookParts({
        sheets: [{ name: "Log", xml: sheetXml(headRow + rowXml(2, cells(day(first - 1462), 5.5))) }],
        is1904: true,
      }),
    ),
    ready(1),
  ),
  sheetCase(
    "the 29th of February 1900",
    sheetXml(headRow + rowXml(2, cells(day(60), 5.5)) + rowXml(3, cells(day(second), 6))),
    {
      state: "checked",
      ok: 1,
      error: 1,
      problems: [{ row: 2, field: "started_on", code: "season-not-open" }],
    },
  ),
  sheetCase("a formula with its result", sheetXml(rows({ xml: '<c r="@"><f>A1*2</f><v>5.25</v></c>' })), {
    state: "checked",
    ok: 2,
    problems: [{ row: 0, field: "used:salt", code: "formulas" }],
  }),
  sheetCase("a formula that came to nought", sheetXml(rows({ xml: '<c r="@"><f>A1*0</f><v>0</v></c>' })), {
    state: "checked",
    ok: 2,
    problems: [{ row: 0, code: "formulas" }],
  }),
  sheetCase(
    "a formula that was never worked out",
    sheetXml(rows({ xml: '<c r="@"><f>A1*2</f></c>' })),
    saltWrong("spreadsheet-error"),
  ),
  sheetCase(
    "a formula that is an error",
    sheetXml(rows({ xml: '<c r="@" t="e"><f>A1/0</f><v>#DIV/0!</v></c>' })),
    saltWrong("spreadsheet-error"),
  ),
  sheetCase(
    "a cell that is an error",
    sheetXml(rows({ xml: '<c r="@" t="e"><v>#REF!</v></c>' })),
    saltWrong("spreadsheet-error"),
  ),
  sheetCase(
    "a formula that gives a day",
    sheetXml(headRow + rowXml(2, cells({ xml: `<c r="@" s="1"><f>A1+1</f><v>${first}</v></c>` }, 5.5))),
    { state: "checked", ok: 1, problems: [{ row: 0, field: "started_on", code: "formulas" }] },
  ),
  sheetCase("noise of binary fractions", sheetXml(rows({ xml: '<c r="@"><v>5.2999999999999998</v></c>' })), ready(2)),
  sheetCase(
    "figures beyond fifteen digits",
    sheetXml(rows({ xml: '<c r="@"><v>1e300</v></c>' })),
    saltWrong("not-a-number"),
  ),
  sheetCase("text that begins like a formula", sheetXml(rows("=1+1")), saltWrong("not-a-number")),
  sheetCase(
    "a dimension of the whole sheet",
    sheetXml(rows()).replace("<sheetData>", '<dimension ref="A1:XFD1048576"/><sheetData>'),
    ready(2),
  ),
  sheetCase(
    "merged cells",
    sheetXml(rows()).replace("</worksheet>", '<mergeCells count="1"><mergeCell ref="H2:H3"/></mergeCells></worksheet>'),
    ready(2),
  ),
  sheetCase(
    "50,000 blank rows with a style",
    sheetXml(
      rows() +
        Array.from({ length: 50_000 }, (_, place) => `<row r="${place + 4}"><c r="A${place + 4}" s="1"/></row>`).join(
          "",
        ),
    ),
    ready(2),
  ),
  sheetCase(
    "a cell in the last column there is",
    sheetXml(`${rows()}<row r="4"><c r="XFD4"><v>1</v></c></row>`),
    refused("Row 4 has 16384 columns"),
  ),
  sheetCase(
    "a row number of nought",
    sheetXml(rows().replace('<row r="2">', '<row r="0">')),
    refused("its rows are not in order"),
  ),
  sheetCase(
    "rows out of order",
    sheetXml(headRow + rowXml(3, cells(day(first), 5)) + rowXml(2, cells(day(second), 5))),
    refused("its rows are not in order"),
  ),
  sheetCase("no rows", sheetXml(""), refused("holds no rows")),
  sheetCase("half a sheet", sheetXml(rows()).slice(0, 600), refused("damaged")),
  sheetCase(
    "a document type",
    sheetXml(rows(), '<!DOCTYPE worksheet [<!ENTITY x SYSTEM "file:///etc/passwd">]>'),
    refused("document type"),
  ),
  sheetCase(
    "a billion laughs",
    sheetXml(rows(), '<!DOCTYPE l [<!ENTITY a "ha"><!ENTITY b "&a;&a;&a;&a;&a;&a;&a;&a;">]>'),
    refused("document type"),
  ),
  bookCase(
    "a shared string that is not there",
    zip(
      bookParts({
        sheets: [{ name: "Log", xml: sheetXml(rows({ xml: '<c r="@" t="s"><v>99</v></c>' })) }],
        strings: "<si><t>a</t></si>",
      }),
    ),
    {
      state: "checked",
      ok: 1,
      check: 1,
      problems: [{ row: 2, code: "no-material" }],
    },
  ),
  bookCase(
    "a hidden sheet before the log",
    zip(
      bookParts({
        sheets: [
          { name: "Notes", xml: sheetXml(""), isHidden: true },
          { name: "Log", xml: sheetXml(rows()) },
        ],
      }),
    ),
    ready(2),
  ),
  bookCase(
    "two sheets",
    zip(
      bookParts({
        sheets: [
          { name: "Log", xml: sheetXml(rows()) },
          { name: "Old", xml: sheetXml("") },
        ],
      }),
    ),
    { state: "matching" },
  ),
  bookCase("macros", withPart({ name: "xl/vbaProject.bin", content: "x" }), refused("macros")),
  bookCase(
    "a nested archive",
    withPart({ name: "xl/embeddings/more.zip", content: zip([]) }),
    refused("another archive"),
  ),
  bookCase("a path that leads out", withPart({ name: "../../outside.xml", content: "x" }), refused("damaged")),
  bookCase(
    "a part twice",
    zip([...book(sheetXml(rows())), { name: "xl/workbook.xml", content: "<x/>" }]),
    refused("a part twice"),
  ),
  bookCase(
    "10,000 parts",
    zip([
      ...book(sheetXml(rows())),
      ...Array.from({ length: 10_000 }, (_, place) => ({ name: `x/${place}`, content: "" })),
    ]),
    refused("over 200 parts"),
  ),
  bookCase(
    "200 MB in 200 kB",
    withPart({ name: "xl/worksheets/sheet9.xml", content: Buffer.alloc(200_000_000) }),
    refused("grows to more"),
  ),
  bookCase(
    "sizes that lie",
    zip(book(sheetXml(rows())).map((part) => (part.name.includes("sheet1") ? { ...part, declaredSize: 10 } : part))),
    refused("damaged"),
  ),
  bookCase(
    "a password",
    zip(book(sheetXml(rows())).map((part) => ({ ...part, isEncrypted: true }))),
    refused("locked with a password"),
  ),
  bookCase("an archive that is no workbook", zip([{ name: "readme.txt", content: "hello" }]), refused("no workbook")),
  bookCase("cut short", zip(book(sheetXml(rows()))).subarray(0, 900), refused("damaged")),
  bookCase(
    "an old workbook under the new name",
    Buffer.concat([Buffer.from("d0cf11e0a1b11ae1", "hex"), Buffer.alloc(600)]),
    refused("neither a CSV file nor a workbook"),
  ),
  bookCase("a CSV under a workbook's name", Buffer.from(`${heads}\r\n2024-12-04,,,snow,12,24,5.5,\r\n`), ready(1)),
];
