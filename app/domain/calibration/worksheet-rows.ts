import type { Finding } from "#app/domain/finding.ts";
import { readInches } from "#app/domain/readings.ts";
import type { Catch } from "./catch-weight.ts";
import type { Count } from "./count-rate.ts";
import type { SettingTimedCatch } from "./timed-catch.ts";
import { type FigureLimits, typedFigure } from "./typed-figure.ts";

// Every figure is the text as typed, so that nothing typed is ever lost. `id` is made on the phone, without a point in
// it, and stays with the reading: sent twice, it is still one reading.
export type WorksheetCount = { id: string; setting: string; revolutions: string; seconds: string; rpm: string };
/** A blank tare means a scale zeroed with the container on it. */
export type WorksheetCatch = { id: string; revolutions: string; grossLb: string; tareLb: string };
export type WorksheetTimedCatch = { id: string; setting: string; seconds: string; grossLb: string; tareLb: string };
export type WorksheetVerification = {
  id: string;
  speedMph: string;
  commandedLbPerLaneMile: string;
  seconds: string;
  grossLb: string;
  tareLb: string;
};
/** `dryLbPerMin` belongs to prewet, `speedMph` and `lanes` to direct liquid; the others may stay blank. */
export type WorksheetLiquid = {
  id: string;
  kind: "prewet" | "direct";
  gallons: string;
  seconds: string;
  speedMph: string;
  lanes: string;
  dryLbPerMin: string;
};

export type CountReading = Count & { id: string; engineRpm: number | null };
type CatchReading = Catch & { id: string };
type TimedCatchReading = SettingTimedCatch & { id: string };
type VerificationReading = {
  id: string;
  speedMph: number;
  commandedLbPerLaneMile: number;
  seconds: number;
  grossLb: number;
  tareLb: number;
};
type LiquidReading =
  | { id: string; kind: "prewet"; gallons: number; seconds: number; dryLbPerMin: number }
  | { id: string; kind: "direct"; gallons: number; seconds: number; speedMph: number; lanes: number };

export type RowReadings = {
  counts: CountReading[];
  catches: CatchReading[];
  timedCatches: TimedCatchReading[];
  verification: VerificationReading[];
  liquids: LiquidReading[];
};

// The widest that can be read in a yard: limits of our own against slips of the finger, with no published source.
const limits = {
  setting: { what: "feed setting", min: 1, max: 40, isWhole: true },
  revolutions: { what: "revolutions", min: 0.25, max: 5000 },
  seconds: { what: "seconds", min: 5, max: 3600 },
  engineRpm: { what: "engine rpm", min: 300, max: 5000, blankMeans: 0 },
  grossLb: { what: "gross weight in lb", min: 0.001, max: 5000 },
  tareLb: { what: "tare weight in lb", min: 0, max: 5000, blankMeans: 0 },
  speedMph: { what: "speed in mph", min: 1, max: 80 },
  commandedLbPerLaneMile: { what: "commanded rate in lb per lane mile", min: 1, max: 10_000 },
  gallons: { what: "gallons caught", min: 0.001, max: 5000 },
  lanes: { what: "lanes wetted in one pass", min: 1, max: 6, isWhole: true },
  dryLbPerMin: { what: "dry discharge in lb a minute", min: 0.1, max: 10_000 },
} satisfies Record<string, FigureLimits>;
const mostGateIn = 24;

/** Common practice, no published source; the Minnesota field handbook (2005) asks for 1,500 at least. */
const leastEngineRpm = 1500;

/** A finding that must be put right. */
export function error(code: string, field: string, message: string): Finding {
  return { code, severity: "error", field, message };
}

/** A finding that may stand once somebody has looked. */
export function check(code: string, field: string, message: string): Finding {
  return { code, severity: "check", field, message };
}

function readWeights(field: string, row: { grossLb: string; tareLb: string }, findings: Finding[]) {
  const grossLb = typedFigure(row.grossLb, `${field}.grossLb`, limits.grossLb, findings);
  const tareLb = typedFigure(row.tareLb, `${field}.tareLb`, limits.tareLb, findings);
  if (grossLb === null || tareLb === null) return null;
  if (grossLb > tareLb) return { grossLb, tareLb };
  const message = `Nothing is left of the catch: gross ${grossLb} lb, tare ${tareLb} lb. Were they swapped?`;
  findings.push(error("tare-above-gross", `${field}.tareLb`, message));
  return null;
}

