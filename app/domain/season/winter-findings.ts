import type { Finding } from "../finding.ts";
import { median } from "../stats/median.ts";

export type WinterSeason = { saltLbPerLaneMile: number; awssiPoints: number | null };

/** More than this factor off its own usual salt for the winter asks for a look. A choice of ours. */
const doubtfulFactor = 1.8;
const fewestSeasons = 2;

/**
 * Whether the salt fits the winter, by the town's own earlier seasons: salt per lane mile and point of the winter index.
 *
 * @param now - salt in lb per lane mile; the season's index in points, null when not known
 * @param earlier - the same of the town's earlier seasons, any order
 * @returns at most one check; none with fewer than two earlier seasons that have both figures
 */
export function winterFindings(now: WinterSeason, earlier: readonly WinterSeason[]): Finding[] {
  const perPoint = ({ saltLbPerLaneMile, awssiPoints }: WinterSeason) =>
    awssiPoints === null || awssiPoints <= 0 || saltLbPerLaneMile <= 0 ? null : saltLbPerLaneMile / awssiPoints;
  const current = perPoint(now);
  const usual = earlier.map(perPoint).filter((each) => each !== null);
  if (current === null || usual.length < fewestSeasons) return [];
  const factor = current / median(usual);
  if (factor <= doubtfulFactor && factor >= 1 / doubtfulFactor) return [];
  const points = Math.round(now.awssiPoints ?? 0).toLocaleString("en-US");
  const words =
    factor > 1
      ? `${factor < 9.5 ? factor.toFixed(1) : factor.toFixed(0)} times`
      : `only ${(100 * factor).toFixed(0)} % of`;
  const message = `For a winter of ${points} points the salt per lane mile is ${words} what its ${usual.length} earlier seasons would lead one to expect.`;
  return [{ code: "unlike-winter", severity: "check", field: "saltLb", message }];
}
