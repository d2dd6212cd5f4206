import fc from "fast-check";
import { expect, test } from "vitest";
import {
  emptyWorksheet,
  isStepDone,
  nextStep,
  readableReadings,
  stepOfField,
  type Worksheet,
  worksheetAtNewGate,
  worksheetProblems,
  worksheetReadings,
  worksheetSteps,
} from "#app/domain/calibration/worksheet.ts";
import { filledSheet, head, truck } from "./sheets.ts";

function problems(change: Partial<Worksheet>) {
  return worksheetProblems(filledSheet(change), truck).map(
    ({ severity, field, code }) => `${severity} ${field} ${code}`,
  );
}
const [countA, countB, countC] = filledSheet().counts;
const [catchD, catchE] = filledSheet().catches;
if (!countA || !countB || !countC || !catchD || !catchE) throw new Error("the filled sheet lost its rows");

test("a filled sheet raises nothing and its readings are the numbers that were typed", () => {
  expect(problems({})).toEqual([]);
  expect(worksheetReadings(filledSheet())).toEqual({
    gateOpeningIn: 1.875,
    gateScaleMark: "3",
    counts: [
      { id: "a", setting: 1, revolutions: 10, seconds: 60, engineRpm: 1800 },
      { id: "b", setting: 2, revolutions: 7.5, seconds: 30, engineRpm: null },
      { id: "c", setting: 3, revolutions: 20, seconds: 60, engineRpm: null },
    ],
    catches: [
      { id: "d", revolutions: 1, grossLb: 12, tareLb: 2 },
      { id: "e", revolutions: 2, grossLb: 22.2, tareLb: 2 },
      { id: "f", revolutions: 1, grossLb: 9.9, tareLb: 0 },
    ],
    timedCatches: [],
    verification: [],
    liquids: [],
  });
});

test.each([
  ["0 revolutions", { counts: [{ ...countA, revolutions: "0" }, countB] }, "error counts.a.revolutions not-positive"],
  ["-3 revolutions", { counts: [{ ...countA, revolutions: "-3" }, countB] }, "error counts.a.revolutions not-positive"],
  ["letters", { counts: [{ ...countA, seconds: "a minute" }, countB] }, "error counts.a.seconds not-a-number"],
  [
    "twenty digits",
    { counts: [{ ...countA, seconds: "12345678901234567890" }, countB] },
    "error counts.a.seconds not-a-number",
  ],
  ["a decimal comma", { counts: [{ ...countA, revolutions: "10,5" }, countB] }, "error counts.a.revolutions ambiguous"],
  ["setting 1.5", { counts: [{ ...countA, setting: "1.5" }, countB] }, "error counts.a.setting not-whole"],
  ["one second", { counts: [{ ...countA, seconds: "1" }, countB] }, "error counts.a.seconds too-small"],
  ["an hour and a half", { counts: [{ ...countA, seconds: "5400" }, countB] }, "error counts.a.seconds absurd"],
  ["a setting twice", { counts: [countB, { ...countC, setting: "2" }] }, "error counts.c.setting setting-twice"],
  ["a falling count", { counts: [countB, { ...countC, revolutions: "9" }] }, "error counts.c.revolutions count-falls"],
  ["an idling engine", { counts: [countB, { ...countC, rpm: "900" }] }, "check counts.c.rpm engine-slow"],
  ["no working setting", { counts: [countA, countC] }, "check counts working-setting-not-counted"],
  ["no count", { counts: [] }, "error counts no-count"],
  ["no catch", { catches: [] }, "error catches no-catch"],
  ["one catch", { catches: [catchD] }, "check catches one-catch"],
  ["catches far apart", { catches: [catchD, { ...catchE, grossLb: "40" }] }, "check catches catches-differ"],
  ["net weight zero", { catches: [catchE, { ...catchD, grossLb: "2" }] }, "error catches.d.tareLb tare-above-gross"],
  ["tare above gross", { catches: [catchE, { ...catchD, tareLb: "20" }] }, "error catches.d.tareLb tare-above-gross"],
  ["a negative tare", { catches: [catchE, { ...catchD, tareLb: "-1" }] }, "error catches.d.tareLb negative"],
  ["a blank gross", { catches: [catchE, { ...catchD, grossLb: " " }] }, "error catches.d.grossLb blank"],
  ["a gate of 0", { gate: { scaleMark: "", openingText: "0" } }, "error gate.openingText not-positive"],
  ["a gate of 30 in", { gate: { scaleMark: "", openingText: "30" } }, "error gate.openingText absurd"],
  ["a gate of 1 9/8", { gate: { scaleMark: "", openingText: "1 9/8" } }, "error gate.openingText ambiguous"],
  ["a gate not measured", { gate: { scaleMark: "3", openingText: "" } }, "error gate.openingText blank"],
  ["a gate above 4 in", { gate: { scaleMark: "", openingText: "4 1/8" } }, "check gate.openingText gate-above-maximum"],
  ["30 February", { testedOn: "2026-02-30" }, "error testedOn not-a-date"],
  ["no truck", { truckId: 0 }, "error truckId blank"],
  ["no material", { materialId: 0 }, "error materialId blank"],
  ["no tick before counting", { cautions: { counting: false, catching: true } }, "error cautions.counting not-ticked"],
  ["no tick before catching", { cautions: { counting: true, catching: false } }, "error cautions.catching not-ticked"],
])("%s is said once, beside its field", (_, change, problem) => {
  expect(problems(change)).toEqual([problem]);
});

