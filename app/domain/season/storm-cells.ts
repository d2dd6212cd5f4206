import { readNumber } from "../readings.ts";
import { shortTonsToLb } from "../units.ts";
import { type LocalTime, readLocalTime } from "./local-time.ts";
import type { MaterialKind } from "#app/domain/calibration/band.ts";
import { readStormKind, stormFindings, type StormKind } from "./storm.ts";

/** The columns of a line of the log besides its materials, in the order of the grid. */
export const stormColumns = [
  "startedAt",
  "endedAt",
  "kind",
  "pavementTempF",
  "passes",
  "laneMilesTreated",
  "hours",
] as const;
/** Those after the materials. */
export const stormEndColumns = ["truck", "route", "note"] as const;

/** The column of one material. */
export function materialColumn(materialId: number): string {
  return `material-${materialId}`;
}

export type StormKnowledge = {
  seasonStartYear: number;
  materials: readonly { id: number; name: string; kind: MaterialKind }[];
  trucks: readonly { id: number; unitNumber: string }[];
};

/** A line of the log in storage units, ready to be stored. null = not written down. */
export type StormEntry = {
  startedAt: LocalTime;
  endedAt: LocalTime | null;
  kind: StormKind;
  pavementTempF: number | null;
  passes: number | null;
  laneMilesTreated: number | null;
  hours: number | null;
  truckId: number | null;
  route: string;
  note: string;
  used: { materialId: number; usedLb: number | null; usedGal: number | null }[];
};

export type StormReading =
  { ok: true; entry: StormEntry; checks: Record<string, string> } | { ok: false; errors: Record<string, string> };

const limits: Record<string, { what: string; max: number; isWhole?: boolean; min?: number }> = {
  pavementTempF: { what: "pavement temperature", min: -1000, max: 1000 },
  passes: { what: "number of passes", max: 1000, isWhole: true },
  laneMilesTreated: { what: "lane miles treated", max: 100_000 },
  hours: { what: "hours", max: 10_000 },
};
const mostTons = 20_000;
const mostGal = 2_000_000;

type Cells = Readonly<Record<string, string>>;

function tidyTruck(text: string) {
  return text
    .toLowerCase()
    .replace(/^(?:truck|unit|no\.?|t-)\s*/, "")
    .replace(/[\s#-]/g, "");
}

/**
 * One line of the log as it stands in the grid, the form or a pasted block.
 *
 * @param cells - text by column: stormColumns, stormEndColumns and materialColumn of each material (short tons; US
 *   gallons for brine); a missing column is blank
 * @returns the line in storage units with what should be looked at, or what is wrong, both by column
 * @example readStormCells({ startedAt: "1/12 4:30 am", kind: "snow" }, known).ok // true
 */
export function readStormCells(cells: Cells, known: StormKnowledge): StormReading {
  const errors: Record<string, string> = {};
  const text = (column: string) => (cells[column] ?? "").trim();

  const number = (column: string, { what, max, min = 0, isWhole = false }: (typeof limits)[string]) => {
    const reading = readNumber(text(column));
    if (!reading.ok) {
      if (reading.code !== "blank") errors[column] = `Write the ${what} as a plain number, with a point for decimals.`;
      return null;
    }
    if (reading.value < min) errors[column] = `The ${what} cannot be below zero.`;
    else if (reading.value > max) errors[column] = `${text(column)} cannot be the ${what}.`;
    else if (isWhole && !Number.isInteger(reading.value)) errors[column] = `The ${what} is a whole number.`;
    return reading.value;
  };
  const time = (column: string, isNeeded: boolean) => {
    if (text(column) === "" && !isNeeded) return null;
    const read = readLocalTime(text(column), known.seasonStartYear);
    if (read === null) errors[column] = "Write day and time as in 1/12 4:30 am, or 2026-01-12 04:30.";
    return read;
  };

  const startedAt = time("startedAt", true);
  const endedAt = time("endedAt", false);
  const kind = readStormKind(text("kind"));
  if (kind === null)
    errors.kind = "Say what it was: snow, light snow, freezing rain, sleet, frost, blowing snow, other.";
  const [pavementTempF, passes, laneMilesTreated, hours] = ["pavementTempF", "passes", "laneMilesTreated", "hours"].map(
    (column) => {
      const limit = limits[column];
      return limit ? number(column, limit) : null;
    },
  );
  const truckText = text("truck");
  const truck = known.trucks.find(({ unitNumber }) => tidyTruck(unitNumber) === tidyTruck(truckText));
  if (truckText !== "" && !truck) errors.truck = `Truck ${truckText} is not in your fleet.`;
  for (const [column, most] of [
    ["route", 60],
    ["note", 300],
  ] as const) {
    if (text(column).length > most) errors[column] = `At most ${most} letters.`;
  }
  const used = known.materials.map(({ id, name, kind: material }) => {
    const what = `${material === "brine" ? "gallons" : "tons"} of ${name.toLowerCase()}`;
    const amount = number(materialColumn(id), { what, max: material === "brine" ? mostGal : mostTons });
    return {
      materialId: id,
      usedLb: material === "brine" || amount === null ? null : shortTonsToLb(amount),
      usedGal: material === "brine" ? amount : null,
    };
  });
  if (Object.keys(errors).length > 0 || startedAt === null || kind === null) return { ok: false, errors };

  const entry: StormEntry = {
    startedAt,
    endedAt,
    kind,
    pavementTempF: pavementTempF ?? null,
    passes: passes ?? null,
    laneMilesTreated: laneMilesTreated ?? null,
    hours: hours ?? null,
    truckId: truck?.id ?? null,
    route: text("route"),
    note: text("note"),
    used: used.filter(({ usedLb, usedGal }) => usedLb !== null || usedGal !== null),
  };
  const usedLb = entry.used.reduce((sum, line) => sum + (line.usedLb ?? 0), 0);
  const findings = stormFindings({ ...entry, usedLb }, known.seasonStartYear);
  const byField = (severity: "error" | "check") =>
    Object.fromEntries(
      findings.filter((one) => one.severity === severity).map(({ field, message }) => [field, message]),
    );
  const wrong = byField("error");
  return Object.keys(wrong).length > 0 ? { ok: false, errors: wrong } : { ok: true, entry, checks: byField("check") };
}

/**
 * Whether a line of the grid holds nothing yet.
 *
 * @param cells - as readStormCells takes them
 */
export function isBlankLine(cells: Cells): boolean {
  return Object.values(cells).every((text) => text.trim() === "");
}
