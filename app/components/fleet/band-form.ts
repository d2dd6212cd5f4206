import type { Band } from "#app/domain/calibration/band.ts";
import { readNumber } from "#app/domain/readings.ts";

/** Brine alone is measured in gallons; a band in pounds says nothing of it. */
export const bandKinds = ["salt", "mix", "sand"] as const;
type Kind = (typeof bandKinds)[number];

export type TypedBands = Record<string, string>;
export type BandErrors = Record<string, string>;

/** No spreader lays more on a lane mile. Catches tons typed for pounds, and judges no practice. */
const mostLbPerLaneMile = 5000;

function readEnd(text: string): number | string {
  const read = readNumber(text);
  if (!read.ok) {
    if (read.code === "blank") return "Give this end, too, or leave both empty.";
    return read.code === "ambiguous"
      ? "Write it with a point for decimals, as in 262.5."
      : "Write a plain number, without unit or words.";
  }
  if (read.value <= 0) return "A band begins above 0.";
  return read.value > mostLbPerLaneMile ? `No band reaches over ${mostLbPerLaneMile} lb per lane mile.` : read.value;
}

/**
 * The bands of a form: for each kind its two ends, or null when both are left empty.
 *
 * @returns what was typed, to put back; a sentence by field for what cannot be; the bands, of use without errors only
 */
export function readBandForm(form: FormData) {
  const typed: TypedBands = {};
  const errors: BandErrors = {};
  const bands: Record<Kind | "brine", Band | null> = { salt: null, mix: null, sand: null, brine: null };
  for (const kind of bandKinds) {
    const text = (end: "low" | "high") => {
      const value = form.get(`${kind}-${end}`);
      typed[`${kind}-${end}`] = typeof value === "string" ? value : "";
      return (typed[`${kind}-${end}`] ?? "").trim();
    };
    const [lowText, highText] = [text("low"), text("high")];
    if (lowText === "" && highText === "") continue;
    const [low, high] = [readEnd(lowText), readEnd(highText)];
    if (typeof low === "string") errors[`${kind}-low`] = low;
    if (typeof high === "string") errors[`${kind}-high`] = high;
    if (typeof low === "string" || typeof high === "string") continue;
    if (high <= low) errors[`${kind}-high`] = "The band must end above where it begins.";
    else bands[kind] = { lowLbPerLaneMile: low, highLbPerLaneMile: high };
  }
  return { typed, errors, bands };
}

type Standing = { lowLbPerLaneMile: number; highLbPerLaneMile: number; origin: string } | null;

/** The form as it starts: the bands that the given owner has set, and nothing where another's holds. */
export function typedBands(bands: Record<Kind, Standing>, owner: string): TypedBands {
  return Object.fromEntries(
    bandKinds.flatMap((kind) => {
      const band = bands[kind];
      if (band?.origin !== owner) return [];
      return [
        [`${kind}-low`, String(band.lowLbPerLaneMile)],
        [`${kind}-high`, String(band.highLbPerLaneMile)],
      ];
    }),
  );
}