test("a truck at 0 mph is pointed out", () => {
  const [problem] = worksheetProblems(filledSheet(), { ...truck, workingSpeedMph: 0 });
  expect(problem).toMatchObject({ severity: "check", field: "truckId", code: "truck-incomplete" });
});

test("rows of the method that is not in use are neither read nor complained of", () => {
  const timedCatches = ["36", "37", "38"].map((grossLb, place) => ({
    id: `t${place}`,
    setting: "2",
    seconds: "30",
    grossLb,
    tareLb: "2",
  }));
  const sheet = filledSheet({ method: "timed-catch", timedCatches, counts: [{ ...countA, revolutions: "x" }] });
  expect(worksheetProblems(sheet, truck)).toEqual([]);
  expect(worksheetReadings(sheet)).toMatchObject({ counts: [], catches: [] });
  expect(worksheetReadings(sheet)?.timedCatches[1]).toEqual({
    id: "t1",
    setting: 2,
    seconds: 30,
    grossLb: 37,
    tareLb: 2,
  });
  const once = filledSheet({ method: "timed-catch", timedCatches: timedCatches.slice(0, 1) });
  expect(worksheetProblems(once, truck)[0]).toMatchObject({
    severity: "check",
    field: "timedCatches",
    code: "one-catch",
  });
  const none = filledSheet({ method: "timed-catch" });
  expect(worksheetProblems(none, truck)[0]).toMatchObject({
    severity: "error",
    field: "timedCatches",
    code: "no-catch",
  });
});

test("a verification at 0 mph and a prewet without its dry discharge are errors in their rows", () => {
  const verification = [
    { id: "v", speedMph: "0", commandedLbPerLaneMile: "300", seconds: "60", grossLb: "90", tareLb: "5" },
  ];
  expect(problems({ verification })).toEqual(["error verification.v.speedMph not-positive"]);
  const liquid = { id: "l", gallons: "1", seconds: "60", speedMph: "", lanes: "", dryLbPerMin: "" };
  expect(problems({ liquids: [{ ...liquid, kind: "prewet" }] })).toEqual(["error liquids.l.dryLbPerMin blank"]);
  expect(problems({ liquids: [{ ...liquid, kind: "direct" }] })).toEqual([
    "error liquids.l.speedMph blank",
    "error liquids.l.lanes blank",
  ]);
});

test("a tank truck with direct liquid alone needs neither gate nor catch, and has no dry readings", () => {
  const liquids = [
    { id: "l", kind: "direct" as const, gallons: "20", seconds: "60", speedMph: "30", lanes: "1", dryLbPerMin: "" },
  ];
  const sheet = { ...emptyWorksheet(head), cautions: { counting: false, catching: true }, liquids };
  expect(worksheetProblems(sheet, truck)).toEqual([]);
  expect(worksheetReadings(sheet)).toEqual({
    gateOpeningIn: null,
    gateScaleMark: null,
    counts: [],
    catches: [],
    timedCatches: [],
    verification: [],
    liquids: [{ id: "l", kind: "direct", gallons: 20, seconds: 60, speedMph: 30, lanes: 1 }],
  });
  expect(nextStep(sheet, truck)).toBe("rates");
  expect(isStepDone("rates", sheet, truck)).toBe(true);
  // What was typed of a gate before is no gate of the liquid's.
  const typedGate = { ...sheet, gate: { scaleMark: "3", openingText: "1 7/8" } };
  expect(worksheetReadings(typedGate)).toEqual(worksheetReadings(sheet));
});

test("prewetting alone has no gate either, and a catch that cannot be read still stops it", () => {
  const liquid = { id: "p", kind: "prewet" as const, gallons: "1.5", seconds: "45", speedMph: "", lanes: "" };
  const sheet = { ...emptyWorksheet(head), cautions: { counting: false, catching: true } };
  const read = worksheetReadings({ ...sheet, liquids: [{ ...liquid, dryLbPerMin: "200" }] });
  expect(read).toMatchObject({ gateOpeningIn: null, liquids: [{ kind: "prewet", dryLbPerMin: 200 }] });
  expect(worksheetReadings({ ...sheet, liquids: [{ ...liquid, dryLbPerMin: "" }] })).toBeNull();
});

