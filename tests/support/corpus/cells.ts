import { cellCase, type CorpusCase, doubtful, file, line, ready, second, textCase, wrong } from "./case.ts";

const salt = "used:salt";
const tons = (name: string, salt_tons: string, code: string | null) =>
  cellCase(
    `tons: ${name}`,
    { salt_tons },
    code === null ? ready(2) : wrong(salt, code, salt_tons.replaceAll('"', "").slice(0, 40).trim()),
  );

/** Figures, each in the column of tons of salt. */
export const numberCases: CorpusCase[] = [
  tons("a group of three", '"1,234.5"', null),
  tons("blanks around it", " 5.5 ", null),
  tons("a fixed blank beside it", "\u00a05.5\u202f", null),
  tons("a sign before it", "+5.5", null),
  tons("minus nought", "-0", null),
  tons("pounds written out", "9400 lb", null),
  tons("tons written out", "5.5 tons", null),
  tons("kilograms written out", '"4,990 kg"', null),
  tons("below zero", "-5", "negative"),
  tons("below zero in brackets", "(5)", "not-a-number"),
  tons("a minus behind it", "5-", "not-a-number"),
  tons("an exponent", "1e3", "not-a-number"),
  tons("an exponent beyond any number", "1e400", "not-a-number"),
  tons("NaN", "NaN", "not-a-number"),
  tons("Infinity", "Infinity", "not-a-number"),
  tons("hexadecimal", "0x10", "not-a-number"),
  tons("digits of another script", "٣", "not-a-number"),
  tons("full-width digits", "５", "not-a-number"),
  tons("a fraction sign", "½", "not-a-number"),
  tons("a unit that two countries read differently", "12 t", "unknown-unit"),
  tons("gallons of a solid", "120 gal", "other-unit"),
  tons("cubic yards", "4 cu yd", null),
  tons("a percentage", "12%", "not-a-number"),
  tons("a currency", "$12", "not-a-number"),
  tons("thirty decimals", `5.${"1".repeat(30)}`, "not-a-number"),
  tons("more than any town", "99999999", "absurd"),
  tons("a formula", "=1+1", "not-a-number"),
  tons("a spreadsheet's error", "#REF!", "spreadsheet-error"),
  tons("words", "none", "not-a-number"),
  tons("groups written with points beside points", "1.234.567", "ambiguous"),
  cellCase("tons that are pounds", { salt_tons: "9400" }, doubtful(salt, "tons-or-pounds")),
  cellCase("ten times too much for the lane miles", { lane_miles: "0.5" }, doubtful("lane_miles", "very-dense")),
  textCase(
    "decimal commas",
    file(line({ salt_tons: '"5,5"', lane_miles: '"24,25"' }), second.replace("5.5", '"6,75"')),
    ready(2),
  ),
  textCase("both marks in one column", file(line({ salt_tons: '"5,5"' }), second), { state: "matching" }),
  textCase("semicolons and one figure that could be either", "start_date;salt_tons\r\n2024-12-04;1,234\r\n", {
    state: "matching",
  }),
];

const day = (name: string, start_date: string, code: string | null) =>
  cellCase(
    `day: ${name}`,
    { start_date },
    code === null ? ready(2) : wrong("started_on", code, start_date.replaceAll('"', "")),
  );

/** Days and times. */
export const dateCases: CorpusCase[] = [
  day("month first", "12/24/2024", null),
  day("two digits of a year", "12/24/24", null),
  day("a month in words", '"Dec 4, 2024"', null),
  day("day and month in words", "4-Dec-24", null),
  day("a weekday before it", '"Wed, Dec 4, 2024"', null),
  day("with its time", "2024-12-04 06:30", null),
  day("31 February", "2025-02-31", "not-a-date"),
  day("29 February of a common year", "2025-02-29", "not-a-date"),
  day("the year 1", "0001-01-05", "not-a-date"),
  day("the year 9999", "9999-01-05", "future"),
  day("tomorrow and beyond", "2999-01-05", "future"),
  day("a season that is not open", "2019-01-05", "season-not-open"),
  day("a time with a zone", "2024-12-04T06:30:00Z", "has-zone"),
  day("a month alone", "Jan", "not-a-date"),
  day("a spreadsheet's day number", "45630", "not-a-date"),
  day("left blank", "", "blank"),
  textCase("day first, shown by a 24th", file(line({ start_date: "24/12/2024" }), second), ready(2)),
  textCase("an order nobody can tell", file(line({ start_date: "03/04/2025" })), {
    state: "matching",
    words: "month or the day first",
  }),
  textCase("two orders in one file", file(line({ start_date: "24/12/2024" }), line({ start_date: "12/24/2024" })), {
    state: "matching",
  }),
  cellCase("a time of 25 hours", { start_time: "25:00" }, wrong("start_time", "not-a-time", "25:00")),
  cellCase("an end after midnight", { start_time: "22:00", end_time: "05:00" }, ready(2)),
];

/** What a row says, beyond the form of its cells. */
export const meaningCases: CorpusCase[] = [
  cellCase("a truck nobody has", { truck: "99" }, wrong("truck", "unknown-truck", "99")),
  cellCase("another town's truck", { truck: "77" }, wrong("truck", "unknown-truck", "77")),
  cellCase("a truck by its number with a word", { truck: "Truck 12" }, ready(2)),
  cellCase("a truck with a nought before its number", { truck: "012" }, ready(2)),
  cellCase("no truck", { truck: "" }, ready(2)),
  cellCase("a kind of storm that is not known", { kind: "thundersnow" }, doubtful("kind", "unknown-kind")),
  cellCase("a formula in a note", { note: '"=HYPERLINK(""http://sample.example"")"' }, ready(2)),
  cellCase("marks of a page in a note", { note: "<script>alert(1)</script>" }, ready(2)),
  cellCase(
    "a name of 300 characters for a truck",
    { truck: "x".repeat(300) },
    wrong("truck", "unknown-truck", "x".repeat(40)),
  ),
  textCase("the same line twice", file(line(), line(), second), {
    state: "checked",
    ok: 2,
    check: 1,
    problems: [{ row: 3, code: "twice" }],
  }),
  textCase("another town's rows", `town,start_date,salt_tons\r\nUpper Other,2024-12-04,5\r\n`, {
    state: "checked",
    ok: 0,
    error: 1,
    problems: [{ row: 2, field: "town", code: "other-town", value: "Upper Other" }],
  }),
  textCase(
    "materials by name, units by row",
    `date,material,quantity,uom\r\n2024-12-04,Salt,9400,lb\r\n2024-12-05,salt,4,tons\r\n`,
    ready(2),
  ),
  textCase("a material the town does not have", `date,material,tons\r\n2024-12-04,Gravel,4\r\n`, {
    state: "checked",
    ok: 0,
    error: 1,
    problems: [{ row: 2, field: "material", code: "unknown-material", value: "Gravel" }],
  }),
  textCase("every row wrong", file(...[1, 2, 3].map(() => line({ salt_tons: "-1" }))), {
    state: "checked",
    ok: 0,
    error: 3,
  }),
  textCase(
    "one wrong row of 5,000",
    file(
      ...Array.from({ length: 5000 }, (_, place) =>
        line({ note: String(place), ...(place === 2500 ? { truck: "99" } : {}) }),
      ),
    ),
    { state: "checked", ok: 4999, error: 1, problems: [{ row: 2502, field: "truck", code: "unknown-truck" }] },
  ),
];
