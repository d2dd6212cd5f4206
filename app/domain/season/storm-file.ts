import { cellNumber } from "../cell-number.ts";
import { cellProblem, cellText, type FileProblem, type FileRow } from "../file-problem.ts";
import { lbPerShortTon } from "../units.ts";
import { splitMeasure, unitNamed } from "../upload/measure.ts";
import { lbPerCubicYardOf } from "./bulk-density.ts";
import { type NameList, named, someNames, truckNamed } from "./name-lists.ts";
import type { OpenSeason } from "./season-days.ts";
import { type SpreadMaterial, usedKey } from "./storm-fields.ts";
import { type StormKind, stormKindNamed } from "./storm-kind.ts";
import { readStormTimes } from "./storm-times.ts";

export type LoggedTruck = { id: number; unitNumber: string; capacityTons: number | null };

/** What is known of the town before its storm log is read. */
export type StormKnowledge = {
  townName: string;
  trucks: ReadonlyMap<number, LoggedTruck>;
  materials: ReadonlyMap<number, SpreadMaterial>;
  truckNames: NameList<number>;
  materialNames: NameList<number>;
  /** What the town has said that words for storms mean. */
  kindNames: NameList<StormKind>;
  seasons: ReadonlyMap<number, OpenSeason>;
  /** The town's own date. */
  today: string;
};

/** One line of a storm log in storage units. Times are the town's own: "2026-01-05 06:30:00". */
export type StagedStorm = {
  seasonStartYear: number;
  startedAt: string;
  endedAt: string | null;
  kind: StormKind;
  pavementTempF: number | null;
  passes: number | null;
  laneMilesTreated: number | null;
  hours: number | null;
  truckId: number | null;
  route: string;
  note: string;
  uses: { materialId: number; usedLb: number | null; usedGal: number | null }[];
};

type Use = StagedStorm["uses"][number];

/** Common practice, without a source: a truck that goes out more than ten times full in one storm is a slip of the pen. */
const mostLoads = 10;
/** Used where no truck of the town has its load recorded. */
const usualLoadTons = 15;
/** Common practice, without a source: rates run to a few hundred pounds; ten times that is another unit. */
const mostLbPerLaneMile = 3000;

const limits = { routeCharacters: 60, noteCharacters: 300 };

function readTruck(fileRow: FileRow, known: StormKnowledge, problems: FileProblem[]): number | null {
  const text = cellText(fileRow, "truck");
  if (text === "") return null;
  const truckId = truckNamed(known.truckNames, text);
  if (truckId !== undefined) return truckId;
  const message = `No truck of this town has that number. Yours are: ${someNames(known.truckNames.names)}.`;
  problems.push(cellProblem(fileRow, "truck", "unknown-truck", message));
  return null;
}

function readKind(fileRow: FileRow, known: StormKnowledge, problems: FileProblem[]): StormKind {
  const text = cellText(fileRow, "kind");
  if (text === "") return "other";
  const kind = stormKindNamed(text) ?? named(known.kindNames, text);
  if (kind !== undefined) return kind;
  const message = "This is no kind of storm that is known here, so the row counts as “other”.";
  problems.push(cellProblem(fileRow, "kind", "unknown-kind", message, "check"));
  return "other";
}

function readUse(
  fileRow: FileRow,
  column: string,
  material: SpreadMaterial,
  problems: FileProblem[],
): Use | "blank" | null {
  const isLiquid = material.kind === "brine";
  const text = cellText(fileRow, column);
  if (text === "" || text === "-") return "blank";
  const what = `amount of ${material.name}`;
  const base = { what, min: 0, lbPerCubicYard: lbPerCubicYardOf[material.kind] };
  if (isLiquid) {
    const usedGal = cellNumber(fileRow, column, { ...base, max: 5_000_000, unit: "gal" }, problems);
    return usedGal === null ? null : { materialId: material.id, usedLb: null, usedGal };
  }
  const usedLb = cellNumber(fileRow, column, { ...base, max: 200_000_000, unit: "lb" }, problems);
  return usedLb === null ? null : { materialId: material.id, usedLb, usedGal: null };
}

/** The use of the material that the row itself names, beside a quantity. */
function readNamedUse(fileRow: FileRow, known: StormKnowledge, problems: FileProblem[]): Use | "blank" | null {
  const name = cellText(fileRow, "material");
  const quantity = cellText(fileRow, "quantity");
  if (quantity === "") return "blank";
  if (name === "") {
    problems.push(cellProblem(fileRow, "material", "blank", "Say which material this quantity is of."));
    return null;
  }
  const materialId = named(known.materialNames, name);
  const material = materialId === undefined ? undefined : known.materials.get(materialId);
  if (!material) {
    const message = `This town has no such material. Yours are: ${someNames(known.materialNames.names)}.`;
    problems.push(cellProblem(fileRow, "material", "unknown-material", message));
    return null;
  }
  const unitText = cellText(fileRow, "unit");
  if (unitText === "" || splitMeasure(quantity).unit !== null) return readUse(fileRow, "quantity", material, problems);
  const unit = unitNamed(unitText);
  if (unit === null) {
    const message = "This unit is not known here. Write lb, tons, kg, tonnes, cubic yards or gallons.";
    problems.push(cellProblem(fileRow, "unit", "unknown-unit", message));
    return null;
  }
  const style = fileRow.style ?? { decimalMark: "point", dateOrder: "month-first", units: new Map() };
  const units = new Map(style.units).set("quantity", unit);
  return readUse({ ...fileRow, style: { ...style, units } }, "quantity", material, problems);
}

