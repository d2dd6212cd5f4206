import { everyDay } from "./season-days.ts";
import { inReportedSteps, type WeatherDay } from "./weather-day.ts";

/** A state's own rule: snow on the ground from which a day counts, and the first day of its window. */
export type WildlifeRule = { leastDepthIn: number; firstDay: "12-01" | "11-01" };

/** Source: Wisconsin Department of Natural Resources, deer metrics, winter severity index. */
export const wisconsinRule: WildlifeRule = { leastDepthIn: 18, firstDay: "12-01" };
/** Source: Minnesota Department of Natural Resources, winter severity index, as reported in the press in 2025. */
export const minnesotaRule: WildlifeRule = { leastDepthIn: 15, firstDay: "11-01" };

const coldF = 0;

/**
 * The winter's points in a state's wildlife index: one for each day at or under 0 °F, one for each day of deep snow.
 *
 * Made for deer, not for roads; it is the plainest published count beside the severity index.
 *
 * @param days - in any order; days outside the rule's window, which ends on 30 April, are left out
 * @returns points, with the days of the window on which the temperature or the depth is missing
 * @throws RangeError when a day is given twice
 * @example wildlifeIndex(days, { seasonStartYear: 2021, rule: wisconsinRule }).points // 4
 */
export function wildlifeIndex(
  days: readonly WeatherDay[],
  { seasonStartYear, rule }: { seasonStartYear: number; rule: WildlifeRule },
): { points: number; missingColdDayCount: number; missingDepthDayCount: number } {
  const window = everyDay(days, `${seasonStartYear}-${rule.firstDay}`, `${seasonStartYear + 1}-04-30`).map(
    inReportedSteps,
  );
  const cold = window.filter(({ tminF }) => tminF !== null && tminF <= coldF);
  const deep = window.filter(({ snowDepthIn }) => snowDepthIn !== null && snowDepthIn >= rule.leastDepthIn);
  return {
    points: cold.length + deep.length,
    missingColdDayCount: window.filter(({ tminF }) => tminF === null).length,
    missingDepthDayCount: window.filter(({ snowDepthIn }) => snowDepthIn === null).length,
  };
}
