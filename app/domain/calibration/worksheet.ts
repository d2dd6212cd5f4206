import type { SpreaderKind } from "#app/domain/fleet/truck.ts";
import { isLocalDate, type LocalDate } from "#app/domain/dates.ts";
import type { Finding } from "#app/domain/finding.ts";
import { catchVariationPercent } from "./catch-weight.ts";
import { type Count, fallsInCount, fallWords } from "./count-rate.ts";
import { mostVariationPercent } from "./findings.ts";
import {
  check,
  error,
  type RowReadings,
  readCatch,
  readCount,
  readGate,
  readLiquid,
  readRows,
  readTimedCatch,
  readVerification,
  type WorksheetCatch,
  type WorksheetCount,
  type WorksheetLiquid,
  type WorksheetTimedCatch,
  type WorksheetVerification,
} from "./worksheet-rows.ts";

export type { WorksheetCatch, WorksheetCount, WorksheetLiquid, WorksheetTimedCatch, WorksheetVerification };

/** One calibration as it is being taken in the yard. */
export type Worksheet = {
  schemaVersion: 1;
  clientRef: string;
  truckId: number;
  materialId: number;
  testedOn: LocalDate;
  cautions: { counting: boolean; catching: boolean };
  gate: { scaleMark: string; openingText: string };
  method: "counts" | "timed-catch";
  /** The calibration whose counts this sheet took over, after a change of the gate alone; null when they are new. */
  countsFromCalibrationId: number | null;
  counts: WorksheetCount[];
  catches: WorksheetCatch[];
  timedCatches: WorksheetTimedCatch[];
  verification: WorksheetVerification[];
  liquids: WorksheetLiquid[];
  note: string;
};

export type WorksheetTruck = {
  gateMaxIn: number | null;
  workingSetting: number;
  lanesPerPass: number;
  workingSpeedMph: number;
  /** Of a tank truck nothing dry is asked. */
  spreaderKind?: SpreaderKind;
};

type WorksheetHead = { clientRef: string; truckId: number; materialId: number; testedOn: LocalDate };

/**
 * A worksheet with nothing typed yet.
 *
 * @example emptyWorksheet({ clientRef, truckId: 12, materialId: 1, testedOn: "2026-10-09" }).method // "counts"
 */
export function emptyWorksheet({ clientRef, truckId, materialId, testedOn }: WorksheetHead): Worksheet {
  return {
    schemaVersion: 1,
    clientRef,
    truckId,
    materialId,
    testedOn,
    cautions: { counting: false, catching: false },
    gate: { scaleMark: "", openingText: "" },
    method: "counts",
    countsFromCalibrationId: null,
    counts: [],
    catches: [],
    timedCatches: [],
    verification: [],
    liquids: [],
    note: "",
  };
}

/**
 * A worksheet for a new gate opening: the counts of an earlier calibration are taken over, the catches are not.
 *
 * Common practice, no published source: a change of the gate needs new catches, not new counts.
 *
 * @param head - of the new sheet
 * @param earlier - the calibration whose counts still hold
 * @example worksheetAtNewGate(head, { calibrationId: 7, counts }).catches // []
 */
export function worksheetAtNewGate(
  head: WorksheetHead,
  earlier: { calibrationId: number; counts: readonly (Count & { engineRpm?: number | null })[] },
): Worksheet {
  return {
    ...emptyWorksheet(head),
    countsFromCalibrationId: earlier.calibrationId,
    counts: earlier.counts.map(({ setting, revolutions, seconds, engineRpm }) => ({
      id: `calibration-${earlier.calibrationId}-setting-${setting}`,
      setting: String(setting),
      revolutions: String(revolutions),
      seconds: String(seconds),
      rpm: engineRpm === null || engineRpm === undefined ? "" : String(engineRpm),
    })),
  };
}

/** As numbers, those of the method not in use left out; the gate is null for liquid alone, which passes none. */
export type WorksheetReadings = RowReadings & { gateOpeningIn: number | null; gateScaleMark: string | null };

/** Pump or nozzles alone, as on a tank truck: neither gate nor shaft has a part in it. */
function isLiquidAlone({ counts, catches, timedCatches, verification, liquids }: Worksheet, truck: WorksheetTruck) {
  const dry = [counts, catches, timedCatches, verification];
  const isAboutLiquid = liquids.length > 0 || truck.spreaderKind === "liquid-tanks";
  return isAboutLiquid && dry.every((rows) => rows.length === 0);
}

/** Ground-speed verification alone is a whole job: the controller sets the feed, so no setting is counted. */
function isVerificationAlone({ counts, catches, timedCatches, verification }: Worksheet) {
  return verification.length > 0 && [counts, catches, timedCatches].every((rows) => rows.length === 0);
}

/**
 * The rows of a worksheet that can be read already, for figures that grow while the person types.
 *
 * @returns numbers; a row with a mistake or a blank in it is left out, and so are the rows of the method not in use
 * @example readableReadings(sheet).catches.length // 2 while the third is being typed
 */
