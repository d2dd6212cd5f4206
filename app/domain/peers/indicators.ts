import { type Band, commonPracticeBands } from "#app/domain/calibration/band.ts";
import { defaultPolicy } from "#app/domain/disclosure/policy.ts";

export const indicatorKeys = ["salt-per-event", "rate-at-working-setting"] as const;
export type IndicatorKey = (typeof indicatorKeys)[number];

/** One figure by which towns are compared. */
export type Indicator = {
  key: IndicatorKey;
  name: string;
  /** The figure's name inside a wall's sentence. */
  sentenceName: string;
  /** What stands under the sentence on a wall. */
  wallName: string;
  unit: "lb per lane mile and event" | "lb per lane mile";
  /** How it is worked out, in words. */
  formula: string;
  /** What a smaller figure means. Neither says that less is better: road and weather decide. */
  direction: "less-is-less-material" | "within-the-band";
  roundingBase: number;
  /** Common practice, no published source; null where practice knows none. */
  band: Band | null;
  /** Fewest contributors for any figure. */
  minimumN: number;
};

/** The registry: whatever compares towns goes through its entries. */
export const indicators: Record<IndicatorKey, Indicator> = {
  "salt-per-event": {
    key: "salt-per-event",
    name: "Salt per lane mile and event",
    sentenceName: "salt on a lane mile in each event",
    wallName: "Pounds in each event",
    unit: "lb per lane mile and event",
    formula:
      "Salt used in the season, with the salt inside the mix, in pounds, divided by the town's lane miles and by its number of events.",
    direction: "less-is-less-material",
    roundingBase: defaultPolicy.roundingBaseLb,
    band: null,
    minimumN: defaultPolicy.kMin.member,
  },
  "rate-at-working-setting": {
    key: "rate-at-working-setting",
    name: "Application rate at the working setting",
    sentenceName: "salt on a lane mile",
    wallName: "Pounds at the working setting",
    unit: "lb per lane mile",
    formula:
      "For each truck's salt calibration in force: pounds per revolution times revolutions a minute at the working setting times 60, divided by the working speed in mph and the lanes covered in one pass. The town's figure is the median of its trucks.",
    direction: "within-the-band",
    roundingBase: defaultPolicy.roundingBaseLb,
    band: commonPracticeBands.salt ?? null,
    minimumN: defaultPolicy.kMin.member,
  },
};

/**
 * Whether the text is the key of an indicator.
 *
 * @example isIndicatorKey("salt-per-event") // true
 */
export function isIndicatorKey(text: string): text is IndicatorKey {
  return indicatorKeys.some((key) => key === text);
}
