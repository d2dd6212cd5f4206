import { type ScoredElement, scoredElements, type WinterSeverity } from "./winter-severity.ts";

/**
 * A season's total is held back when more than this part of its days lack an element. Our own rule; the Midwestern
 * Regional Climate Center sets the same limit for its freeze maps.
 */
const mostMissingPercent = 10;
/** A few days that nobody read before or after the winter hold nothing back. Our own choice. */
const fewBlindDays = 3;

export type SeverityQuality = {
  /** Whether the total may be shown to others and counted in the station's history. */
  isTotalSound: boolean;
  /** Whether at least the part for cold may be shown; it is then called "temperature part, not AWSSI". */
  isTemperaturePartSound: boolean;
  isSnowPartSound: boolean;
  /** Elements with too many days missing. */
  lacking: readonly ScoredElement[];
  /** Whether the winter may have begun earlier or ended later on days that nobody read. */
  isSpanDoubtful: boolean;
};

/**
 * What of a season's severity rests on enough readings. The limit itself, 10 %, is still enough.
 *
 * @param severity - of a season, over or running
 * @example severityQuality(severity).lacking // ["snowDepth"]
 */
export function severityQuality(severity: WinterSeverity): SeverityQuality {
  const { dayCount, missingDayCounts, edge } = severity;
  const lacking = scoredElements.filter((element) => 100 * missingDayCounts[element] > mostMissingPercent * dayCount);
  const isSpanDoubtful =
    edge.blindDayCount > fewBlindDays && 100 * edge.blindDayCount > mostMissingPercent * edge.dayCount;
  const isSound = (...elements: ScoredElement[]) =>
    !isSpanDoubtful && elements.every((element) => !lacking.includes(element));
  return {
    isTotalSound: isSound(...scoredElements),
    isTemperaturePartSound: isSound("tmax", "tmin"),
    isSnowPartSound: isSound("snowfall", "snowDepth"),
    lacking,
    isSpanDoubtful,
  };
}
