import { afterAll, beforeAll, beforeEach, expect, test } from "vitest";
import { startApp, type TestApp } from "#tests/support/app.ts";
import { aPerson, aSeason, aSeasonFigure, aTown, type Person, signIn, type Town } from "#tests/support/factories.ts";
import { countOf, rows } from "#tests/support/rows.ts";
import { acceptUpload, heads, seasonRow, sendFile, uploadIdOf, uploadsOf } from "#tests/support/upload-files.ts";

/* Files of season figures: what is wrong is said by row and column, and nothing counts until the file is accepted. */

let app: TestApp;
let town: Town;
let recorder: Person;
let cookie: string;

beforeAll(async () => {
  app = await startApp();
  await aSeason(app, 2023);
  await aSeason(app, 2024);
});

beforeEach(async () => {
  town = await aTown(app);
  recorder = await aPerson(app, { role: "recorder", town });
  cookie = await signIn(app, recorder);
});

afterAll(async () => expect(await app.close()).toEqual([]));

const good = `${heads}\r\n${seasonRow()}\r\n`;

async function stored() {
  const figures = await countOf(app, `season_figure WHERE town_id = ${town.id}`);
  return { figures, calibrations: await countOf(app, `calibration WHERE town_id = ${town.id}`) };
}

type Problem = {
  row: number | null;
  column: string | null;
  value: string | null;
  code: string;
  severity: string;
  message: string;
};

/** Send a file and read what the checks kept of it. */
async function problemsOf(content: string | Uint8Array, fileName = "figures.csv"): Promise<Problem[]> {
  const answer = await sendFile(app, cookie, { content, fileName });
  expect(answer.status, answer.body.slice(0, 300)).toBe(302);
  const uploadId = uploadIdOf(answer);
  const page = await app.ask(`/uploads/${uploadId}`, { cookie });
  expect(page.status).toBe(200);
  const list = await app.ask(`/uploads/${uploadId}/problems`, { cookie });
  expect(list.status).toBe(200);
  expect(await stored()).toEqual({ figures: 0, calibrations: 0 });
  const [upload] = await rows<{ problems: Problem[] | string }>(app, "SELECT problems FROM upload WHERE id = ?", [
    uploadId,
  ]);
  const problems = upload?.problems ?? [];
  const read = typeof problems === "string" ? (JSON.parse(problems) as Problem[]) : problems;
  // Each problem is told on the page, by its words.
  for (const { message } of read.slice(0, 3)) expect(list.body).toContain(message.slice(0, 40).replaceAll('"', '""'));
  return read;
}

/** What the first problem says, and where. */
async function firstProblem(content: string | Uint8Array) {
  const [first] = await problemsOf(content);
  return first && { row: first.row, column: first.column, code: first.code, severity: first.severity };
}

const wholeFile = { row: null, column: null, severity: "error" };
const png = Buffer.from("89504e470d0a1a0a0000000d49484452", "hex");
const workbook = Buffer.concat([Buffer.from("504b0304140006000800", "hex"), Buffer.alloc(2000)]);

test.each<[string, string | Uint8Array, string]>([
  ["a picture", png, "not-csv"],
  ["a workbook under a CSV's name", workbook, "not-csv"],
  ["nothing", "", "empty"],
  ["a byte-order mark alone", "\uFEFF", "empty"],
  ["blank lines alone", "\r\n\r\n,,,\r\n", "empty"],
  ["heads alone", `${heads}\r\n`, "only-heads"],
  ["other columns", "name,colour\r\na,b\r\n", "other-columns"],
  ["one column too few", good.replace("events,", "").replace(",24,", ","), "missing-columns"],
  ["one column twice", `${heads},events\r\n${seasonRow()},24\r\n`, "doubled-columns"],
  ["an unclosed quote", `${heads}\r\n"2024-25,100,20\r\n`, "broken"],
  ["a quote inside a cell", `${heads}\r\n2024-25,1"0,20,1,0,,0,,\r\n`, "broken"],
  ["201 columns", `${heads}\r\n${"1,".repeat(200)}1\r\n`, "too-wide"],
  ["a cell of 70,000 characters", `${heads}\r\n${"9".repeat(70_000)},1,1,1,1,1,1,1,1\r\n`, "broken"],
  ["50,001 rows", `${heads}\r\n${`${seasonRow()}\r\n`.repeat(50_001)}`, "too-long"],
])("a file that is %s is refused in one sentence", async (_what, content, code) => {
  expect(await firstProblem(content)).toEqual({ ...wholeFile, code });
});

