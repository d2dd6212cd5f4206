import { cellNumber } from "../cell-number.ts";
import { cellProblem, cellText, type FileProblem, type FileRow } from "../file-problem.ts";
import { readInches } from "../readings.ts";
import { readDay } from "../upload/read-day.ts";
import type { Catch } from "./catch-weight.ts";
import type { Count } from "./count-rate.ts";
import { calibrationFindings } from "./findings.ts";

/** The columns of a file of calibrations, one reading a row, in the template's order. */
export const calibrationFileColumns = [
  "truck",
  "material",
  "tested_on",
  "gate_opening_in",
  "reading",
  "setting",
  "revolutions",
  "seconds",
  "gross_lb",
  "tare_lb",
] as const;

export type KnownTruck = { id: number; unitNumber: string; gateMaxIn: number | null; workingSetting: number };
export type KnownMaterial = { id: number; name: string };

export type CalibrationKnowledge = {
  trucks: readonly KnownTruck[];
  materials: readonly KnownMaterial[];
  /** What the town has said that other names mean, in small letters: ids. */
  otherNames?: { truck: ReadonlyMap<string, number>; material: ReadonlyMap<string, number> };
  /** `truckId|materialId|testedOn|gateOpeningIn` of what is stored already. */
  storedKeys: ReadonlySet<string>;
  /** Local date of today: a test cannot lie in the future. */
  today: string;
};

export type StagedCalibration = {
  row: number;
  truckId: number;
  unitNumber: string;
  materialId: number;
  materialName: string;
  testedOn: string;
  gateOpeningIn: number;
  counts: Count[];
  catches: Catch[];
};

/** What makes two readings one calibration: the truck, the material, the day and the gate. */
export function calibrationKey(truckId: number, materialId: number, testedOn: string, gateOpeningIn: number): string {
  return [truckId, materialId, testedOn, gateOpeningIn.toFixed(4)].join("|");
}

function sameName(a: string, b: string) {
  return a.toLowerCase() === b.toLowerCase();
}

function list(names: readonly string[]) {
  return names.length <= 12 ? names.join(", ") : `${names.slice(0, 12).join(", ")} and others`;
}

function readHead(fileRow: FileRow, known: CalibrationKnowledge, problems: FileProblem[]) {
  const refuse = (column: string, code: string, message: string) => {
    problems.push(cellProblem(fileRow, column, code, message));
  };
  const unit = cellText(fileRow, "truck").replace(/^truck\s+/i, "");
  const truckId = known.otherNames?.truck.get(cellText(fileRow, "truck").toLowerCase());
  const truck = known.trucks.find(({ id, unitNumber }) => id === truckId || sameName(unitNumber, unit));
  if (!truck) {
    const names = list(known.trucks.map((candidate) => candidate.unitNumber));
    refuse("truck", "unknown-truck", `No truck of this town has that number. Yours are: ${names}.`);
  }
  const materialText = cellText(fileRow, "material");
  const materialId = known.otherNames?.material.get(materialText.toLowerCase());
  const material = known.materials.find(({ id, name }) => id === materialId || sameName(name, materialText));
  if (!material) {
    const names = list(known.materials.map((candidate) => candidate.name));
    refuse("material", "unknown-material", `This town has no such material. Yours are: ${names}.`);
  }
  const dayRead = readDay(cellText(fileRow, "tested_on"), fileRow.style?.dateOrder ?? "month-first");
  const isDay = dayRead.ok;
  const testedOn = dayRead.ok ? dayRead.day : "";
  if (!isDay) refuse("tested_on", "not-a-date", "Write the day as year-month-day, as in 2026-10-09.");
  else if (testedOn > known.today) refuse("tested_on", "future", "This day has not come yet.");
  const gate = readInches(cellText(fileRow, "gate_opening_in"));
  const isGate = gate.ok && gate.value > 0 && gate.value <= 24;
  if (!isGate) refuse("gate_opening_in", "not-a-gate", "Write the measured opening in inches, as in 1 7/8 or 1.875.");
  if (!truck || !material || !isDay || testedOn > known.today || !isGate) return null;
  return { truck, material, testedOn, gateOpeningIn: gate.value };
}

