import { isLocalDate, type LocalDate, seasonEnd, seasonStart } from "#app/domain/dates.ts";
import { everyDay } from "./season-days.ts";
import { inReportedSteps, type WeatherDay } from "./weather-day.ts";

/** Which season, and how far its weather goes. */
export type SeasonReach = {
  seasonStartYear: number;
  /** The last day that can have been reported so far; left out when the season is over. */
  throughDay?: LocalDate;
};

export type WinterSpan = { beginDay: LocalDate; endDay: LocalDate };

const measurableSnowfallIn = 0.1;
const measurableDepthIn = 1;
const freezingF = 32;

function latestBegin(seasonStartYear: number): LocalDate {
  return `${seasonStartYear}-12-01`;
}

function earliestEnd(seasonStartYear: number): LocalDate {
  const leapDay = `${seasonStartYear + 1}-02-29`;
  return isLocalDate(leapDay) ? leapDay : `${seasonStartYear + 1}-02-28`;
}

function hasSnowfallOrFrost({ snowfallIn, tmaxF }: WeatherDay) {
  return (snowfallIn !== null && snowfallIn >= measurableSnowfallIn) || (tmaxF !== null && tmaxF <= freezingF);
}

function hasSnowCover({ snowDepthIn }: WeatherDay) {
  return snowDepthIn !== null && snowDepthIn >= measurableDepthIn;
}

/**
 * The last day of the season that has been, or can have been, reported.
 *
 * @throws RangeError when `throughDay` lies outside the season
 */
export function lastDayOf({ seasonStartYear, throughDay }: SeasonReach): LocalDate {
  const [first, last] = [seasonStart(seasonStartYear), seasonEnd(seasonStartYear)];
  if (throughDay === undefined) return last;
  if (throughDay < first || throughDay > last) {
    throw new RangeError(`throughDay must lie from ${first} to ${last}, not on ${throughDay}`);
  }
  return throughDay;
}

/**
 * The first and the last day that count towards the season's severity, both included.
 *
 * The winter begins on the first of: a day with 0.1 inch of snowfall, a day that stays at or under 32 °F, 1 December.
 * It ends on the last of: a day with 0.1 inch of snowfall, with an inch of snow on the ground, or that stays at or under
 * 32 °F, and the last of February. A frost at night alone does neither, nor does a missing reading. While the season
 * runs, it ends on the last day reported at the latest.
 *
 * @param days - in any order; days of other seasons are left out
 * @returns the span, or null while the winter has not begun
 * @throws RangeError when a day is given twice or `throughDay` lies outside the season
 *
 * Source: Midwestern Regional Climate Center, "Accumulated Winter Season Severity Index", definition of the season.
 * @example winterSpan([], { seasonStartYear: 2023 }) // { beginDay: "2023-12-01", endDay: "2024-02-29" }
 */
export function winterSpan(days: readonly WeatherDay[], reach: SeasonReach): WinterSpan | null {
  const lastDay = lastDayOf(reach);
  const season = everyDay(days, seasonStart(reach.seasonStartYear), lastDay).map(inReportedSteps);
  const latest = latestBegin(reach.seasonStartYear);
  const first = season.find((weather) => hasSnowfallOrFrost(weather) || weather.day === latest);
  if (!first) return null;
  const last = season.findLast((weather) => hasSnowfallOrFrost(weather) || hasSnowCover(weather));
  const earliest = earliestEnd(reach.seasonStartYear);
  const endDay = last !== undefined && last.day > earliest ? last.day : earliest;
  return { beginDay: first.day, endDay: endDay > lastDay ? lastDay : endDay };
}