type Change = Record<string, string>;
test.each<[string, Change, string, string]>([
  ["negative tons", { salt_tons: "-604" }, "salt_tons", "negative"],
  ["absurd tons", { salt_tons: "99999999" }, "salt_tons", "absurd"],
  ["tons beyond any number", { salt_tons: "9".repeat(400) }, "salt_tons", "not-a-number"],
  ["an exponent", { salt_tons: "1e3" }, "salt_tons", "not-a-number"],
  ["NaN", { salt_tons: "NaN" }, "salt_tons", "not-a-number"],
  ["Infinity", { salt_tons: "Infinity" }, "salt_tons", "not-a-number"],
  ["a hexadecimal number", { salt_tons: "0x10" }, "salt_tons", "not-a-number"],
  ["words", { salt_tons: "n/a" }, "salt_tons", "not-a-number"],
  ["a unit", { salt_tons: "604 tons" }, "salt_tons", "not-a-number"],
  ["a decimal comma", { salt_tons: '"604,5"' }, "salt_tons", "ambiguous"],
  ["points between groups", { salt_tons: "1.604.500" }, "salt_tons", "ambiguous"],
  ["a formula", { salt_tons: "=1+1" }, "salt_tons", "not-a-number"],
  ["a spreadsheet's error", { salt_tons: "#REF!" }, "salt_tons", "not-a-number"],
  ["no lane miles", { lane_miles: "" }, "lane_miles", "blank"],
  ["zero lane miles", { lane_miles: "0" }, "lane_miles", "too-small"],
  ["half an event", { events: "20.5" }, "events", "not-whole"],
  ["more events than days", { events: '"9,400"' }, "events", "absurd"],
  ["mix without its salt", { mix_tons: "100" }, "mix_salt_percent", "blank"],
  ["a mix of 120 percent", { mix_tons: "100", mix_salt_percent: "120" }, "mix_salt_percent", "absurd"],
  ["years that do not follow", { season: "2024-26" }, "season", "not-a-season"],
  ["a season that is not open", { season: "2031-32" }, "season", "season-not-open"],
])("%s: told by row, column and value", async (_what, change, column, code) => {
  const problems = await problemsOf(`${heads}\r\n${seasonRow()}\r\n${seasonRow({ season: "2023-24", ...change })}\r\n`);
  const errors = problems.filter(({ severity }) => severity === "error");
  expect(errors[0]).toMatchObject({ row: 3, column, code });
  const written = (change[column] ?? "").replaceAll('"', "");
  expect(errors[0]?.value).toBe(written === "" ? null : written.slice(0, 40));
  expect(errors[0]?.message).toMatch(/^[A-Z0-9].{10,}[.?]$/s);
});

test("the same season twice in one file is refused at the second", async () => {
  expect(await firstProblem(`${good}${seasonRow({ salt_tons: "601" })}\r\n`)).toMatchObject({ row: 3, code: "twice" });
});

test("a season that was sent in is closed to files", async () => {
  await aSeasonFigure(app, town, { state: "sent" });
  const uploadId = uploadIdOf(await sendFile(app, cookie, { content: good }));
  const page = await app.ask(`/uploads/${uploadId}`, { cookie });
  expect(page.body).toContain("has been sent in");
  expect((await acceptUpload(app, cookie, uploadId)).status).toBe(409);
  expect(await countOf(app, `season_figure WHERE town_id = ${town.id} AND state = 'sent' AND version = 1`)).toBe(1);
});

