import { expect, test } from "vitest";
import { hoursBetween, readLocalTime } from "#app/domain/season/local-time.ts";
import { pastedBlock } from "#app/domain/season/pasted-block.ts";
import { eventCountOf, readStormKind, stormFindings } from "#app/domain/season/storm.ts";
import { isBlankLine, materialColumn, readStormCells, type StormKnowledge } from "#app/domain/season/storm-cells.ts";

const known: StormKnowledge = {
  seasonStartYear: 2025,
  materials: [
    { id: 7, name: "Salt", kind: "salt" },
    { id: 9, name: "Brine", kind: "brine" },
  ],
  trucks: [{ id: 3, unitNumber: "12" }],
};

test.each([
  ["2026-01-12 04:30", "2026-01-12 04:30"],
  ["2026-01-12T04:30", "2026-01-12 04:30"],
  ["2026-01-12 04:30:15.000", "2026-01-12 04:30"],
  ["2026-01-12", "2026-01-12 00:00"],
  ["1/12/2026 4:30 AM", "2026-01-12 04:30"],
  ["1/12/26 4:30pm", "2026-01-12 16:30"],
  ["1/12 12:05 am", "2026-01-12 00:05"],
  ["1/12 12 pm", "2026-01-12 12:00"],
  ["12/3 16:30", "2025-12-03 16:30"],
  ["  7/1  0:00 ", "2025-07-01 00:00"],
])("%s is read as %s", (typed, read) => expect(readLocalTime(typed, 2025)).toBe(read));

test.each(["", "soon", "2026-02-30 04:00", "13/1 4:00 am", "1/12 25:00", "1/12 4:60", "1/12 4", "1/12 13:00 pm"])(
  "%s is no time",
  (typed) => expect(readLocalTime(typed, 2025)).toBeNull(),
);

test("from ten in the evening to half past four are 6.5 hours, over a month's end too", () => {
  expect(hoursBetween("2026-01-31 22:00", "2026-02-01 04:30")).toBe(6.5);
  expect(hoursBetween("2026-02-01 04:30", "2026-01-31 22:00")).toBe(-6.5);
});

test("a kind is known in any case and with blanks or hyphens; another word is not", () => {
  expect(readStormKind(" Freezing  Rain ")).toBe("freezing-rain");
  expect(readStormKind("LIGHT-SNOW")).toBe("light-snow");
  expect(readStormKind("hail")).toBeNull();
});

test("trucks in one storm are one event; the next that starts after the last has ended is another", () => {
  const line = (startedAt: string, endedAt: string | null = null) => ({ startedAt, endedAt });
  expect(eventCountOf([])).toBe(0);
  expect(
    eventCountOf([
      line("2026-01-03 02:00", "2026-01-03 05:00"),
      line("2026-01-02 06:00"),
      line("2026-01-02 04:00", "2026-01-02 09:00"),
      line("2026-01-02 09:00", "2026-01-02 11:00"),
      line("2026-01-04 02:00"),
      line("2026-01-04 02:00"),
    ]),
  ).toBe(3);
});

test("a line's cells become storage units: tons to pounds, gallons as they are, the truck by its number", () => {
  const reading = readStormCells(
    {
      startedAt: "1/12 4:30 am",
      endedAt: "1/12 9:00 am",
      kind: "Light snow",
      pavementTempF: "-4",
      passes: "2",
      laneMilesTreated: "1,236.5",
      hours: "",
      [materialColumn(7)]: "4.5",
      [materialColumn(9)]: "600",
      truck: "Truck 12",
      route: " north ",
    },
    known,
  );
  expect(reading).toEqual({
    ok: true,
    checks: {},
    entry: {
      startedAt: "2026-01-12 04:30",
      endedAt: "2026-01-12 09:00",
      kind: "light-snow",
      pavementTempF: -4,
      passes: 2,
      laneMilesTreated: 1236.5,
      hours: null,
      truckId: 3,
      route: "north",
      note: "",
      used: [
        { materialId: 7, usedLb: 9000, usedGal: null },
        { materialId: 9, usedLb: null, usedGal: 600 },
      ],
    },
  });
});

test("each wrong cell is named: no time, unknown kind, decimal comma, negative tons, half a pass, unknown truck", () => {
  const reading = readStormCells(
    {
      startedAt: "yesterday",
      kind: "hail",
      laneMilesTreated: "12,5",
      passes: "1.5",
      [materialColumn(7)]: "-3",
      truck: "Old Red",
      note: "x".repeat(301),
    },
    known,
  );
  expect(reading.ok).toBe(false);
  if (!reading.ok) {
    expect(Object.keys(reading.errors).sort()).toEqual(
      ["kind", "laneMilesTreated", "material-7", "note", "passes", "startedAt", "truck"].sort(),
    );
  }
});

test("a storm outside its season, one that ends before it starts and a pavement of 320 °F are refused", () => {
  const outcome = (cells: Record<string, string>) => {
    const reading = readStormCells({ startedAt: "2026-01-12 04:30", kind: "snow", ...cells }, known);
    return reading.ok ? "fine" : Object.keys(reading.errors).join();
  };
  expect(outcome({ startedAt: "2024-01-12 04:30" })).toBe("startedAt");
  expect(outcome({ startedAt: "2026-07-01 00:00" })).toBe("startedAt");
  expect(outcome({ startedAt: "2026-06-30 23:59" })).toBe("fine");
  expect(outcome({ endedAt: "2026-01-12 04:29" })).toBe("endedAt");
  expect(outcome({ endedAt: "2026-01-30" })).toBe("endedAt");
  expect(outcome({ pavementTempF: "320" })).toBe("pavementTempF");
});

test("4,000 lb on each lane mile treated is asked about, not refused", () => {
  const line = {
    startedAt: "2026-01-12 04:30",
    endedAt: null,
    pavementTempF: null,
    passes: null,
    laneMilesTreated: 10,
    hours: null,
  };
  expect(stormFindings({ ...line, usedLb: 40_000 }, 2025).map(({ severity, code }) => `${severity} ${code}`)).toEqual([
    "check much-per-lane-mile",
  ]);
  expect(stormFindings({ ...line, usedLb: 20_000 }, 2025)).toEqual([]);
});

test("a line of blanks is blank, a line with a zero is not", () => {
  expect(isBlankLine({ startedAt: " ", kind: "" })).toBe(true);
  expect(isBlankLine({ passes: "0" })).toBe(false);
});

test("a pasted block keeps quoted line ends, doubled quotation marks and empty cells", () => {
  expect(pastedBlock("")).toEqual([]);
  expect(pastedBlock("a\tb\r\n1\t\r\n")).toEqual([
    ["a", "b"],
    ["1", ""],
  ]);
  expect(pastedBlock('"two\nlines"\t"say ""salt"""\n5" pipe\tx')).toEqual([
    ["two\nlines", 'say "salt"'],
    ['5" pipe', "x"],
  ]);
  expect(pastedBlock("one\n\nthree")).toEqual([["one"], [""], ["three"]]);
});
