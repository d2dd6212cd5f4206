import { cellNumber } from "../cell-number.ts";
import { cellProblem, cellText, type FileProblem, type FileRow } from "../file-problem.ts";
import { readInches } from "../readings.ts";
import {
  type ControlKind,
  controlKinds,
  longestBody,
  longestUnitNumber,
  type SpreaderKind,
  spreaderKinds,
  type TruckFacts,
  truckLimits,
} from "./truck.ts";

/** The columns of a file of trucks, one truck a row, in the template's order. */
export const truckFileColumns = [
  "truck",
  "body",
  "spreader",
  "control",
  "lanes_per_pass",
  "working_speed_mph",
  "working_setting",
  "working_rpm",
  "gate_max_in",
  "capacity_tons",
  "in_service",
  "materials",
] as const;

const separator = ";";

export type FileTruck = TruckFacts & { materialNames: string[] };
export type KnownFleetTruck = { id: number; unitNumber: string; isInService: boolean };
export type KnownFleetMaterial = { id: number; name: string };

export type TruckKnowledge = {
  trucks: readonly KnownFleetTruck[];
  materials: readonly KnownFleetMaterial[];
  /** Whether who uploads may take a truck in or out of service. */
  maySetService: boolean;
};

export type StagedTruck = TruckFacts & {
  row: number;
  /** The truck that the row changes; null for a new one. */
  truckId: number | null;
  materialIds: number[];
};

/**
 * One truck as a row of the file, in the order of `truckFileColumns`.
 *
 * @returns texts and numbers as the import reads them back; null for what is not known
 * @example truckFileRow(truck)[0] // "12"
 */
export function truckFileRow(truck: FileTruck): (string | number | null)[] {
  return [
    truck.unitNumber,
    truck.body,
    truck.spreaderKind,
    truck.control,
    truck.lanesPerPass,
    truck.workingSpeedMph,
    truck.workingSetting,
    truck.workingRpm,
    truck.gateMaxIn,
    truck.capacityTons,
    truck.isInService ? "yes" : "no",
    truck.materialNames.join(`${separator} `),
  ];
}

function same(a: string, b: string) {
  return a.toLowerCase() === b.toLowerCase();
}

