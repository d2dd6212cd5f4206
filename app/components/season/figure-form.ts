import { cellNumber } from "#app/domain/cell-number.ts";
import type { FileProblem } from "#app/domain/file-problem.ts";
import type { SeasonAmounts } from "#app/domain/season/season-totals.ts";
import { lbToShortTons, shortTonsToLb } from "#app/domain/units.ts";

/** The fields of the form in the units people write in, and the order they are asked. */
export const figureFormFields = [
  { name: "laneMiles", label: "Lane miles" },
  { name: "eventCount", label: "Events" },
  { name: "saltLb", label: "Salt", unit: "tons" },
  { name: "mixLb", label: "Sand and salt mix", unit: "tons" },
  { name: "mixSaltShare", label: "Salt in the mix", unit: "%", isOptional: true },
  { name: "sandLb", label: "Sand and grit", unit: "tons" },
  { name: "brineGal", label: "Brine", unit: "gallons", isOptional: true },
  { name: "wettedSaltLb", label: "Salt wetted when spread", unit: "tons", isOptional: true },
  { name: "materialCostCents", label: "Material cost", unit: "dollars", isOptional: true },
] as const;
export type FigureFormName = (typeof figureFormFields)[number]["name"];

export type FigureFormValues = Record<FigureFormName, string>;
export type FigureAmounts = {
  [Name in keyof SeasonAmounts]: SeasonAmounts[Name] | null;
} & { wettedSaltLb: number | null };

function plain(value: number | null, digits: number) {
  return value === null ? "" : String(Number(value.toFixed(digits)));
}

/** Amounts in storage units as the texts of the form: tons to a tenth of a hundredth, cost to the dollar. */
export function figureFormValues(amounts: FigureAmounts): FigureFormValues {
  const tons = (weightLb: number | null) => plain(weightLb === null ? null : lbToShortTons(weightLb), 2);
  return {
    laneMiles: plain(amounts.laneMiles, 2),
    eventCount: plain(amounts.eventCount, 0),
    saltLb: tons(amounts.saltLb),
    mixLb: tons(amounts.mixLb),
    mixSaltShare: plain(amounts.mixSaltShare === null ? null : amounts.mixSaltShare * 100, 2),
    sandLb: tons(amounts.sandLb),
    brineGal: plain(amounts.brineGal, 0),
    wettedSaltLb: tons(amounts.wettedSaltLb),
    materialCostCents: plain(amounts.materialCostCents === null ? null : amounts.materialCostCents / 100, 0),
  };
}

const mostTons = 500_000;

export type FigureReading =
  { ok: true; amounts: SeasonAmounts; wettedSaltLb: number | null } | { ok: false; errors: Record<string, string> };

/**
 * The figures somebody typed, in storage units.
 *
 * @param values - texts by field, as figureFormValues writes them
 * @returns the amounts, or what is wrong by field
 */
export function readFigureForm(values: Readonly<Record<string, string>>): FigureReading {
  const problems: FileProblem[] = [];
  const row = { row: 0, cells: new Map(Object.entries(values)) };
  const read = (name: FigureFormName, limits: Parameters<typeof cellNumber>[2]) =>
    cellNumber(row, name, limits, problems);
  const laneMiles = read("laneMiles", { what: "lane miles", min: 0.1, max: 10_000 });
  const eventCount = read("eventCount", { what: "number of events", min: 0, max: 120, isWhole: true });
  const saltTons = read("saltLb", { what: "tons of salt", min: 0, max: mostTons });
  const mixTons = read("mixLb", { what: "tons of mix", min: 0, max: mostTons });
  const mixPercent = read("mixSaltShare", {
    what: "salt in the mix, percent",
    min: 0,
    max: 100,
    mayBeBlank: mixTons === 0 || mixTons === null,
  });
  const sandTons = read("sandLb", { what: "tons of sand and grit", min: 0, max: mostTons });
  const brineGal = read("brineGal", { what: "gallons of brine", min: 0, max: 50_000_000, mayBeBlank: true });
  const wettedTons = read("wettedSaltLb", { what: "tons of wetted salt", min: 0, max: mostTons, mayBeBlank: true });
  const costUsd = read("materialCostCents", { what: "material cost", min: 0, max: 40_000_000, mayBeBlank: true });
  const errors = Object.fromEntries(problems.map(({ column, message }) => [column ?? "", message]));
  if (wettedTons !== null && saltTons !== null && mixTons !== null && wettedTons > saltTons + mixTons) {
    errors.wettedSaltLb = "More salt was wetted than was used at all. Check the tons.";
  }
  if (Object.keys(errors).length > 0 || laneMiles === null || eventCount === null) return { ok: false, errors };
  return {
    ok: true,
    amounts: {
      laneMiles,
      eventCount,
      saltLb: shortTonsToLb(saltTons ?? 0),
      mixLb: shortTonsToLb(mixTons ?? 0),
      mixSaltShare: mixTons === 0 || mixPercent === null ? null : mixPercent / 100,
      sandLb: shortTonsToLb(sandTons ?? 0),
      brineGal,
      materialCostCents: costUsd === null ? null : Math.round(costUsd * 100),
    },
    wettedSaltLb: wettedTons === null ? null : shortTonsToLb(wettedTons),
  };
}
