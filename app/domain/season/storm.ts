import { seasonEnd, seasonLabel, seasonStart } from "../dates.ts";
import type { Finding } from "../finding.ts";
import { hoursBetween, type LocalTime } from "./local-time.ts";

/** What came down, or blew. */
export const stormKinds = ["snow", "light-snow", "freezing-rain", "sleet", "frost", "blowing-snow", "other"] as const;
export type StormKind = (typeof stormKinds)[number];

export const stormKindWords: Record<StormKind, string> = {
  snow: "snow",
  "light-snow": "light snow",
  "freezing-rain": "freezing rain",
  sleet: "sleet",
  frost: "frost",
  "blowing-snow": "blowing snow",
  other: "other",
};

/** Whether a text names a kind of storm. */
function isStormKind(text: string): text is StormKind {
  return stormKinds.some((kind) => kind === text);
}

/**
 * The kind a person or a spreadsheet means: its name in any case, with blanks or hyphens.
 *
 * @returns null when it is none of ours
 * @example readStormKind(" Freezing Rain ") // "freezing-rain"
 */
export function readStormKind(text: string): StormKind | null {
  const tidy = text
    .trim()
    .toLowerCase()
    .replace(/[\s_-]+/g, "-");
  return isStormKind(tidy) ? tidy : null;
}

/** One line of the log as its checks see it. null = not written down. */
export type StormLine = {
  startedAt: LocalTime;
  endedAt: LocalTime | null;
  pavementTempF: number | null;
  passes: number | null;
  laneMilesTreated: number | null;
  hours: number | null;
  /** Solids put down, all materials, lb. */
  usedLb: number;
};

/** Wide limits of our own: they catch a slip, not a hard night. */
const longestStormHours = 120;
const pavementTempF = { min: -40, max: 70 };
const mostPasses = 200;
const mostLbPerLaneMile = 2000;

function outOf(line: StormLine, seasonStartYear: number) {
  const day = line.startedAt.slice(0, 10);
  return day < seasonStart(seasonStartYear) || day > seasonEnd(seasonStartYear);
}

/**
 * What is wrong or doubtful in one line of the storm log.
 *
 * @param line - times local, temperatures °F, lengths in lane miles, weights in lb
 * @param seasonStartYear - of the log it is written into
 * @returns errors first; empty when all is well
 */
export function stormFindings(line: StormLine, seasonStartYear: number): Finding[] {
  const findings: Finding[] = [];
  const add = (severity: Finding["severity"], code: string, field: string, message: string) =>
    findings.push({ severity, code, field, message });
  if (outOf(line, seasonStartYear)) {
    add("error", "outside-season", "startedAt", `That day is outside ${seasonLabel(seasonStartYear)}.`);
  }
  const lastedHours = line.endedAt === null ? null : hoursBetween(line.startedAt, line.endedAt);
  if (lastedHours !== null && lastedHours < 0) add("error", "ends-early", "endedAt", "It ends before it starts.");
  if (lastedHours !== null && lastedHours > longestStormHours) {
    add("error", "too-long", "endedAt", `It lasts ${Math.round(lastedHours / 24)} days. Write each storm by itself.`);
  }
  const temp = line.pavementTempF;
  if (temp !== null && (temp < pavementTempF.min || temp > pavementTempF.max)) {
    const message = `A pavement of ${temp} °F cannot be; ${pavementTempF.min} to ${pavementTempF.max} °F is taken.`;
    add("error", "pavement-temp", "pavementTempF", message);
  }
  if (line.passes !== null && line.passes > mostPasses) {
    add("error", "passes", "passes", `${line.passes} passes in one storm are too many.`);
  }
  if (line.laneMilesTreated !== null && line.laneMilesTreated > 0) {
    const rate = line.usedLb / line.laneMilesTreated;
    if (rate > mostLbPerLaneMile) {
      const message = `${Math.round(rate).toLocaleString("en-US")} lb on each lane mile treated: are these tons, and all the lane miles?`;
      add("check", "much-per-lane-mile", "laneMilesTreated", message);
    }
  }
  return [...findings.filter((one) => one.severity === "error"), ...findings.filter((one) => one.severity === "check")];
}

/**
 * How many storms a log holds. Lines whose times touch or overlap are one storm seen by several trucks; a line without
 * an end is taken to end when it starts.
 *
 * @param lines - any order; may be empty
 * @example eventCountOf([{ startedAt: "2026-01-02 04:00", endedAt: "2026-01-02 09:00" },
 *   { startedAt: "2026-01-02 06:00", endedAt: null }]) // 1
 */
export function eventCountOf(lines: readonly Pick<StormLine, "startedAt" | "endedAt">[]): number {
  const sorted = lines.toSorted((a, b) => (a.startedAt < b.startedAt ? -1 : Number(a.startedAt > b.startedAt)));
  let count = 0;
  let runsUntil = "";
  for (const { startedAt, endedAt } of sorted) {
    if (startedAt > runsUntil || count === 0) count += 1;
    const end = endedAt ?? startedAt;
    if (end > runsUntil) runsUntil = end;
  }
  return count;
}
