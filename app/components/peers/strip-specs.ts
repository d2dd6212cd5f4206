import type { LaneStripSpec } from "#app/components/charts/lane-strip-spec.ts";
import { type MemberCell, reasonWords, type WallCell } from "#app/domain/peers/cell.ts";
import { type IndicatorKey, indicators } from "#app/domain/peers/indicators.ts";
import { formatWhole } from "#app/lib/format.ts";

function bandOf(indicator: IndicatorKey): LaneStripSpec["band"] {
  const { band } = indicators[indicator];
  if (!band) return null;
  const { lowLbPerLaneMile: low, highLbPerLaneMile: high } = band;
  return { low, high, label: `band ${low}–${high}` };
}

type MemberStrip = {
  indicator: IndicatorKey;
  cell: MemberCell;
  own: { value: number; percentile: number | null; townName: string } | null;
};

/** What a member's strip shows: the protected cell, and the town's own flag. */
export function memberStripSpec({ indicator, cell, own }: MemberStrip): LaneStripSpec {
  return {
    unit: indicators[indicator].unit,
    axis: cell.axis,
    band: bandOf(indicator),
    peers:
      cell.state === "withheld"
        ? { state: "withheld", reason: reasonWords(cell.reason) }
        : {
            state: "shown",
            median: cell.median,
            interval: cell.interval,
            middleHalf: cell.middleHalf,
            heaps: cell.bins.map(({ from, to, towns }) => ({ from, to, count: towns })),
            heapKind: "grains",
          },
    own: own && {
      value: own.value,
      label: formatWhole(own.value),
      note: own.percentile === null ? own.townName : `${own.townName}, ${own.percentile}th percentile`,
      ...(own.percentile === null ? {} : { shortNote: `${own.percentile}th percentile` }),
    },
    townCountWords: cell.state === "shown" ? `${cell.towns} towns` : "",
  };
}

/** What a wall's strip shows: bars of about three, nobody's flag. */
export function wallStripSpec(indicator: IndicatorKey, cell: WallCell): LaneStripSpec {
  return {
    unit: indicators[indicator].unit,
    axis: cell.axis,
    band: bandOf(indicator),
    peers:
      cell.state === "withheld"
        ? { state: "withheld", reason: reasonWords(cell.reason) }
        : {
            state: "shown",
            median: cell.median,
            medianWords: `half lay more than ${formatWhole(cell.median)}`,
            interval: null,
            middleHalf: cell.middleHalf,
            heaps: cell.bars,
            heapKind: "bars",
          },
    own: null,
    townCountWords: cell.state === "shown" ? `${cell.townBand} towns` : "",
  };
}
