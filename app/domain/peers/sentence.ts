import { type Band, type BandPlace, bandPlace, distanceFromBand } from "#app/domain/calibration/band.ts";
import { type MemberCell, type WallCell, reasonWords } from "./cell.ts";
import { type IndicatorKey, indicators } from "./indicators.ts";

/** A stretch of a sentence; `tone` says that it names a place under, in or over the band. */
export type SentencePart = { words: string; tone?: BandPlace };
/** A sentence in stretches, so that a page can mark what lies outside the band. */
export type Sentence = { parts: SentencePart[] };

/** The sentence as one text. @example sentenceText({ parts: [{ words: "Half of us " }, { words: "agree." }] }) */
export function sentenceText({ parts }: Sentence): string {
  return parts.map(({ words }) => words).join("");
}

function whole(value: number) {
  return Math.round(value).toLocaleString("en-US");
}

function bandPart(ownValue: number, band: Band): SentencePart {
  const tone = bandPlace(ownValue, band);
  if (tone === "in") return { words: "inside the band", tone };
  const distance = Math.abs(distanceFromBand(ownValue, band));
  // Less than half a pound outside is shown as 1, because "0 above the band" would contradict itself.
  return { words: `${whole(Math.max(1, distance))} ${tone === "over" ? "above" : "below"} the band`, tone };
}

function percentileWords(percentile: number) {
  if (percentile > 50) return `more than about ${percentile} in 100 of your peers`;
  if (percentile < 50) return `less than about ${100 - percentile} in 100 of your peers`;
  return "in the middle of your peers";
}

function medianWords(ownValue: number, cell: MemberCell) {
  if (cell.state === "withheld") return null;
  const difference = Math.round(ownValue) - cell.median;
  // The group counts the town itself, so it is not that many peers.
  if (difference === 0) return `just the median of the ${cell.towns} towns`;
  return `about ${whole(Math.abs(difference))} ${difference > 0 ? "above" : "below"} the median of the ${cell.towns} towns`;
}

function peersAlone(cell: MemberCell, unit: string): string {
  if (cell.state === "withheld") return `The figures of your peers are withheld: ${reasonWords(cell.reason)}.`;
  const { towns, middleHalf, median } = cell;
  if (!middleHalf) return `The median of ${towns} towns is about ${whole(median)} ${unit}.`;
  return `Half of ${towns} towns lie between ${whole(middleHalf.low)} and ${whole(middleHalf.high)} ${unit}.`;
}

function ownWords(indicator: IndicatorKey, ownValue: number, speedMph: number | null) {
  if (indicator === "salt-per-event")
    return `Your town laid ${whole(ownValue)} lb of salt on a lane mile in each event`;
  const speed = speedMph === null ? "" : ` and ${whole(speedMph)} mph`;
  return `Your salt trucks lay a median of ${whole(ownValue)} lb per lane mile at the working setting${speed}`;
}

function nothingOwn(indicator: IndicatorKey) {
  return indicator === "salt-per-event"
    ? "This edition holds no figure of your town."
    : "This edition holds no rate of your salt trucks.";
}

/**
 * Where a town stands, in one or two sentences.
 *
 * @param input - own figure in the indicator's unit, or null when there is none; the protected cell of the group; the
 *   town's place of 100 in it, or null; the band, or null; the speed in mph when all trucks work at one
 * @returns stretches in order; the one that names the place against the band carries its tone
 * @example placeSentence({ indicator: "rate-at-working-setting", ownValue: 388, cell, percentile: 85, band })
 *   // "Your salt trucks lay a median of 388 lb per lane mile at the working setting: " + "88 above the band" (over) +
 *   // ", more than about 85 in 100 of your peers."
 */
export function placeSentence({
  indicator,
  ownValue,
  cell,
  percentile,
  band,
  speedMph = null,
}: {
  indicator: IndicatorKey;
  ownValue: number | null;
  cell: MemberCell;
  percentile: number | null;
  band: Band | null;
  speedMph?: number | null;
}): Sentence {
  if (ownValue === null) {
    return { parts: [{ words: `${nothingOwn(indicator)} ${peersAlone(cell, indicators[indicator].unit)}` }] };
  }
  const own = ownWords(indicator, ownValue, speedMph);
  const placeWords = cell.state === "shown" && percentile !== null ? percentileWords(percentile) : null;
  // With a band and a place the median would be a third comparison; the picture below shows it.
  const peers = [band && placeWords ? null : medianWords(ownValue, cell), placeWords].filter((one) => one !== null);
  const ending = cell.state === "withheld" ? `. ${peersAlone(cell, "")}` : ".";
  if (!band)
    return { parts: [{ words: [`${own}${peers.length > 0 ? ": " : ""}`, peers.join(", "), ending].join("") }] };
  const rest = peers.map((one) => `, ${one}`).join("");
  return { parts: [{ words: `${own}: ` }, bandPart(ownValue, band), { words: `${rest}${ending}` }] };
}

function bandSentence(median: number, band: Band | null) {
  if (!band) return "";
  if (median > band.highLbPerLaneMile) return ` The band ends at ${whole(band.highLbPerLaneMile)}.`;
  if (median < band.lowLbPerLaneMile) return ` The band begins at ${whole(band.lowLbPerLaneMile)}.`;
  return ` The band runs from ${whole(band.lowLbPerLaneMile)} to ${whole(band.highLbPerLaneMile)}.`;
}

/**
 * What a workshop's wall says of a group, without naming or numbering anyone.
 *
 * @param input - the wall's protected cell and the band, or null
 * @returns one sentence on the middle half (or the median where there is none) and one on the band
 * @example wallSentence({ indicator: "rate-at-working-setting", cell, band })
 *   // "Half of us lay between 270 and 380 lb of salt on a lane mile. The band ends at 300."
 */
export function wallSentence({
  indicator,
  cell,
  band,
}: {
  indicator: IndicatorKey;
  cell: WallCell;
  band: Band | null;
}): Sentence {
  if (cell.state === "withheld") return { parts: [{ words: `Nothing to show here: ${reasonWords(cell.reason)}.` }] };
  const { middleHalf, median } = cell;
  // Short enough for two lines on a wall: what setting it is stands in the line below.
  const what = `lb of ${indicators[indicator].sentenceName}`;
  const lay = indicator === "salt-per-event" ? "laid" : "lay";
  const middle =
    middleHalf && middleHalf.low < middleHalf.high
      ? `Half of us ${lay} between ${whole(middleHalf.low)} and ${whole(middleHalf.high)} ${what}.`
      : `The middle one of us ${lay === "lay" ? "lays" : lay} about ${whole(median)} ${what}.`;
  return { parts: [{ words: `${middle}${bandSentence(median, band)}` }] };
}