export function readableReadings(sheet: Worksheet): RowReadings {
  return readSheet(sheet, anyTruck).readings;
}

function readSheet(sheet: Worksheet, truck: WorksheetTruck) {
  const findings: Finding[] = [];
  const isCounted = sheet.method === "counts";
  const gateOpeningIn = isLiquidAlone(sheet, truck) ? null : readGate(sheet.gate.openingText, findings);
  const readings: RowReadings = {
    counts: isCounted ? readRows(sheet.counts, readCount, findings) : [],
    catches: isCounted ? readRows(sheet.catches, readCatch, findings) : [],
    timedCatches: isCounted ? [] : readRows(sheet.timedCatches, readTimedCatch, findings),
    verification: readRows(sheet.verification, readVerification, findings),
    liquids: readRows(sheet.liquids, readLiquid, findings),
  };
  return { gateOpeningIn, readings, findings };
}

function headFindings(sheet: Worksheet, truck: WorksheetTruck): Finding[] {
  const findings: Finding[] = [];
  if (!(sheet.truckId > 0)) findings.push(error("blank", "truckId", "Choose the truck."));
  if (!(sheet.materialId > 0)) findings.push(error("blank", "materialId", "Choose the material."));
  if (!isLocalDate(sheet.testedOn)) {
    findings.push(error("not-a-date", "testedOn", "Write the day as year-month-day, as in 2026-10-09."));
  }
  if (!(truck.workingSpeedMph > 0) || !(truck.lanesPerPass >= 1)) {
    const message = "Give the truck a working speed above 0 mph and the lanes it covers in one pass.";
    findings.push(check("truck-incomplete", "truckId", message));
  }
  const message = "Read the cautions and tick them before anything turns.";
  const countsHere = sheet.method === "counts" && sheet.countsFromCalibrationId === null;
  const isTurning = countsHere && !isLiquidAlone(sheet, truck) && !isVerificationAlone(sheet);
  if (isTurning && !sheet.cautions.counting) findings.push(error("not-ticked", "cautions.counting", message));
  if (!sheet.cautions.catching) findings.push(error("not-ticked", "cautions.catching", message));
  return findings;
}

function gateFindings(gateOpeningIn: number | null, { gateMaxIn }: WorksheetTruck): Finding[] {
  if (gateOpeningIn === null || gateMaxIn === null || gateOpeningIn <= gateMaxIn) return [];
  const message = `An opening of ${gateOpeningIn} in is more than the ${gateMaxIn} in recorded for this truck. Measure again.`;
  return [check("gate-above-maximum", "gate.openingText", message)];
}

function countFindings(sheet: Worksheet, { counts }: RowReadings, truck: WorksheetTruck): Finding[] {
  if (sheet.counts.length === 0) {
    return [error("no-count", "counts", "Count the revolutions of at least one feed setting.")];
  }
  const findings: Finding[] = [];
  const counted = new Set<number>();
  for (const { id, setting } of counts) {
    const message = `Setting ${setting} is counted twice. Keep one of the counts.`;
    if (counted.has(setting)) findings.push(error("setting-twice", `counts.${id}.setting`, message));
    counted.add(setting);
  }
  for (const fall of findings.length > 0 ? [] : fallsInCount(counts)) {
    findings.push(error("count-falls", `counts.${fall.after.id}.revolutions`, fallWords(fall)));
  }
  if (counts.length === sheet.counts.length && !counted.has(truck.workingSetting)) {
    const message = `The truck's working setting ${truck.workingSetting} is not counted, so its rate is not known.`;
    findings.push(check("working-setting-not-counted", "counts", message));
  }
  return findings;
}

function catchFindings(sheet: Worksheet, { catches }: RowReadings): Finding[] {
  if (sheet.catches.length === 0) return [error("no-catch", "catches", "Weigh at least one catch.")];
  if (sheet.catches.length === 1) {
    const message = "There is one catch only, so nothing shows how far it repeats. Weigh two more.";
    return [check("one-catch", "catches", message)];
  }
  const variationPercent = catchVariationPercent(catches) ?? 0;
  if (variationPercent <= mostVariationPercent) return [];
  const message = `The catches vary by ${variationPercent.toFixed(0)} %, more than ${mostVariationPercent} %. Weigh two more.`;
  return [check("catches-differ", "catches", message)];
}

function timedCatchFindings(sheet: Worksheet, { timedCatches }: RowReadings, truck: WorksheetTruck): Finding[] {
  if (sheet.timedCatches.length === 0) {
    return [error("no-catch", "timedCatches", "Time and weigh at least one catch.")];
  }
  const findings: Finding[] = [];
  const settings = [...new Set(timedCatches.map(({ setting }) => setting))];
  const once = settings.filter((one) => timedCatches.filter(({ setting }) => setting === one).length === 1);
  if (once.length > 0) {
    const message = `Timed once only: setting ${once.join(", ")}. Weigh two more to see how far the catch repeats.`;
    findings.push(check("one-catch", "timedCatches", message));
  }
  if (timedCatches.length === sheet.timedCatches.length && !settings.includes(truck.workingSetting)) {
    const message = `The truck's working setting ${truck.workingSetting} is not caught, so its rate is not known.`;
    findings.push(check("working-setting-not-counted", "timedCatches", message));
  }
  return findings;
}

