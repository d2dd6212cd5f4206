import { quantileType7 } from "#app/domain/stats/quantile.ts";
import { severityQuality } from "./severity-quality.ts";
import type { WinterSeverity } from "./winter-severity.ts";

/** From the mildest fifth of a station's winters to its most severe. */
export const severityCategories = ["W1", "W2", "W3", "W4", "W5"] as const;
export type SeverityCategory = (typeof severityCategories)[number];

/** The published words for the five. */
export const severityCategoryNames: Record<SeverityCategory, string> = {
  W1: "mild",
  W2: "moderate",
  W3: "average",
  W4: "severe",
  W5: "extreme",
};

/** Fewer winters than this make no fifths worth the name. Our own choice. */
const leastHistorySeasons = 20;
const cutShares = [0.2, 0.4, 0.6, 0.8] as const;

/** Points at which a category ends, rising. */
export type CutPoints = readonly [number, number, number, number];

/**
 * The category of a total between the cut points. A total on a cut point stays in the lower category.
 *
 * @param totalPoints - finite
 * @param cutPoints - of the station, rising
 * @throws RangeError when a number is not finite or the cut points fall
 * @example categoryBetween(1029, [612, 803, 995, 1240]) // "W4"
 */
export function categoryBetween(totalPoints: number, cutPoints: CutPoints): SeverityCategory {
  if (![totalPoints, ...cutPoints].every(Number.isFinite)) throw new RangeError("points must be finite numbers");
  const isFalling = cutPoints.some((cut, place) => cut < (cutPoints[place - 1] ?? cut));
  if (isFalling) throw new RangeError(`cut points must rise, not ${cutPoints.join(", ")}`);
  const passed = cutPoints.filter((cut) => totalPoints > cut).length;
  return severityCategories[passed] ?? "W5";
}

/**
 * The points that part a station's own winters into fifths, by type-7 quantiles.
 *
 * @param historyPoints - totals of its sound, finished winters, in any order
 * @returns four cut points, or null under 20 winters
 * @throws RangeError when a total is not finite
 *
 * Source: Midwestern Regional Climate Center, AWSSI categories by percentiles of the station's own winters. That the
 * lower cuts lie at 20, 40 and 60 % and that type 7 is used is our own reading.
 */
export function severityCutPoints(historyPoints: readonly number[]): CutPoints | null {
  if (historyPoints.length < leastHistorySeasons) return null;
  const [first, second, third, fourth] = cutShares;
  const at = (share: number) => quantileType7(historyPoints, share);
  return [at(first), at(second), at(third), at(fourth)];
}

/**
 * The winter's category among its station's own winters, with the cut points it was read from.
 *
 * @param totalPoints - the winter's total
 * @param historyPoints - totals of the station's sound, finished winters
 * @returns null under 20 winters: a category is not guessed
 * @throws RangeError when a number is not finite
 * @example severityCategory(1500, history)?.category // "W5"
 */
export function severityCategory(
  totalPoints: number,
  historyPoints: readonly number[],
): { category: SeverityCategory; cutPoints: CutPoints } | null {
  const cutPoints = severityCutPoints(historyPoints);
  return cutPoints && { category: categoryBetween(totalPoints, cutPoints), cutPoints };
}

/** The totals that may stand in a station's history: of winters that are over and rest on enough readings. */
export function historyPointsOf(winters: readonly WinterSeverity[]): number[] {
  return winters
    .filter((winter) => winter.isOver && severityQuality(winter).isTotalSound)
    .map(({ totalPoints }) => totalPoints);
}
