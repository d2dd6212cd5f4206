import { type LocalDate, seasonLabel, seasonStartYearOf } from "../dates.ts";

/** A season that the network has opened, and what this town may still do in it. */
export type OpenSeason = {
  startYear: number;
  /** First and last day on which a storm is expected; null where the network has not said. */
  opensOn: LocalDate | null;
  closesOn: LocalDate | null;
  /** Whether the town's figures were sent in or accepted: nothing in it changes then. */
  isClosed: boolean;
};

export type SeasonOfDay =
  | { ok: true; seasonStartYear: number; isOutside: boolean }
  | { ok: false; code: "season-not-open" | "season-sent" | "future"; message: string };

/**
 * The season into which something of that day goes, or why nothing goes into it.
 *
 * @param today - the town's own date
 * @returns `isOutside` when the day lies before the season's opening or after its closing
 * @throws RangeError when the day is none
 */
export function seasonOfDay(day: LocalDate, seasons: ReadonlyMap<number, OpenSeason>, today: LocalDate): SeasonOfDay {
  if (day > today) return { ok: false, code: "future", message: "This day has not come yet." };
  const seasonStartYear = seasonStartYearOf(day);
  const season = seasons.get(seasonStartYear);
  const label = seasonLabel(seasonStartYear);
  if (!season) {
    return {
      ok: false,
      code: "season-not-open",
      message: `This day is in ${label}, which the network has not opened.`,
    };
  }
  if (season.isClosed) {
    const message = `${label} has been sent in, so a file no longer changes it. Ask the coordinator to send it back first.`;
    return { ok: false, code: "season-sent", message };
  }
  const isOutside =
    (season.opensOn !== null && day < season.opensOn) || (season.closesOn !== null && day > season.closesOn);
  return { ok: true, seasonStartYear, isOutside };
}