/** Takes off the apostrophe that guards a text against being read as a formula. */
function plainText(fileRow: FileRow, column: string) {
  return cellText(fileRow, column).replace(/^'(?=[=+\-@＝＋－＠])/, "");
}

type Refuse = (column: string, code: string, message: string) => void;

function readKind<Kind extends string>(fileRow: FileRow, column: string, kinds: readonly Kind[], refuse: Refuse) {
  const text = cellText(fileRow, column).toLowerCase().replace(/\s+/g, "-");
  const kind = kinds.find((candidate) => candidate === text);
  if (kind === undefined) refuse(column, `no-${column}`, `Write one of these: ${kinds.join(", ")}.`);
  return kind ?? null;
}

function readUnitNumber(fileRow: FileRow, seen: Set<string>, refuse: Refuse) {
  const unit = plainText(fileRow, "truck").replace(/^truck\s+/i, "");
  if (unit === "") refuse("truck", "blank", "Give the truck's unit number.");
  else if (unit.length > longestUnitNumber)
    refuse("truck", "too-long", `A unit number has at most ${longestUnitNumber} characters.`);
  else if (seen.has(unit.toLowerCase()))
    refuse("truck", "truck-twice", `Truck ${unit} stands in this file twice. Keep one row.`);
  seen.add(unit.toLowerCase());
  return unit;
}

function readGateMax(fileRow: FileRow, refuse: Refuse) {
  const text = cellText(fileRow, "gate_max_in");
  if (text === "") return null;
  const read = readInches(text);
  const { min, max } = truckLimits.gateMaxIn;
  if (read.ok && read.value >= min && read.value <= max) return read.value;
  refuse("gate_max_in", "not-a-gate", `Write the widest opening in inches, ${min} to ${max}, as in 4 1/2 or 4.5.`);
  return null;
}

function readService(fileRow: FileRow, known: KnownFleetTruck | null, maySetService: boolean, refuse: Refuse) {
  const text = cellText(fileRow, "in_service").toLowerCase();
  const before = known?.isInService ?? true;
  if (text === "") return before;
  const isInService = ["yes", "y", "1", "true"].includes(text);
  if (!isInService && !["no", "n", "0", "false"].includes(text)) {
    refuse("in_service", "not-yes-or-no", "Write yes or no.");
    return before;
  }
  if (isInService !== before && !maySetService) {
    refuse("in_service", "directors-own", "Only the director takes a truck in or out of service.");
  }
  return isInService;
}

function readMaterials(fileRow: FileRow, known: readonly KnownFleetMaterial[], refuse: Refuse): number[] {
  const names = plainText(fileRow, "materials")
    .split(separator)
    .map((name) => name.trim())
    .filter((name) => name !== "");
  const ids = names.flatMap((name) => known.filter((material) => same(material.name, name)).map(({ id }) => id));
  const unknown = names.filter((name) => !known.some((material) => same(material.name, name)));
  if (unknown.length > 0) {
    const yours = known.map(({ name }) => name).join(", ");
    refuse("materials", "unknown-material", `This town has no ${unknown.join(", ")}. Yours are: ${yours}.`);
  }
  return [...new Set(ids)];
}

/** The facts once both kinds are known: the rest of the row has been read, right or wrong. */
function readRow(
  fileRow: FileRow,
  known: TruckKnowledge,
  seen: Set<string>,
  problems: FileProblem[],
): StagedTruck | null {
  const before = problems.length;
  const refuse: Refuse = (column, code, message) => {
    problems.push(cellProblem(fileRow, column, code, message));
  };
  const unitNumber = readUnitNumber(fileRow, seen, refuse);
  const truck = known.trucks.find((candidate) => same(candidate.unitNumber, unitNumber)) ?? null;
  const body = plainText(fileRow, "body");
  if (body.length > longestBody) refuse("body", "too-long", `At most ${longestBody} characters.`);
  const spreaderKind: SpreaderKind | null = readKind(fileRow, "spreader", spreaderKinds, refuse);
  const control: ControlKind | null = readKind(fileRow, "control", controlKinds, refuse);
  const lanesPerPass = cellNumber(fileRow, "lanes_per_pass", truckLimits.lanesPerPass, problems);
  const workingSpeedMph = cellNumber(fileRow, "working_speed_mph", truckLimits.workingSpeedMph, problems);
  const workingSetting = cellNumber(fileRow, "working_setting", truckLimits.workingSetting, problems);
  const blank = { mayBeBlank: true };
  const workingRpm = cellNumber(fileRow, "working_rpm", { ...truckLimits.workingRpm, ...blank }, problems);
  const gateMaxIn = readGateMax(fileRow, refuse);
  const capacityTons = cellNumber(fileRow, "capacity_tons", { ...truckLimits.capacityTons, ...blank }, problems);
  const isInService = readService(fileRow, truck, known.maySetService, refuse);
  const materialIds = readMaterials(fileRow, known.materials, refuse);
  if (problems.length > before || spreaderKind === null || control === null) return null;
  if (lanesPerPass === null || workingSpeedMph === null || workingSetting === null) return null;
  return {
    row: fileRow.row,
    truckId: truck?.id ?? null,
    unitNumber: truck?.unitNumber ?? unitNumber,
    body,
    spreaderKind,
    control,
    lanesPerPass,
    workingSpeedMph,
    workingSetting,
    workingRpm,
    gateMaxIn,
    capacityTons,
    isInService,
    materialIds,
  };
}

/**
 * Trucks out of a file's rows. A row with the number of a truck that is there changes that truck; any other adds one.
 *
 * @param rows - as read, in the file's order; may be empty
 * @param known - the town's trucks and materials, and whether the reader may take trucks out of service
 * @returns every truck whose row can be read, and every problem by row and column
 */
export function readTruckRows(rows: readonly FileRow[], known: TruckKnowledge) {
  const problems: FileProblem[] = [];
  const seen = new Set<string>();
  const staged = rows.flatMap((fileRow) => readRow(fileRow, known, seen, problems) ?? []);
  return { staged, problems };
}
