import { assertFinite } from "./assert-finite.ts";
import { median } from "./median.ts";

/**
 * The robust line through the points: the median of the slopes between all pairs.
 *
 * Pairs with equal x are left out. The intercept is median(y) − slope × median(x).
 *
 * @param points - x and y, finite
 * @returns slope (y per x) and intercept (y), or null when no two points differ in x
 * @throws RangeError when there is no point or anything is not finite
 *
 * Source: P. K. Sen, "Estimates of the regression coefficient based on Kendall's tau", JASA 63 (1968), 1379–1389.
 * @example theilSen([{ x: 0, y: 1 }, { x: 1, y: 3 }]) // { slope: 2, intercept: 1 }
 */
export function theilSen(points: readonly { x: number; y: number }[]): { slope: number; intercept: number } | null {
  assertFinite(points.flatMap(({ x, y }) => [x, y]));
  const slopes = points.flatMap((from, place) =>
    points
      .slice(place + 1)
      .filter((to) => to.x !== from.x)
      .map((to) => (to.y - from.y) / (to.x - from.x)),
  );
  if (slopes.length === 0) return null;
  const slope = median(slopes);
  return { slope, intercept: median(points.map(({ y }) => y)) - slope * median(points.map(({ x }) => x)) };
}
