import type { Finding } from "#app/domain/finding.ts";
import { readNumber } from "#app/domain/readings.ts";

export type FigureLimits = {
  /** What the field holds, as it stands in a sentence: "revolutions", "gross weight in lb". */
  what: string;
  /** Smallest and largest figure that can be read in a yard, both taken. */
  min: number;
  max: number;
  isWhole?: boolean;
  /** What a blank stands for; without it a blank is an error. */
  blankMeans?: number;
};

/**
 * The figure in one typed field, checked.
 *
 * @param text - as typed
 * @param field - where it was typed; it names the finding
 * @param findings - what is wrong is added here, as a sentence for whoever typed it
 * @returns the number, or null when a finding was added
 * @example typedFigure("0", "counts.a.revolutions", { what: "revolutions", min: 0.25, max: 5000 }, findings) // null
 */
export function typedFigure(text: string, field: string, limits: FigureLimits, findings: Finding[]): number | null {
  const { what, min, max, isWhole = false, blankMeans } = limits;
  const refuse = (code: string, message: string) => {
    findings.push({ code, severity: "error", field, message });
    return null;
  };
  const read = readNumber(text);
  if (!read.ok) {
    if (read.code === "blank") return blankMeans ?? refuse("blank", `Give the ${what}.`);
    if (read.code === "ambiguous")
      return refuse("ambiguous", `Write the ${what} with a point for decimals, as in 12.5.`);
    return refuse(
      "not-a-number",
      `Write the ${what} as a plain number of at most fifteen digits, without unit or words.`,
    );
  }
  if (read.value < min) {
    if (min === 0) return refuse("negative", `The ${what} cannot be below 0.`);
    return read.value <= 0
      ? refuse("not-positive", `The ${what} must be more than 0.`)
      : refuse("too-small", `The ${what} must be at least ${min}.`);
  }
  if (read.value > max) return refuse("absurd", `The ${what} cannot be more than ${max}. Check what was typed.`);
  if (isWhole && !Number.isInteger(read.value)) return refuse("not-whole", `The ${what} must be a whole number.`);
  return read.value;
}
