import { cellNumber } from "../cell-number.ts";
import { cellProblem, cellText, type FileProblem, type FileRow } from "../file-problem.ts";
import type { UploadField } from "../upload/field.ts";
import { convertMeasure, dimensionOf, type MeasureUnit, splitMeasure, unitNamed } from "../upload/measure.ts";
import { lbPerCubicYardOf } from "./bulk-density.ts";
import { type NameList, named, someNames } from "./name-lists.ts";
import { type OpenSeason, seasonOfDay } from "./season-days.ts";
import type { SpreadMaterial } from "./storm-fields.ts";
import { cellDay } from "./storm-times.ts";

export const stockKinds = ["opening", "delivery", "transfer-in", "transfer-out", "closing"] as const;
export type StockKind = (typeof stockKinds)[number];

/** How a page names the kind. */
export const stockKindWords: Record<StockKind, string> = {
  opening: "opening stock, measured",
  delivery: "delivery",
  "transfer-in": "transfer in",
  "transfer-out": "transfer out",
  closing: "closing stock, measured",
};

const otherKinds: Record<string, StockKind> = {
  open: "opening",
  start: "opening",
  beginning: "opening",
  carryover: "opening",
  "carry over": "opening",
  "opening stock": "opening",
  delivered: "delivery",
  deliveries: "delivery",
  received: "delivery",
  receipt: "delivery",
  purchase: "delivery",
  purchased: "delivery",
  "transfer from": "transfer-in",
  borrowed: "transfer-in",
  "transfer to": "transfer-out",
  lent: "transfer-out",
  loaned: "transfer-out",
  close: "closing",
  end: "closing",
  ending: "closing",
  "closing stock": "closing",
};

/** Columns of a stock file, in the template's order. */
export const stockFields: readonly UploadField[] = [
  { key: "day", label: "day", names: ["day", "date", "delivery date", "ticket date"], holds: "day", need: "always" },
  {
    key: "kind",
    label: "what happened",
    names: ["what", "kind", "type", "transaction", "transaction type", "entry", "entry type"],
    holds: "text",
    need: "always",
  },
  {
    key: "material",
    label: "material",
    names: ["material", "product", "item"],
    holds: "text",
    need: "always",
  },
  {
    key: "quantity",
    label: "quantity",
    names: ["tons", "quantity", "amount", "net tons", "net weight", "weight", "qty", "delivered"],
    holds: "figure",
    dimensions: ["weight"],
    unit: "ton",
    need: "always",
  },
  {
    key: "unit",
    label: "unit of the quantity",
    names: ["unit", "uom", "unit of measure", "units"],
    holds: "text",
  },
  {
    key: "price_usd",
    label: "price, dollars",
    names: ["price usd", "price", "cost", "total cost", "total price", "amount usd", "total"],
    holds: "figure",
  },
  {
    key: "supplier",
    label: "supplier",
    names: ["supplier", "vendor", "hauler", "from", "note", "notes"],
    holds: "text",
  },
];

export const stockTemplate = ["day", "what", "material", "tons", "price_usd", "supplier"];

export type StockKnowledge = {
  materials: ReadonlyMap<number, SpreadMaterial>;
  materialNames: NameList<number>;
  seasons: ReadonlyMap<number, OpenSeason>;
  today: string;
};

export type StagedStock = {
  seasonStartYear: number;
  day: string;
  kind: StockKind;
  materialId: number;
  quantityLb: number;
  typedQuantity: number;
  typedUnit: "ton" | "lb" | "kg" | "tonne" | "cubic-yard";
  lbPerCubicYard: number | null;
  priceCents: number | null;
  supplier: string;
};

/** The kind of entry that a word means, or null. @example stockKindNamed("Received") // "delivery" */
export function stockKindNamed(text: string): StockKind | null {
  const word = text
    .trim()
    .toLowerCase()
    .replace(/[\s_-]+/g, " ");
  return stockKinds.find((kind) => kind.replace("-", " ") === word) ?? otherKinds[word] ?? null;
}

function isWeight(unit: MeasureUnit): unit is StagedStock["typedUnit"] {
  return dimensionOf(unit) === "weight";
}

