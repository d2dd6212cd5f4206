import { weatherElements } from "#app/domain/severity/weather-day.ts";
import { type FileLine, summaryLine } from "./file-records.ts";

/** How to read the lines under the heads, or why these are not the heads of daily summaries. */
export type SummaryHeads =
  | { ok: true; hasFlags: boolean; read: (record: readonly string[]) => FileLine }
  | { ok: false; code: "doubled-columns" | "other-columns"; message: string };

/**
 * What the first line of a daily-summaries file makes of the lines under it.
 *
 * @param heads - STATION, DATE, at least one of the five elements, and whatever else, in any order and case
 * @example readSummaryHeads(["STATION", "DATE", "TMAX"]).ok // true
 */
export function readSummaryHeads(heads: readonly string[]): SummaryHeads {
  const names = heads.map((head) => head.trim().toUpperCase());
  const flagHeads = weatherElements.map((element) => `${element}_ATTRIBUTES`);
  const doubled = ["STATION", "DATE", ...weatherElements, ...flagHeads].filter(
    (name) => names.indexOf(name) !== names.lastIndexOf(name),
  );
  if (doubled.length > 0) {
    const message = `Two columns have the same head: ${doubled.join(", ")}. Keep one.`;
    return { ok: false, code: "doubled-columns", message };
  }
  const hasKey = names.includes("STATION") && names.includes("DATE");
  if (!hasKey || !weatherElements.some((element) => names.includes(element))) {
    const message =
      "This is no file of daily weather that is known here: heads like STATION, DATE and TMAX are missing.";
    return { ok: false, code: "other-columns", message };
  }
  const places = new Map(names.map((name, place) => [name, place]));
  return {
    ok: true,
    hasFlags: flagHeads.some((head) => places.has(head)),
    read: (record) =>
      summaryLine((head) => {
        const place = places.get(head);
        return place === undefined ? undefined : (record[place] ?? "");
      }),
  };
}