function readReading(fileRow: FileRow, problems: FileProblem[]): { count: Count } | { caught: Catch } | null {
  const before = problems.length;
  const turns = { what: "revolutions", min: 0.25, max: 5000 };
  switch (cellText(fileRow, "reading").toLowerCase()) {
    case "count": {
      const setting = cellNumber(
        fileRow,
        "setting",
        { what: "feed setting", min: 1, max: 40, isWhole: true },
        problems,
      );
      const revolutions = cellNumber(fileRow, "revolutions", turns, problems);
      const seconds = cellNumber(fileRow, "seconds", { what: "seconds counted", min: 5, max: 3600 }, problems);
      if (problems.length > before || setting === null || revolutions === null || seconds === null) return null;
      return { count: { setting, revolutions, seconds } };
    }
    case "catch": {
      const revolutions = cellNumber(fileRow, "revolutions", turns, problems);
      const grossLb = cellNumber(
        fileRow,
        "gross_lb",
        { what: "gross weight, lb", min: 0, max: 5000, unit: "lb" },
        problems,
      );
      const tare = cellNumber(
        fileRow,
        "tare_lb",
        { what: "tare weight, lb", min: 0, max: 5000, unit: "lb", mayBeBlank: true },
        problems,
      );
      const tareLb = tare ?? 0;
      if (problems.length > before || revolutions === null || grossLb === null) return null;
      if (tareLb >= grossLb) {
        const message = "The empty container weighs as much as the full one. Check the two weights.";
        problems.push(cellProblem(fileRow, "tare_lb", "tare-above-gross", message));
        return null;
      }
      return { caught: { revolutions, grossLb, tareLb } };
    }
    default:
      problems.push(cellProblem(fileRow, "reading", "not-a-reading", "Write count or catch."));
      return null;
  }
}

function wholeProblems(staged: StagedCalibration, known: CalibrationKnowledge): FileProblem[] {
  const truck = known.trucks.find((candidate) => candidate.id === staged.truckId);
  const name = `Truck ${staged.unitNumber}, ${staged.materialName}, ${staged.testedOn}`;
  const at = { row: staged.row, column: null, value: null };
  const problems: FileProblem[] = [];
  const missing = [staged.counts.length === 0 ? "counts" : null, staged.catches.length === 0 ? "a catch" : null].filter(
    (part) => part !== null,
  );
  if (missing.length > 0) {
    const message = `${name}: ${missing.join(" and ")} missing. A calibration needs at least one count and one catch.`;
    return [{ ...at, code: "incomplete", severity: "error", message }];
  }
  const findings = calibrationFindings({
    counts: staged.counts,
    catches: staged.catches,
    gateOpeningIn: staged.gateOpeningIn,
    gateMaxIn: truck?.gateMaxIn ?? null,
    workingSetting: truck?.workingSetting ?? null,
  });
  for (const { code, severity, message } of findings)
    problems.push({ ...at, code, severity, message: `${name}: ${message}` });
  const key = calibrationKey(staged.truckId, staged.materialId, staged.testedOn, staged.gateOpeningIn);
  if (known.storedKeys.has(key)) {
    problems.push({
      ...at,
      code: "stored-already",
      severity: "error",
      message: `${name} is stored already, with this gate.`,
    });
  }
  return problems;
}

/**
 * Calibrations out of a file's rows: rows with the same truck, material, day and gate are one calibration.
 *
 * @param rows - as read, in the file's order; may be empty
 * @param known - the town's trucks and materials, and what is stored
 * @returns every calibration whose rows are all readable, and every problem by row and column
 */
export function readCalibrationRows(rows: readonly FileRow[], known: CalibrationKnowledge) {
  const problems: FileProblem[] = [];
  const byKey = new Map<string, StagedCalibration>();
  for (const fileRow of rows) {
    const head = readHead(fileRow, known, problems);
    const reading = readReading(fileRow, problems);
    if (!head || !reading) continue;
    const { truck, material, testedOn, gateOpeningIn } = head;
    const key = calibrationKey(truck.id, material.id, testedOn, gateOpeningIn);
    const staged = byKey.get(key) ?? {
      row: fileRow.row,
      truckId: truck.id,
      unitNumber: truck.unitNumber,
      materialId: material.id,
      materialName: material.name,
      testedOn,
      gateOpeningIn,
      counts: [],
      catches: [],
    };
    byKey.set(key, staged);
    if ("caught" in reading) staged.catches.push(reading.caught);
    else if (staged.counts.some((other) => other.setting === reading.count.setting)) {
      problems.push(
        cellProblem(fileRow, "setting", "counted-twice", "This setting is counted twice for the same calibration."),
      );
    } else staged.counts.push(reading.count);
  }
  const staged = [...byKey.values()];
  for (const calibration of staged) problems.push(...wholeProblems(calibration, known));
  return { staged, problems };
}
