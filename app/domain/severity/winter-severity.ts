import { type LocalDate, seasonEnd, seasonStart, daysBetween } from "#app/domain/dates.ts";
import { dayPoints, type DayPoints, snowPointsOf, temperaturePointsOf } from "./day-points.ts";
import { everyDay } from "./season-days.ts";
import type { WeatherDay } from "./weather-day.ts";
import { lastDayOf, type SeasonReach, winterSpan } from "./winter-span.ts";

/** The four elements that score, by the name they have in a day's weather without their unit. */
export const scoredElements = ["tmax", "tmin", "snowfall", "snowDepth"] as const;
export type ScoredElement = (typeof scoredElements)[number];

/** One day of the winter with the points gathered up to and including it. */
export type BuildUpDay = {
  day: LocalDate;
  /** 1 on 1 July, so that winters can be laid over one another. */
  dayOfSeason: number;
  temperaturePoints: number;
  snowPoints: number;
  totalPoints: number;
  /** What was not reported on this day; it added nothing. */
  missing: readonly ScoredElement[];
};

export type WinterSeverity = {
  seasonStartYear: number;
  /** First and last day that count, both included. */
  beginDay: LocalDate;
  endDay: LocalDate;
  dayCount: number;
  /** Whether the whole season has been reported on; a running one still grows. */
  isOver: boolean;
  tmaxPoints: number;
  tminPoints: number;
  snowfallPoints: number;
  snowDepthPoints: number;
  /** Highest and lowest temperatures together. */
  temperaturePoints: number;
  /** Snowfall and snow on the ground together. */
  snowPoints: number;
  totalPoints: number;
  /** Days from begin to end without a reading, by element. They scored nothing and were not filled in. */
  missingDayCounts: Record<ScoredElement, number>;
  /** Days from October to April outside the span, and those of them that could not show a winter's day. */
  edge: { dayCount: number; blindDayCount: number };
};

function missingIn(points: DayPoints): ScoredElement[] {
  return scoredElements.filter((element) => points[`${element}Points`] === null);
}

/** Days on which a winter could have begun earlier or ended later, had they been seen. */
function edgeOf(days: readonly WeatherDay[], reach: SeasonReach, span: { beginDay: LocalDate; endDay: LocalDate }) {
  const lastApril = `${reach.seasonStartYear + 1}-04-30`;
  const lastDay = lastDayOf(reach);
  const from = `${reach.seasonStartYear}-10-01`;
  const outside = everyDay(days, from, lastDay < lastApril ? lastDay : lastApril).filter(
    ({ day }) => day < span.beginDay || day > span.endDay,
  );
  const blind = outside.filter(({ tmaxF, snowfallIn }) => tmaxF === null && snowfallIn === null);
  return { dayCount: outside.length, blindDayCount: blind.length };
}

/**
 * How the season's severity gathers day by day, for a chart.
 *
 * @param days - in any order; days of other seasons are left out
 * @returns every day from the winter's first to its last, points adding up; none while the winter has not begun
 * @throws RangeError when a day is given twice or `throughDay` lies outside the season
 * @example severityBuildUp(days, { seasonStartYear: 2025 }).at(-1)?.totalPoints
 */
export function severityBuildUp(days: readonly WeatherDay[], reach: SeasonReach): BuildUpDay[] {
  const span = winterSpan(days, reach);
  if (!span) return [];
  let [temperaturePoints, snowPoints] = [0, 0];
  return everyDay(days, span.beginDay, span.endDay).map((weather) => {
    const points = dayPoints(weather);
    temperaturePoints += temperaturePointsOf(points);
    snowPoints += snowPointsOf(points);
    return {
      day: weather.day,
      dayOfSeason: daysBetween(seasonStart(reach.seasonStartYear), weather.day) + 1,
      temperaturePoints,
      snowPoints,
      totalPoints: temperaturePoints + snowPoints,
      missing: missingIn(points),
    };
  });
}

/**
 * The season's severity: the points of every day from the winter's first to its last, with its parts and its gaps.
 *
 * The index counts cold without snow; it does not count freezing rain, wind or the hour of the day, and it is no model
 * of salt use.
 *
 * @param days - one station's weather in any order; days of other seasons are left out
 * @param reach - the season, and the last day reported while it runs
 * @returns whole points, or null while the winter has not begun
 * @throws RangeError when a day is given twice, a reading is no number or `throughDay` lies outside the season
 *
 * Source: B. E. Mayes Boustead et al., "The Accumulated Winter Season Severity Index (AWSSI)", Journal of Applied
 * Meteorology and Climatology 54 (2015), 1693–1712; season of the Midwestern Regional Climate Center.
 * @example winterSeverity([], { seasonStartYear: 2025 })?.dayCount // 90, and all 90 missing
 */
export function winterSeverity(days: readonly WeatherDay[], reach: SeasonReach): WinterSeverity | null {
  const span = winterSpan(days, reach);
  if (!span) return null;
  const scored = everyDay(days, span.beginDay, span.endDay).map(dayPoints);
  const sumOf = (element: ScoredElement) => scored.reduce((sum, points) => sum + (points[`${element}Points`] ?? 0), 0);
  const missingOf = (element: ScoredElement) => scored.filter((points) => points[`${element}Points`] === null).length;
  const sums = { tmax: sumOf("tmax"), tmin: sumOf("tmin"), snowfall: sumOf("snowfall"), snowDepth: sumOf("snowDepth") };
  const temperaturePoints = sums.tmax + sums.tmin;
  const snowPoints = sums.snowfall + sums.snowDepth;
  return {
    seasonStartYear: reach.seasonStartYear,
    ...span,
    dayCount: scored.length,
    isOver: lastDayOf(reach) === seasonEnd(reach.seasonStartYear),
    tmaxPoints: sums.tmax,
    tminPoints: sums.tmin,
    snowfallPoints: sums.snowfall,
    snowDepthPoints: sums.snowDepth,
    temperaturePoints,
    snowPoints,
    totalPoints: temperaturePoints + snowPoints,
    missingDayCounts: {
      tmax: missingOf("tmax"),
      tmin: missingOf("tmin"),
      snowfall: missingOf("snowfall"),
      snowDepth: missingOf("snowDepth"),
    },
    edge: edgeOf(days, reach, span),
  };
}
