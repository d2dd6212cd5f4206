import {
  materialColumn,
  stormColumns,
  stormEndColumns,
  type StormEntry,
  type StormKnowledge,
} from "#app/domain/season/storm-cells.ts";
import { stormKindWords } from "#app/domain/season/storm.ts";
import { lbToShortTons } from "#app/domain/units.ts";

export type GridColumn = {
  key: string;
  label: string;
  unit?: string;
  /** Width in rem. */
  widthRem: number;
  isNumeric?: boolean;
  hint?: string;
};

const fixed: Record<(typeof stormColumns)[number] | (typeof stormEndColumns)[number], Omit<GridColumn, "key">> = {
  startedAt: { label: "start", widthRem: 9 },
  endedAt: { label: "end", widthRem: 9 },
  kind: { label: "kind", widthRem: 7 },
  pavementTempF: { label: "pavement", unit: "°F", widthRem: 4.6, isNumeric: true },
  passes: { label: "passes", widthRem: 3.6, isNumeric: true },
  laneMilesTreated: { label: "lane miles", widthRem: 4.6, isNumeric: true },
  hours: { label: "hours", widthRem: 3.5, isNumeric: true },
  truck: { label: "truck", widthRem: 4 },
  route: { label: "route", widthRem: 5.5 },
  note: { label: "note", widthRem: 7 },
};

/** The columns of the grid and the form, a town's materials among them. */
export function gridColumns({ materials }: StormKnowledge): GridColumn[] {
  return [
    ...stormColumns.map((key) => ({ key, ...fixed[key] })),
    ...materials.map(({ id, name, kind }) => ({
      key: materialColumn(id),
      label: name.toLowerCase(),
      unit: kind === "brine" ? "gal" : "tons",
      widthRem: 4.6,
      isNumeric: true,
    })),
    ...stormEndColumns.map((key) => ({ key, ...fixed[key] })),
  ];
}

/** A figure as one would type it: no more digits than it has, no thousands. */
function plain(value: number | null) {
  return value === null ? "" : String(Number(value.toPrecision(12)));
}

/** A stored line as the texts of its cells. */
export function stormCells(storm: Omit<StormEntry, "used"> & Pick<StormEntry, "used">, known: StormKnowledge) {
  const cells: Record<string, string> = {
    startedAt: storm.startedAt,
    endedAt: storm.endedAt ?? "",
    kind: stormKindWords[storm.kind],
    pavementTempF: plain(storm.pavementTempF),
    passes: plain(storm.passes),
    laneMilesTreated: plain(storm.laneMilesTreated),
    hours: plain(storm.hours),
    truck: known.trucks.find(({ id }) => id === storm.truckId)?.unitNumber ?? "",
    route: storm.route,
    note: storm.note,
  };
  for (const { id } of known.materials) {
    const used = storm.used.find(({ materialId }) => materialId === id);
    cells[materialColumn(id)] = plain(used?.usedLb == null ? (used?.usedGal ?? null) : lbToShortTons(used.usedLb));
  }
  return cells;
}
