import type { Finding } from "../finding.ts";
import { modifiedZ } from "../stats/modified-z.ts";

/** Fewer towns than this say nothing about what is usual. */
const fewestTowns = 12;
/** Source: Iglewicz and Hoaglin, "How to Detect and Handle Outliers" (1993): 3.5. */
const farOff = 3.5;

/**
 * Whether a town's salt lies far outside that of all towns of the season, on a log scale. For the coordinator's eyes.
 *
 * @param saltLbPerLaneMile - of the town
 * @param all - of every town that sent the season in, the town itself among them
 * @returns at most one check; none with fewer than 12 towns, or for a town that reports no salt
 */
export function outlierFindings(saltLbPerLaneMile: number, all: readonly number[]): Finding[] {
  const logs = all.filter((rate) => rate > 0).map(Math.log);
  if (saltLbPerLaneMile <= 0 || logs.length < fewestTowns) return [];
  const z = modifiedZ(logs, Math.log(saltLbPerLaneMile));
  if (z === null || Math.abs(z) <= farOff) return [];
  const message = `Salt per lane mile lies far ${z > 0 ? "above" : "below"} that of all ${logs.length} towns that sent the season in.`;
  return [{ code: "unlike-all", severity: "check", field: "saltLb", message }];
}
