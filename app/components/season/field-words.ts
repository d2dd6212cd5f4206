import type { FigureField } from "#app/domain/season/figure-fields.ts";
import { formatDollars, formatOneDecimal, formatShareOneDecimal, formatTons, formatWhole } from "#app/lib/format.ts";

/** A figure of one field in the units people read, from storage units. "–" where it is not reported. */
export function fieldFigure(field: Exclude<FigureField, "stock">, value: number | null): string {
  switch (field) {
    case "laneMiles":
      return formatOneDecimal(value);
    case "eventCount":
    case "brineGal":
      return formatWhole(value);
    case "mixSaltShare":
      return formatShareOneDecimal(value);
    case "materialCostCents":
      return formatDollars(value);
    default:
      return formatTons(value);
  }
}