// Each reader below turns one row into numbers, or adds what is wrong to the findings and gives null.
export function readCount(row: WorksheetCount, findings: Finding[]): CountReading | null {
  const field = `counts.${row.id}`;
  const setting = typedFigure(row.setting, `${field}.setting`, limits.setting, findings);
  const revolutions = typedFigure(row.revolutions, `${field}.revolutions`, limits.revolutions, findings);
  const seconds = typedFigure(row.seconds, `${field}.seconds`, limits.seconds, findings);
  const engineRpm = typedFigure(row.rpm, `${field}.rpm`, limits.engineRpm, findings);
  if (setting === null || revolutions === null || seconds === null || engineRpm === null) return null;
  if (engineRpm > 0 && engineRpm < leastEngineRpm) {
    const message = `${engineRpm} rpm is slower than the ${leastEngineRpm} of common practice. Is it what the truck works at?`;
    findings.push(check("engine-slow", `${field}.rpm`, message));
  }
  return { id: row.id, setting, revolutions, seconds, engineRpm: engineRpm > 0 ? engineRpm : null };
}

export function readCatch(row: WorksheetCatch, findings: Finding[]): CatchReading | null {
  const field = `catches.${row.id}`;
  const revolutions = typedFigure(row.revolutions, `${field}.revolutions`, limits.revolutions, findings);
  const weights = readWeights(field, row, findings);
  return revolutions === null || !weights ? null : { id: row.id, revolutions, ...weights };
}

export function readTimedCatch(row: WorksheetTimedCatch, findings: Finding[]): TimedCatchReading | null {
  const field = `timedCatches.${row.id}`;
  const setting = typedFigure(row.setting, `${field}.setting`, limits.setting, findings);
  const seconds = typedFigure(row.seconds, `${field}.seconds`, limits.seconds, findings);
  const weights = readWeights(field, row, findings);
  return setting === null || seconds === null || !weights ? null : { id: row.id, setting, seconds, ...weights };
}

export function readVerification(row: WorksheetVerification, findings: Finding[]): VerificationReading | null {
  const field = `verification.${row.id}`;
  const speedMph = typedFigure(row.speedMph, `${field}.speedMph`, limits.speedMph, findings);
  const commandedLbPerLaneMile = typedFigure(
    row.commandedLbPerLaneMile,
    `${field}.commandedLbPerLaneMile`,
    limits.commandedLbPerLaneMile,
    findings,
  );
  const seconds = typedFigure(row.seconds, `${field}.seconds`, limits.seconds, findings);
  const weights = readWeights(field, row, findings);
  if (speedMph === null || commandedLbPerLaneMile === null || seconds === null || !weights) return null;
  return { id: row.id, speedMph, commandedLbPerLaneMile, seconds, ...weights };
}

export function readLiquid(row: WorksheetLiquid, findings: Finding[]): LiquidReading | null {
  const field = `liquids.${row.id}`;
  const gallons = typedFigure(row.gallons, `${field}.gallons`, limits.gallons, findings);
  const seconds = typedFigure(row.seconds, `${field}.seconds`, limits.seconds, findings);
  if (row.kind === "prewet") {
    const dryLbPerMin = typedFigure(row.dryLbPerMin, `${field}.dryLbPerMin`, limits.dryLbPerMin, findings);
    if (gallons === null || seconds === null || dryLbPerMin === null) return null;
    return { id: row.id, kind: "prewet", gallons, seconds, dryLbPerMin };
  }
  const speedMph = typedFigure(row.speedMph, `${field}.speedMph`, limits.speedMph, findings);
  const lanes = typedFigure(row.lanes, `${field}.lanes`, limits.lanes, findings);
  if (gallons === null || seconds === null || speedMph === null || lanes === null) return null;
  return { id: row.id, kind: "direct", gallons, seconds, speedMph, lanes };
}

export function readRows<Row, Read>(
  rows: readonly Row[],
  read: (row: Row, findings: Finding[]) => Read | null,
  findings: Finding[],
) {
  return rows.map((row) => read(row, findings)).filter((one) => one !== null);
}

export function readGate(openingText: string, findings: Finding[]): number | null {
  const field = "gate.openingText";
  const read = readInches(openingText);
  if (read.ok && read.value > 0 && read.value <= mostGateIn) return read.value;
  if (!read.ok && read.code === "blank") {
    const message = "Measure the gate opening, from the bed to the gate's lower edge, and give it in inches.";
    findings.push(error("blank", field, message));
  } else if (read.ok && read.value <= 0) {
    findings.push(error("not-positive", field, "The gate opening must be more than 0 inches."));
  } else if (read.ok) {
    findings.push(error("absurd", field, `No gate opens more than ${mostGateIn} inches.`));
  } else {
    const message = "Write the gate opening in inches, as in 1 7/8 or 1.875.";
    findings.push(error(read.code, field, message));
  }
  return null;
}
