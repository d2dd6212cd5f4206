import { isLocalDate, seasonEnd } from "#app/domain/dates.ts";

export type SeasonDates = { opensOn: string | null; figuresDueOn: string; closesOn: string | null };

/** A season's dates out of a form's texts; or what is wrong by field. */
export function readSeasonDates(
  values: Readonly<Record<string, string>>,
  startYear: number,
): { ok: true; dates: SeasonDates } | { ok: false; errors: Record<string, string> } {
  const { opensOn = "", figuresDueOn = "", closesOn = "" } = values;
  const errors: Record<string, string> = {};
  if (!isLocalDate(figuresDueOn)) errors.figuresDueOn = "Give the day on which figures are due.";
  else if (figuresDueOn <= seasonEnd(startYear)) {
    errors.figuresDueOn = "Figures can be due when the season is over: after 30 June.";
  }
  if (opensOn !== "" && !isLocalDate(opensOn)) errors.opensOn = "Give a day, or leave it empty.";
  else if (opensOn !== "" && opensOn >= figuresDueOn) errors.opensOn = "It has to open before figures are due.";
  if (closesOn !== "" && !isLocalDate(closesOn)) errors.closesOn = "Give a day, or leave it empty.";
  else if (closesOn !== "" && closesOn < figuresDueOn) errors.closesOn = "It cannot close before figures are due.";
  if (Object.keys(errors).length > 0) return { ok: false, errors };
  return { ok: true, dates: { opensOn: opensOn || null, figuresDueOn, closesOn: closesOn || null } };
}
