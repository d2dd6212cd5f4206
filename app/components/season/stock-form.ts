import { cellNumber } from "#app/domain/cell-number.ts";
import { isLocalDate, seasonEnd, seasonLabel, seasonStart } from "#app/domain/dates.ts";
import type { FileProblem } from "#app/domain/file-problem.ts";
import { isStockKind, type StockKind } from "#app/domain/season/stock-balance.ts";
import { isStockUnit, possibleLbPerCubicYard, type StockUnit } from "#app/domain/season/stock-quantity.ts";

export const stockKindWords: Record<StockKind, string> = {
  opening: "measured opening",
  delivery: "delivery",
  "transfer-in": "transfer from another town or yard",
  "transfer-out": "transfer to another town or yard",
  closing: "measured closing",
};

export const stockUnitWords: Record<StockUnit, string> = {
  ton: "tons (2,000 lb)",
  lb: "lb",
  kg: "kg",
  tonne: "tonnes (1,000 kg)",
  "cubic-yard": "cubic yards",
};

export type StockReading =
  | {
      ok: true;
      entry: {
        clientRef: string;
        materialId: number;
        kind: StockKind;
        day: string;
        typedQuantity: number;
        typedUnit: StockUnit;
        lbPerCubicYard: number | null;
        priceCents: number | null;
        supplier: string;
      };
    }
  | { ok: false; errors: Record<string, string> };

/**
 * What somebody wrote down of a pile.
 *
 * @param values - texts by field
 * @returns the entry in the unit it was typed in, or what is wrong by field
 */
export function readStockForm(values: Readonly<Record<string, string>>, seasonStartYear: number): StockReading {
  const problems: FileProblem[] = [];
  const row = { row: 0, cells: new Map(Object.entries(values)) };
  const { materialId = "", kind = "", day = "", typedUnit = "", supplier = "", clientRef = "" } = values;
  const quantity = cellNumber(row, "typedQuantity", { what: "quantity", min: 0, max: 1_000_000_000 }, problems);
  const density =
    typedUnit === "cubic-yard"
      ? cellNumber(row, "lbPerCubicYard", { what: "weight of a cubic yard, lb", ...possibleLbPerCubicYard }, problems)
      : null;
  const priceUsd =
    kind === "delivery"
      ? cellNumber(row, "priceUsd", { what: "price", min: 0, max: 20_000_000, mayBeBlank: true }, problems)
      : null;
  const errors = Object.fromEntries(problems.map(({ column, message }) => [column ?? "", message]));
  if (!/^[1-9]\d{0,9}$/.test(materialId)) errors.materialId = "Choose a material.";
  if (!isStockKind(kind)) errors.kind = "Choose what happened.";
  if (!isLocalDate(day)) errors.day = "Give the day, as in 2026-01-12.";
  else if (day < seasonStart(seasonStartYear) || day > seasonEnd(seasonStartYear)) {
    errors.day = `That day is outside ${seasonLabel(seasonStartYear)}.`;
  }
  if (!isStockUnit(typedUnit)) errors.typedUnit = "Choose the unit.";
  if (supplier.length > 80) errors.supplier = "At most 80 letters.";
  if (!/^[0-9a-f-]{36}$/.test(clientRef)) errors.typedQuantity ??= "Reload the page, and write it down again.";
  if (Object.keys(errors).length > 0 || quantity === null || !isStockKind(kind) || !isStockUnit(typedUnit)) {
    return { ok: false, errors };
  }
  return {
    ok: true,
    entry: {
      clientRef,
      materialId: Number(materialId),
      kind,
      day,
      typedQuantity: quantity,
      typedUnit,
      lbPerCubicYard: density,
      priceCents: priceUsd === null ? null : Math.round(priceUsd * 100),
      supplier: supplier.trim(),
    },
  };
}