function readMaterial(fileRow: FileRow, known: StockKnowledge, problems: FileProblem[]): SpreadMaterial | null {
  const text = cellText(fileRow, "material");
  const materialId = named(known.materialNames, text);
  const material = materialId === undefined ? undefined : known.materials.get(materialId);
  if (!material) {
    const message = `This town has no such material. Yours are: ${someNames(known.materialNames.names)}.`;
    problems.push(cellProblem(fileRow, "material", "unknown-material", message));
    return null;
  }
  if (material.kind === "brine") {
    const message = `${material.name} is a liquid; stock is kept of what lies in a pile.`;
    problems.push(cellProblem(fileRow, "material", "liquid-stock", message));
    return null;
  }
  return material;
}

function readQuantity(fileRow: FileRow, material: SpreadMaterial, problems: FileProblem[]) {
  const text = cellText(fileRow, "quantity");
  const unitText = cellText(fileRow, "unit");
  const rowUnit = unitText === "" ? null : unitNamed(unitText);
  if (unitText !== "" && rowUnit === null) {
    const message = "This unit is not known here. Write tons, lb, kg, tonnes or cubic yards.";
    problems.push(cellProblem(fileRow, "unit", "unknown-unit", message));
    return null;
  }
  const written = splitMeasure(text).unit;
  const unit = (written === "unknown" ? null : written) ?? rowUnit ?? fileRow.style?.units.get("quantity") ?? "ton";
  if (!isWeight(unit)) {
    problems.push(cellProblem(fileRow, "quantity", "other-unit", "Stock is weighed, or measured in cubic yards."));
    return null;
  }
  const lbPerCubicYard = lbPerCubicYardOf[material.kind];
  const asTyped = { what: "quantity", min: 0, max: 1_000_000_000, unit, lbPerCubicYard } as const;
  const style = fileRow.style ?? { decimalMark: "point", dateOrder: "month-first", units: new Map() };
  const unitless = { ...fileRow, style: { ...style, units: new Map([["quantity", unit]]) } };
  const typedQuantity = cellNumber(unitless, "quantity", asTyped, problems);
  if (typedQuantity === null) return null;
  const quantityLb = convertMeasure(typedQuantity, unit, "lb", lbPerCubicYard);
  if (quantityLb > 1_000_000_000) {
    const message = `${text.slice(0, 40)} is more than any town could have. Is the unit right?`;
    problems.push(cellProblem(fileRow, "quantity", "absurd", message));
    return null;
  }
  return { typedQuantity, typedUnit: unit, quantityLb, lbPerCubicYard: unit === "cubic-yard" ? lbPerCubicYard : null };
}

/**
 * One entry of the stock out of one row.
 *
 * @returns the entry in storage units when the row has no error, and every problem by column
 */
export function readStockRow(
  fileRow: FileRow,
  known: StockKnowledge,
): { staged: StagedStock | null; problems: FileProblem[] } {
  const problems: FileProblem[] = [];
  const date = cellDay(fileRow, "day", problems);
  if (date === null && problems.length === 0) problems.push(cellProblem(fileRow, "day", "blank", "Give the day."));
  const season = date === null ? null : seasonOfDay(date.day, known.seasons, known.today);
  if (season && !season.ok) problems.push(cellProblem(fileRow, "day", season.code, season.message));
  const kindText = cellText(fileRow, "kind");
  const kind = stockKindNamed(kindText);
  if (kind === null) {
    const message = "Write opening, delivery, transfer in, transfer out or closing.";
    problems.push(cellProblem(fileRow, "kind", kindText === "" ? "blank" : "unknown-entry", message));
  }
  const material = readMaterial(fileRow, known, problems);
  const quantity = material === null ? null : readQuantity(fileRow, material, problems);
  const price = { what: "price, dollars", min: 0, max: 20_000_000, sign: "$", mayBeBlank: true } as const;
  const priceUsd = cellNumber(fileRow, "price_usd", price, problems);
  const hasError = problems.some(({ severity }) => severity === "error");
  if (hasError || !season?.ok || date === null || kind === null || material === null || quantity === null) {
    return { staged: null, problems };
  }
  const staged: StagedStock = {
    seasonStartYear: season.seasonStartYear,
    day: date.day,
    kind,
    materialId: material.id,
    ...quantity,
    priceCents: priceUsd === null ? null : Math.round(priceUsd * 100),
    supplier: cellText(fileRow, "supplier").slice(0, 80),
  };
  return { staged, problems };
}
