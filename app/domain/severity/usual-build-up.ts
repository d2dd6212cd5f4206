import { quantileType7 } from "../stats/quantile.ts";
import { leastHistorySeasons } from "./severity-category.ts";
import type { BuildUpDay } from "./winter-severity.ts";

/** On one day of the season, the points that the middle half of a station's winters had gathered by then. */
export type UsualDay = { dayOfSeason: number; lowPoints: number; medianPoints: number; highPoints: number };

/** From October to the end of May: winters lie within it. In days of the season, 1 being 1 July. */
const firstDay = 93;
const lastDay = 335;

/** A winter's points on every day: none before it begins, its total once it has ended. */
function pointsByDay(buildUp: readonly BuildUpDay[]) {
  const byDay = new Map(buildUp.map((day) => [day.dayOfSeason, day.totalPoints]));
  let points = 0;
  return Array.from({ length: lastDay - firstDay + 1 }, (_, place) => {
    points = byDay.get(firstDay + place) ?? points;
    return points;
  });
}

/**
 * How a station's winters usually gather: the middle half of them, day by day, by type-7 quantiles.
 *
 * @param winters - severityBuildUp of each finished winter, in any order
 * @returns every day from October to the end of May; null under 20 winters
 */
export function usualBuildUp(winters: readonly (readonly BuildUpDay[])[]): UsualDay[] | null {
  if (winters.length < leastHistorySeasons) return null;
  const all = winters.map(pointsByDay);
  return Array.from({ length: lastDay - firstDay + 1 }, (_, place) => {
    const points = all.map((winter) => winter[place] ?? 0);
    return {
      dayOfSeason: firstDay + place,
      lowPoints: quantileType7(points, 0.25),
      medianPoints: quantileType7(points, 0.5),
      highPoints: quantileType7(points, 0.75),
    };
  });
}
