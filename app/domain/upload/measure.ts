import {
  inchesToMm,
  kgToLb,
  kmToMiles,
  lbToKg,
  lbToShortTons,
  litresToGallons,
  gallonsToLitres,
  milesToKm,
  mmToInches,
  shortTonsToLb,
} from "../units.ts";

/** Units that a file may be written in. */
export const measureUnits = [
  "ton",
  "lb",
  "kg",
  "tonne",
  "cubic-yard",
  "gal",
  "litre",
  "degF",
  "degC",
  "mile",
  "km",
  "inch",
  "mm",
] as const;
export type MeasureUnit = (typeof measureUnits)[number];
export type Dimension = "weight" | "liquid" | "temperature" | "distance" | "length";

const dimensions: Record<MeasureUnit, Dimension> = {
  ton: "weight",
  lb: "weight",
  kg: "weight",
  tonne: "weight",
  "cubic-yard": "weight",
  gal: "liquid",
  litre: "liquid",
  degF: "temperature",
  degC: "temperature",
  mile: "distance",
  km: "distance",
  inch: "length",
  mm: "length",
};

/** How a sentence or a choice names the unit. A cubic yard counts as a weight: its density is always stated beside it. */
export const unitWords: Record<MeasureUnit, string> = {
  ton: "tons of 2,000 lb",
  lb: "pounds",
  kg: "kilograms",
  tonne: "tonnes of 1,000 kg",
  "cubic-yard": "cubic yards",
  gal: "US gallons",
  litre: "litres",
  degF: "°F",
  degC: "°C",
  mile: "miles",
  km: "kilometres",
  inch: "inches",
  mm: "millimetres",
};

const names: Record<MeasureUnit, readonly string[]> = {
  ton: ["ton", "tons", "tn", "tns", "short ton", "short tons", "us ton", "us tons", "tons us", "ton us"],
  lb: ["lb", "lbs", "pound", "pounds"],
  kg: ["kg", "kgs", "kilo", "kilos", "kilogram", "kilograms"],
  tonne: ["tonne", "tonnes", "metric ton", "metric tons"],
  "cubic-yard": ["cubic yard", "cubic yards", "cu yd", "cu yds", "cy", "yd3", "yd³", "yard", "yards", "yds"],
  gal: ["gal", "gals", "gallon", "gallons", "us gal", "us gallons"],
  litre: ["l", "ltr", "litre", "litres", "liter", "liters"],
  degF: ["f", "°f", "degf", "deg f", "degrees f", "fahrenheit"],
  degC: ["c", "°c", "degc", "deg c", "degrees c", "celsius"],
  mile: ["mi", "mile", "miles"],
  km: ["km", "kms", "kilometer", "kilometers", "kilometre", "kilometres"],
  inch: ["in", "inch", "inches", '"'],
  mm: ["mm", "millimeter", "millimeters", "millimetre", "millimetres"],
};
const unitByName = new Map(measureUnits.flatMap((unit) => names[unit].map((name) => [name, unit])));

/** What the unit measures. */
export function dimensionOf(unit: MeasureUnit): Dimension {
  return dimensions[unit];
}

/**
 * The unit that a word means, or null. "t" alone means nothing: half of the world reads it as 1,000 kg.
 *
 * @example unitNamed("Lbs.") // "lb"
 */
export function unitNamed(text: string): MeasureUnit | null {
  const name = text.normalize("NFKC").toLowerCase().replace(/[().]/g, " ").replace(/\s+/g, " ").trim();
  return unitByName.get(name) ?? null;
}

/**
 * A figure and the unit written behind it. `unit` is null when none stands there, "unknown" when it is no unit we read.
 *
 * @example splitMeasure("9,400 lb") // { figure: "9,400", unit: "lb" }
 */
export function splitMeasure(text: string): { figure: string; unit: MeasureUnit | "unknown" | null } {
  const match = /^([+\-−]?[\d.,][\d.,'’\s]*)(\S.*)$/u.exec(text.trim());
  const [, figure, word] = match ?? [];
  // Digits and marks alone are a figure; what is wrong with it is for the reader of figures to say.
  if (figure === undefined || word === undefined || !/^[\p{L}°"]/u.test(word))
    return { figure: text.trim(), unit: null };
  // "1e5" is no figure with the unit "e5".
  if (/^e[+-]?\d/i.test(word)) return { figure: text.trim(), unit: null };
  return { figure: figure.trim(), unit: unitNamed(word) ?? "unknown" };
}

function toBase(value: number, unit: MeasureUnit, lbPerCubicYard: number | null): number {
  switch (unit) {
    case "ton":
      return shortTonsToLb(value);
    case "kg":
      return kgToLb(value);
    case "tonne":
      return kgToLb(value * 1000);
    case "cubic-yard":
      if (lbPerCubicYard === null) throw new RangeError("cubic yards need the material's density in lb");
      return value * lbPerCubicYard;
    case "litre":
      return litresToGallons(value);
    case "degC":
      return (value * 9) / 5 + 32;
    case "km":
      return kmToMiles(value);
    case "mm":
      return mmToInches(value);
    default:
      return value;
  }
}

function fromBase(value: number, unit: MeasureUnit, lbPerCubicYard: number | null): number {
  switch (unit) {
    case "ton":
      return lbToShortTons(value);
    case "kg":
      return lbToKg(value);
    case "tonne":
      return lbToKg(value) / 1000;
    case "cubic-yard":
      if (lbPerCubicYard === null) throw new RangeError("cubic yards need the material's density in lb");
      return value / lbPerCubicYard;
    case "litre":
      return gallonsToLitres(value);
    case "degC":
      return ((value - 32) * 5) / 9;
    case "km":
      return milesToKm(value);
    case "mm":
      return inchesToMm(value);
    default:
      return value;
  }
}

/**
 * The figure in another unit of the same dimension, unrounded; the same unit gives the same figure.
 *
 * @param value - in `from`
 * @param lbPerCubicYard - the material's bulk density, lb; null when no cubic yards are meant
 * @throws RangeError when the units measure different things, or cubic yards come without a density
 *
 * Source: the factors of domain/units.ts, and 9/5 and 32 between °C and °F (definition of the Fahrenheit scale).
 * @example convertMeasure(2, "ton", "lb", null) // 4000
 */
export function convertMeasure(
  value: number,
  from: MeasureUnit,
  to: MeasureUnit,
  lbPerCubicYard: number | null,
): number {
  if (from === to) return value;
  if (dimensions[from] !== dimensions[to]) throw new RangeError(`${from} and ${to} do not measure the same thing`);
  return fromBase(toBase(value, from, lbPerCubicYard), to, lbPerCubicYard);
}
