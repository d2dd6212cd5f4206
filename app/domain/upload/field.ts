import type { Dimension, MeasureUnit } from "./measure.ts";

/** One thing that a row of a file may say. Which column says it is settled when the columns are matched. */
export type UploadField = {
  /** Unique in its kind of file: "started_on", or "used:7" for the material with the id 7. */
  key: string;
  /** How the page names it: "start day". */
  label: string;
  /** Heads it goes by, in small letters and without units; the template's own head first. */
  names: readonly string[];
  holds: "text" | "figure" | "day" | "time";
  /** What may be measured in; more than one where solids and liquids share a column. */
  dimensions?: readonly Dimension[];
  /** The unit when neither the head nor the person says another. */
  unit?: MeasureUnit;
  /** Whether a file without it cannot be read; one of a group is enough where several carry the same group. */
  need?: "always" | { oneOf: string };
};

/**
 * The names of the needed fields that no column is matched to; for a group of which one is enough, its members joined.
 *
 * @param fields - of the kind of file
 * @param matched - keys of the fields that columns are matched to
 * @example missingFields(fields, new Set(["started_on"])) // ["material used"]
 */
export function missingFields(fields: readonly UploadField[], matched: ReadonlySet<string>): string[] {
  const missing = fields.filter(({ need, key }) => need === "always" && !matched.has(key)).map(({ label }) => label);
  const groups = new Set(fields.flatMap(({ need }) => (typeof need === "object" ? [need.oneOf] : [])));
  for (const group of groups) {
    const members = fields.filter(({ need }) => typeof need === "object" && need.oneOf === group);
    if (!members.some(({ key }) => matched.has(key))) missing.push(group);
  }
  return missing;
}