function readUses(fileRow: FileRow, known: StormKnowledge, problems: FileProblem[]): Use[] {
  const uses: Use[] = [];
  let isAnyGiven = false;
  for (const material of known.materials.values()) {
    const column = usedKey(material.id);
    if (!fileRow.cells.has(column)) continue;
    const use = readUse(fileRow, column, material, problems);
    if (use !== "blank") isAnyGiven = true;
    if (use !== "blank" && use !== null) uses.push(use);
  }
  const namedUse = readNamedUse(fileRow, known, problems);
  if (namedUse !== "blank") isAnyGiven = true;
  if (namedUse !== "blank" && namedUse !== null) {
    if (uses.some(({ materialId }) => materialId === namedUse.materialId)) {
      problems.push(cellProblem(fileRow, "material", "material-twice", "This material has a column of its own, too."));
    } else uses.push(namedUse);
  }
  if (!isAnyGiven) {
    const message = "No material is given in this row. It is kept as a storm without spreading.";
    problems.push({ row: fileRow.row, column: null, value: null, code: "no-material", severity: "check", message });
  }
  return uses;
}

/** The column whose figure was read into that use. */
function columnOf(fileRow: FileRow, use: Use) {
  const own = usedKey(use.materialId);
  return cellText(fileRow, own) === "" ? "quantity" : own;
}

function loadTons(known: StormKnowledge, truckId: number | null) {
  const capacities = [...known.trucks.values()].flatMap(({ capacityTons }) => capacityTons ?? []);
  const largest = capacities.length === 0 ? usualLoadTons : Math.max(...capacities);
  if (truckId !== null) return known.trucks.get(truckId)?.capacityTons ?? largest;
  // A row without a truck may stand for the whole fleet.
  return largest * Math.max(1, known.trucks.size);
}

function checkAmounts(fileRow: FileRow, storm: StagedStorm, known: StormKnowledge, problems: FileProblem[]) {
  const mostLb = loadTons(known, storm.truckId) * lbPerShortTon * mostLoads;
  for (const use of storm.uses) {
    if (use.usedLb === null || use.usedLb <= mostLb) continue;
    const column = columnOf(fileRow, use);
    const asPounds = use.usedLb / lbPerShortTon;
    const holds = Math.round(mostLb / mostLoads / lbPerShortTon);
    const unit = splitMeasure(cellText(fileRow, column)).unit ?? fileRow.style?.units.get(column) ?? "ton";
    if (unit === "ton" && asPounds <= mostLb) {
      const message = `This would be more than ten loads of ${holds} tons. Read as pounds it fits.`;
      problems.push(cellProblem(fileRow, column, "tons-or-pounds", message, "check"));
    } else {
      const message = `This is more than ten loads of ${holds} tons. Is the figure right?`;
      problems.push(cellProblem(fileRow, column, "very-heavy", message, "check"));
    }
    return;
  }
  const totalLb = storm.uses.reduce((sum, { usedLb }) => sum + (usedLb ?? 0), 0);
  const miles = (storm.laneMilesTreated ?? 0) * Math.max(1, storm.passes ?? 1);
  if (miles > 0 && totalLb / miles > mostLbPerLaneMile) {
    const perMile = Math.round(totalLb / miles).toLocaleString("en-US");
    const message = `This comes to ${perMile} lb on each lane mile and pass. Are the lane miles right?`;
    problems.push(cellProblem(fileRow, "lane_miles", "very-dense", message, "check"));
  }
}

function shortText(fileRow: FileRow, column: string, most: number, problems: FileProblem[]) {
  const text = cellText(fileRow, column);
  if (text.length <= most) return text;
  const message = `Only the first ${most} characters of this are kept.`;
  problems.push(cellProblem(fileRow, column, "long-text", message, "check"));
  return text.slice(0, most);
}

/**
 * One line of a storm log out of one row.
 *
 * @param known - the town's trucks, materials and seasons
 * @returns the line in storage units when the row has no error, and every problem by column. A check leaves the line
 *   standing.
 */
export function readStormRow(
  fileRow: FileRow,
  known: StormKnowledge,
): { staged: StagedStorm | null; problems: FileProblem[] } {
  const problems: FileProblem[] = [];
  const town = cellText(fileRow, "town");
  if (town !== "" && town.toLowerCase().replace(/^(?:town|city|village) of /, "") !== known.townName.toLowerCase()) {
    problems.push(cellProblem(fileRow, "town", "other-town", `This row is of another town than ${known.townName}.`));
  }
  const times = readStormTimes(fileRow, known.seasons, known.today, problems);
  const count = { min: 0, mayBeBlank: true };
  const temperature = { what: "pavement temperature", min: -60, max: 150, unit: "degF", mayBeBlank: true } as const;
  const pavementTempF = cellNumber(fileRow, "pavement_temp_f", temperature, problems);
  const passes = cellNumber(fileRow, "passes", { what: "passes", ...count, max: 500, isWhole: true }, problems);
  const miles = { what: "lane miles treated", ...count, max: 20_000, unit: "mile" } as const;
  const laneMilesTreated = cellNumber(fileRow, "lane_miles", miles, problems);
  const hours = cellNumber(fileRow, "hours", { what: "hours", ...count, max: 5000 }, problems);
  const truckId = readTruck(fileRow, known, problems);
  const kind = readKind(fileRow, known, problems);
  const uses = readUses(fileRow, known, problems);
  const route = shortText(fileRow, "route", limits.routeCharacters, problems);
  const note = shortText(fileRow, "note", limits.noteCharacters, problems);
  if (!times || problems.some(({ severity }) => severity === "error")) return { staged: null, problems };
  const staged: StagedStorm = {
    ...times,
    kind,
    pavementTempF,
    passes,
    laneMilesTreated,
    hours,
    truckId,
    route,
    note,
    uses,
  };
  checkAmounts(fileRow, staged, known, problems);
  return { staged, problems };
}
