import { isLocalDate, type LocalDate } from "../dates.ts";

type Typed = { materialId: number; isCarried: boolean; since: string };
type Carried = { materialId: number; sinceOn: LocalDate | null };

/**
 * The materials a truck carries, from what was ticked and dated.
 *
 * @param typed - one entry for each of the town's materials, the date as typed
 * @param today - local date: a material cannot have begun later
 * @returns the ticked ones, and a sentence by material for each date that cannot be
 * @example carriedMaterials([{ materialId: 1, isCarried: true, since: "" }], "2026-11-02").materials
 *   // [{ materialId: 1, sinceOn: null }]
 */
export function carriedMaterials(typed: readonly Typed[], today: LocalDate) {
  const errors: Record<string, string> = {};
  const materials: Carried[] = [];
  for (const { materialId, isCarried, since } of typed) {
    if (!isCarried) continue;
    if (since === "") materials.push({ materialId, sinceOn: null });
    else if (!isLocalDate(since)) errors[materialId] = "Write the day as year-month-day, as in 2026-10-09.";
    else if (since > today) errors[materialId] = "This day has not come yet.";
    else materials.push({ materialId, sinceOn: since });
  }
  return { materials, errors };
}
