import { seasonStartYearOf } from "../dates.ts";

export type DueState = "in-date" | "due" | "never";

/**
 * Whether a truck and material must be calibrated: once before each season, so anything older than 1 July of the
 * season that `today` lies in is due.
 *
 * @param testedOn - local date of the newest approved calibration; null when there is none
 * @param today - local date
 *
 * Source: published guides agree on a calibration every year before the season; the day is the season's own.
 * @example dueState("2025-10-14", "2026-11-02") // "due"
 */
export function dueState(testedOn: string | null, today: string): DueState {
  if (testedOn === null) return "never";
  return seasonStartYearOf(testedOn) < seasonStartYearOf(today) ? "due" : "in-date";
}