test("columns nobody asked for are named and left out, in whatever order the others come", async () => {
  const [first = "", ...rest] = heads.split(",");
  const [value = "", ...values] = seasonRow().split(",");
  const content = `Remarks,${rest.join(",")},${first.toUpperCase()}\r\n=HYPERLINK(1),${values.join(",")},${value}\r\n`;
  const problems = await problemsOf(content);
  expect(problems).toMatchObject([{ row: 1, code: "extra-columns", severity: "check" }]);
});

const utf16 = (text: string, isBig: boolean) => {
  const little = Buffer.from(`\uFEFF${text}`, "utf16le");
  return isBig ? little.swap16() : little;
};

test.each<[string, string | Uint8Array]>([
  ["UTF-8 with its mark", `\uFEFF${good}`],
  ["UTF-16, little end first", utf16(good, false)],
  ["UTF-16, big end first", utf16(good, true)],
  ["Windows-1252", Buffer.from(good.replace("2024-25", "2024\x9625"), "latin1")],
  ["semicolons", good.replaceAll(",", ";")],
  ["tabs", good.replaceAll(",", "\t")],
  ["plain line ends", good.replaceAll("\r\n", "\n")],
  ["an old Mac's line ends", good.replaceAll("\r\n", "\r")],
  ["everything in quotes", good.replace(/[^,\r\n]+/g, '"$&"')],
  ["blank lines between", good.replace("\r\n", "\r\n\r\n,,,,,,,,\r\n")],
  ["no line end at the end", good.trimEnd()],
  ["fixed blanks around figures", good.replace(",600,", ",\u00a0600\u00a0,")],
])("%s is read, accepted, and stored as tons in pounds", async (_what, content) => {
  expect(await problemsOf(content)).toEqual([]);
  const [upload] = await uploadsOf(app, town);
  const answer = await acceptUpload(app, cookie, upload?.id ?? 0);
  expect([answer.status, answer.headers.location]).toEqual([302, `/uploads/${upload?.id}`]);
  const query =
    "SELECT state, lane_miles, event_count, salt_lb, material_cost_cents FROM season_figure WHERE town_id = ?";
  expect(await rows(app, query, [town.id])).toEqual([
    { state: "draft", lane_miles: 100, event_count: 20, salt_lb: 1_200_000, material_cost_cents: 4_800_000 },
  ]);
  const [kept] = await rows<{ content: Buffer }>(app, "SELECT content FROM upload WHERE id = ?", [upload?.id ?? 0]);
  expect(kept?.content.equals(Buffer.from(content))).toBe(true);
});

test("a quoted line end inside a cell is part of the cell", async () => {
  const content = `${heads},remarks\r\n${seasonRow()},"two\r\nlines"\r\n${seasonRow({ season: "2023-24", events: "x" })},\r\n`;
  const problems = await problemsOf(content);
  expect(problems.filter(({ severity }) => severity === "error")).toMatchObject([{ row: 3, column: "events" }]);
});

test("50,000 rows that are all wrong are told as the first 500 problems, in good time", async () => {
  const started = performance.now();
  const problems = await problemsOf(`${heads}\r\n${`${seasonRow({ events: "x" })}\r\n`.repeat(50_000)}`);
  expect(problems).toHaveLength(500);
  expect(performance.now() - started).toBeLessThan(10_000);
});

test("words that a spreadsheet would run are kept from running in the list of problems", async () => {
  const evil = ["=HYPERLINK(1)", "+1+1", "-2+3", "@SUM(1)", "\t=1", "＝1"];
  const content = `${heads}\r\n${evil.map((text) => seasonRow({ salt_tons: `"${text}"` })).join("\r\n")}\r\n`;
  const uploadId = uploadIdOf(await sendFile(app, cookie, { content }));
  const { body, headers } = await app.ask(`/uploads/${uploadId}/problems`, { cookie });
  expect(headers["content-disposition"]).toBe(`attachment; filename="upload-${uploadId}-problems.csv"`);
  for (const line of body.split("\r\n")) {
    for (const cell of line.split(",")) expect(cell.replace(/^"/, "")).not.toMatch(/^[=+\-@\t＝]/);
  }
  expect(body).toContain("'=HYPERLINK(1)");
});