test("of a tank truck nothing but a catch of liquid is asked; one count makes it dry work again", () => {
  const tanks = { ...truck, spreaderKind: "liquid-tanks" as const };
  const sheet = { ...emptyWorksheet(head), cautions: { counting: false, catching: true } };
  const fields = (one: Worksheet) => worksheetProblems(one, tanks).map(({ field, code }) => `${field} ${code}`);
  expect(fields(sheet)).toEqual(["liquids no-catch"]);
  expect(nextStep(sheet, tanks)).toBe("catches");
  expect(worksheetReadings(sheet)).toBeNull();
  expect(fields({ ...sheet, counts: [countA] })).toContain("gate.openingText blank");
});

test("a ground-speed truck may be verified without a count, though not without its gate", () => {
  const verification = [
    { id: "v", speedMph: "20", commandedLbPerLaneMile: "300", seconds: "60", grossLb: "105", tareLb: "5" },
  ];
  const sheet = { ...emptyWorksheet(head), cautions: { counting: false, catching: true }, verification };
  expect(worksheetProblems(sheet, truck).map(({ field }) => field)).toEqual(["gate.openingText"]);
});

test("the first two catches are shown while the third is being typed", () => {
  const sheet = filledSheet({ catches: [catchD, catchE, { id: "f", revolutions: "1", grossLb: "", tareLb: "" }] });
  expect(worksheetReadings(sheet)).toBeNull();
  expect(readableReadings(sheet).catches.map(({ id }) => id)).toEqual(["d", "e"]);
});

test("the next step follows what is typed, from the cautions to the rates", () => {
  let sheet = emptyWorksheet(head);
  const steps = [nextStep(sheet, truck)];
  const { cautions, gate, counts, catches } = filledSheet();
  for (const typed of [{ cautions }, { gate }, { counts }, { catches }]) {
    sheet = { ...sheet, ...typed };
    steps.push(nextStep(sheet, truck));
  }
  expect(steps).toEqual(["cautions", "gate", "counts", "catches", "rates"]);
  expect(worksheetSteps.filter((step) => isStepDone(step, sheet, truck))).toEqual([
    "truck",
    "cautions",
    "gate",
    "counts",
    "catches",
    "rates",
  ]);
  expect(nextStep({ ...sheet, truckId: 0 }, truck)).toBe("truck");
});

test("at a new gate the counts are taken over, and only gate and catch are asked for", () => {
  const counts = [{ setting: 2, revolutions: 15.25, seconds: 60, engineRpm: 1800 }];
  const sheet = worksheetAtNewGate(head, { calibrationId: 7, counts });
  expect(sheet.countsFromCalibrationId).toBe(7);
  expect(readableReadings(sheet).counts).toEqual([{ id: "calibration-7-setting-2", ...counts[0] }]);
  expect(worksheetProblems(sheet, truck).map(({ field }) => field)).toEqual([
    "cautions.catching",
    "gate.openingText",
    "catches",
  ]);
});

test("whatever is typed, nothing throws, and readings are given just when gate, counts and catches have no error", () => {
  const typed = fc.oneof(fc.constantFrom("", "0", "1", "2", "20", "60", "-1", "1 7/8", "1e9", "NaN"), fc.string());
  const sheets = fc.record({
    openingText: typed,
    isTimed: fc.boolean(),
    counts: fc.array(fc.record({ setting: typed, revolutions: typed, seconds: typed, rpm: typed }), { maxLength: 3 }),
    catches: fc.array(fc.record({ revolutions: typed, grossLb: typed, tareLb: typed }), { maxLength: 3 }),
    timedCatches: fc.array(fc.record({ setting: typed, seconds: typed, grossLb: typed, tareLb: typed }), {
      maxLength: 2,
    }),
  });
  const seen = { given: 0, kept: 0 };
  fc.assert(
    fc.property(fc.oneof(sheets, fc.constant(null)), (typedSheet) => {
      const withIds = <Row extends object>(rows: Row[]) => rows.map((row, place) => ({ id: `r${place}`, ...row }));
      const sheet: Worksheet = typedSheet
        ? {
            ...filledSheet(),
            gate: { scaleMark: "", openingText: typedSheet.openingText },
            method: typedSheet.isTimed ? "timed-catch" : "counts",
            counts: withIds(typedSheet.counts),
            catches: withIds(typedSheet.catches),
            timedCatches: withIds(typedSheet.timedCatches),
          }
        : filledSheet();
      const errors = worksheetProblems(sheet, truck).filter(
        ({ severity, field }) => severity === "error" && ["gate", "counts", "catches"].includes(stepOfField(field)),
      );
      const readings = worksheetReadings(sheet);
      expect(readings === null).toBe(errors.length > 0);
      seen[readings ? "given" : "kept"] += 1;
    }),
  );
  expect(Math.min(seen.given, seen.kept)).toBeGreaterThan(5);
});