/**
 * What is wrong or doubtful in a worksheet, each as a sentence beside the field it belongs to.
 *
 * Never throws, whatever was typed. What is not typed yet counts as wrong, with the code "blank", "not-ticked",
 * "no-count" or "no-catch", so that a page can wait with it until the person moves on.
 *
 * @returns in the order of the steps; `field` is a path such as "counts.<id>.revolutions" or "gate.openingText". Errors
 *   stop the sheet; checks may stand once somebody has looked. Empty when all is well
 * @example worksheetProblems(sheet, truck)[0]?.message // "Setting 3 is counted twice. Keep one of the counts."
 */
export function worksheetProblems(sheet: Worksheet, truck: WorksheetTruck): Finding[] {
  const { gateOpeningIn, readings, findings } = readSheet(sheet, truck);
  const dry =
    sheet.method === "counts"
      ? [...countFindings(sheet, readings, truck), ...catchFindings(sheet, readings)]
      : timedCatchFindings(sheet, readings, truck);
  const isWithoutSettings = isLiquidAlone(sheet, truck) || isVerificationAlone(sheet);
  if (isLiquidAlone(sheet, truck) && sheet.liquids.length === 0) {
    findings.push(error("no-catch", "liquids", "Catch the liquid at least once."));
  }
  return [
    ...headFindings(sheet, truck),
    ...findings,
    ...gateFindings(gateOpeningIn, truck),
    ...(isWithoutSettings ? [] : dry),
  ].sort((a, b) => worksheetSteps.indexOf(stepOfField(a.field)) - worksheetSteps.indexOf(stepOfField(b.field)));
}

/**
 * The readings of a worksheet as numbers.
 *
 * @returns null while the sheet has an error in gate, counts or catches; the gate is null, whatever was typed there, when
 *   liquid alone was caught; the cautions are not looked at
 * @example worksheetReadings(sheet)?.gateOpeningIn // 1.875
 */
export function worksheetReadings(sheet: Worksheet): WorksheetReadings | null {
  const { gateOpeningIn, readings } = readSheet(sheet, anyTruck);
  const isWrong = worksheetProblems(sheet, anyTruck).some(
    ({ field, severity }) => severity === "error" && readingSteps.some((step) => step === stepOfField(field)),
  );
  if (isWrong) return null;
  const scaleMark = gateOpeningIn === null ? "" : sheet.gate.scaleMark.trim();
  return { gateOpeningIn, gateScaleMark: scaleMark === "" ? null : scaleMark, ...readings };
}

/** A sheet with readings has the same errors on every truck: only checks, and what an empty sheet lacks, differ. */
const anyTruck: WorksheetTruck = { gateMaxIn: null, workingSetting: 1, lanesPerPass: 1, workingSpeedMph: 1 };

export const worksheetSteps = ["truck", "cautions", "gate", "counts", "catches", "rates", "decision", "card"] as const;
export type WorksheetStep = (typeof worksheetSteps)[number];
const readingSteps = ["gate", "counts", "catches"] as const;
const typedSteps = ["truck", "cautions", ...readingSteps] as const;

/**
 * The step on which a field stands.
 *
 * @param field - as `worksheetProblems` names it
 * @example stepOfField("timedCatches.a.seconds") // "catches"
 */
export function stepOfField(field: string): WorksheetStep {
  const [head] = field.split(".");
  if (head === "cautions" || head === "gate" || head === "counts") return head;
  return head === "truckId" || head === "materialId" || head === "testedOn" ? "truck" : "catches";
}

/**
 * Whether a step needs nothing more from whoever fills in the sheet.
 *
 * @returns for a typed step, true when no error stands on it; for "rates", when all before it are done. Decision and
 *   card follow from the approval, of which the sheet knows nothing: always false
 * @example isStepDone("gate", emptyWorksheet(head), truck) // false
 */
export function isStepDone(step: WorksheetStep, sheet: Worksheet, truck: WorksheetTruck): boolean {
  if (step === "decision" || step === "card") return false;
  const errors = worksheetProblems(sheet, truck).filter(({ severity }) => severity === "error");
  return step === "rates" ? errors.length === 0 : errors.every(({ field }) => stepOfField(field) !== step);
}

/**
 * The step to go on with: the first that is not done.
 *
 * @returns "rates" once everything is typed
 * @example nextStep(emptyWorksheet(head), truck) // "cautions"
 */
export function nextStep(sheet: Worksheet, truck: WorksheetTruck): WorksheetStep {
  return typedSteps.find((step) => !isStepDone(step, sheet, truck)) ?? "rates";
}
