import { type Bin, protectedBins } from "#app/domain/disclosure/bins.ts";
import type { DisclosurePolicy } from "#app/domain/disclosure/policy.ts";
import { protectedNumber, roundTo, townBand } from "#app/domain/disclosure/rounding.ts";
import { medianInterval } from "#app/domain/stats/median-interval.ts";
import { quantileType7 } from "#app/domain/stats/quantile.ts";
import type { Axis } from "./axis.ts";

export type { Axis } from "./axis.ts";
export type { Bin } from "#app/domain/disclosure/bins.ts";

export type WithheldReason = "too-few" | "too-similar" | "too-close";
export type Range = { low: number; high: number };

/** What a member sees of one group. Every number is protected; its unit is the indicator's. */
export type MemberCell =
  | {
      state: "shown";
      towns: number;
      median: number;
      interval: Range | null;
      middleHalf: Range | null;
      tenths: Range | null;
      bins: Bin[];
      axis: Axis;
    }
  | { state: "withheld"; reason: WithheldReason; axis: Axis };

/** A stretch of the scale and how many bars stand for its towns, about three towns a bar. */
export type Bars = { from: number | null; to: number | null; count: number };

/** What a workshop's wall shows of one group. */
export type WallCell =
  | { state: "shown"; townBand: string; median: number; middleHalf: Range | null; bars: Bars[]; axis: Axis }
  | { state: "withheld"; reason: WithheldReason; axis: Axis };

/** What the public download holds of one group. */
export type DownloadCell =
  | { state: "shown"; townBand: string; median: number; lowerQuartile: number | null; upperQuartile: number | null }
  | { state: "withheld"; reason: WithheldReason };

const words: Record<WithheldReason, string> = {
  "too-few": "too few towns",
  "too-similar": "too similar to each other",
  "too-close": "too close to another group",
};

/** The reason in words, never with how close it was. @example reasonWords("too-few") // "too few towns" */
export function reasonWords(reason: WithheldReason): string {
  return words[reason];
}

/** A group's protected figures, before it is known for whom. */
type Figures = { median: number; interval: Range | null; middleHalf: Range | null; tenths: Range | null };

function protectedFigures(values: readonly number[], policy: DisclosurePolicy): Figures {
  const shown = (value: number) => protectedNumber(value, policy.roundingBaseLb, policy.significantDigits);
  const at = (p: number) => shown(quantileType7(values, p));
  const interval = values.length >= policy.intervalFrom ? medianInterval(values) : null;
  return {
    median: at(0.5),
    interval: interval && { low: shown(interval.low), high: shown(interval.high) },
    middleHalf: values.length >= policy.quartilesFrom ? { low: at(0.25), high: at(0.75) } : null,
    tenths: values.length >= policy.decilesFrom ? { low: at(0.1), high: at(0.9) } : null,
  };
}

/**
 * Why a group may not be shown to members, looking at the group alone.
 *
 * @param values - one a contributor
 * @returns "too-few", "too-similar" when all figures round to one or lie within one rounding base, or null
 * @example groupReason([310, 320, 330], defaultPolicy) // "too-few"
 */
export function groupReason(values: readonly number[], policy: DisclosurePolicy): WithheldReason | null {
  if (values.length < policy.kMin.member) return "too-few";
  const rounded = new Set(values.map((value) => roundTo(value, policy.roundingBaseLb)));
  const spread = Math.max(...values) - Math.min(...values);
  return rounded.size < 2 || spread < policy.roundingBaseLb ? "too-similar" : null;
}

/**
 * What a member may see of a group.
 *
 * @param values - one a contributor, the viewer's own included; finite
 * @param reason - why the group is withheld, or null
 * @param axis - the indicator's
 * @returns figures in the rounding base: the interval from 9 contributors, middle half and bins from 12, tenths from 30
 * @throws RangeError when a value is not finite
 * @example memberCell(values, null, axis, defaultPolicy)
 */
export function memberCell(
  values: readonly number[],
  reason: WithheldReason | null,
  axis: Axis,
  policy: DisclosurePolicy,
): MemberCell {
  if (reason) return { state: "withheld", reason, axis };
  const bins = protectedBins(values, policy.roundingBaseLb, policy);
  return { state: "shown", towns: values.length, ...protectedFigures(values, policy), bins, axis };
}

/**
 * What a workshop's wall may show of a group: no exact number of towns, bars of about three.
 *
 * @param values - one a contributor; finite
 * @param reason - why the group is withheld from members, or null
 * @throws RangeError when a value is not finite
 * @example wallCell(values, null, axis, defaultPolicy)
 */
export function wallCell(
  values: readonly number[],
  reason: WithheldReason | null,
  axis: Axis,
  policy: DisclosurePolicy,
): WallCell {
  if (reason) return { state: "withheld", reason, axis };
  if (values.length < policy.kMin.wall) return { state: "withheld", reason: "too-few", axis };
  const { median, middleHalf } = protectedFigures(values, policy);
  const bars = protectedBins(values, policy.roundingBaseLb, policy).map(({ from, to, towns }) => ({
    from,
    to,
    count: Math.max(1, Math.round(towns / 3)),
  }));
  return { state: "shown", townBand: townBand(values.length, policy), median, middleHalf, bars, axis };
}

/**
 * What the public download may hold of a group.
 *
 * @param values - one a contributor; finite
 * @param reason - why the group is withheld from members, or null
 * @throws RangeError when a value is not finite
 * @example downloadCell(values, "too-close", defaultPolicy) // { state: "withheld", reason: "too-close" }
 */
export function downloadCell(
  values: readonly number[],
  reason: WithheldReason | null,
  policy: DisclosurePolicy,
): DownloadCell {
  if (reason) return { state: "withheld", reason };
  if (values.length < policy.kMin.download) return { state: "withheld", reason: "too-few" };
  const { median, middleHalf } = protectedFigures(values, policy);
  return {
    state: "shown",
    townBand: townBand(values.length, policy),
    median,
    lowerQuartile: middleHalf?.low ?? null,
    upperQuartile: middleHalf?.high ?? null,
  };
}
