import {
  type Heap,
  type LaneStripSpec,
  type ShownPeers,
  stripParts,
  type StripSize,
  townsInHeap,
} from "./lane-strip-spec.ts";

/** Digits after the point that fit the axis: none for pounds, for per cent and wherever the axis is laid out in tens. */
function decimalsOf({ unit, axis }: Pick<LaneStripSpec, "unit" | "axis">) {
  if (/^(lb|%)/.test(unit) || axis.step >= 10) return 0;
  if (axis.step >= 1) return 1;
  return Math.min(4, Math.ceil(-Math.log10(axis.step)) + 1);
}

/** Made once each: a strip says a few dozen figures, and making a formatter costs more than all of them. */
const formatters = new Map<string, Intl.NumberFormat>();

function formatter(least: number, most: number) {
  const key = `${least} ${most}`;
  const known = formatters.get(key);
  if (known) return known;
  const made = new Intl.NumberFormat("en-US", { minimumFractionDigits: least, maximumFractionDigits: most });
  formatters.set(key, made);
  return made;
}

export function figureWords(value: number, spec: Pick<LaneStripSpec, "unit" | "axis">) {
  const decimals = decimalsOf(spec);
  return formatter(decimals, decimals).format(value);
}

/** Axis figures are round, so they need no more digits than the step has. */
export function axisWords(value: number, spec: Pick<LaneStripSpec, "unit" | "axis">) {
  const decimals = spec.axis.step >= 1 ? 0 : Math.min(4, Math.ceil(-Math.log10(spec.axis.step)));
  return formatter(0, decimals).format(value);
}

/** "340 to 379"; the heap's upper border belongs to the next one. */
function heapRangeWords(heap: Heap, spec: LaneStripSpec) {
  if (heap.from === null && heap.to === null) return "all";
  if (heap.from === null) return `${figureWords(heap.to ?? 0, spec)} and less`;
  if (heap.to === null) return `${figureWords(heap.from, spec)} and more`;
  return `${figureWords(heap.from, spec)} to ${figureWords(heap.to - 10 ** -decimalsOf(spec), spec)}`;
}

/** As in a table, where the columns are narrow: "340–379". */
export function heapColumnWords(heap: Heap, spec: LaneStripSpec) {
  return heapRangeWords(heap, spec).replace(" to ", "–");
}

/** "340 to 379 lb: 7 towns", for whoever runs a finger or the arrow keys along the lane. */
export function heapWords(heap: Heap, peers: ShownPeers, spec: LaneStripSpec) {
  const about = peers.heapKind === "bars" ? "about " : "";
  return `${heapRangeWords(heap, spec)} ${spec.unit}: ${about}${townsInHeap(peers, heap)} towns`;
}

export function isOwnHeap(heap: Heap, own: { value: number } | null) {
  if (own === null) return false;
  return own.value >= (heap.from ?? -Infinity) && own.value < (heap.to ?? Infinity);
}

/** What one dot or bar stands for, when that has to be said; `null` when there are none. */
export function markWords(spec: LaneStripSpec, size: StripSize = "desk") {
  const { heaps, townsPerMark } = stripParts(spec, size);
  if (heaps === "none") return null;
  return heaps === "grains" ? "each dot is one town" : `each bar is about ${townsPerMark} towns`;
}

/** The same thing the picture says, as sentences. The text alternative of every lane strip. */
export function laneStripSentence(spec: LaneStripSpec, size: StripSize = "desk") {
  const { peers, band, own, unit } = spec;
  const parts = stripParts(spec, size);
  const words = (value: number) => figureWords(value, spec);
  const sentences: string[] = [];
  if (own !== null && parts.hasFlag) {
    const note = own.note === "" ? "" : `, ${own.note}`;
    sentences.push(`Ours is ${words(own.value)} ${unit}${note}.`);
  }
  if (peers.state === "withheld") {
    sentences.push(`The peers’ figures are hidden to protect members: ${peers.reason}.`);
  } else {
    const interval =
      peers.interval === null ? "" : `, likely between ${words(peers.interval.low)} and ${words(peers.interval.high)}`;
    sentences.push(`The peer median is ${words(peers.median)} ${unit}${interval}.`);
    if (peers.middleHalf !== null) {
      sentences.push(
        `Half of the towns lie between ${words(peers.middleHalf.low)} and ${words(peers.middleHalf.high)}.`,
      );
    }
    sentences.push(`From ${spec.townCountWords}.`);
  }
  if (band !== null) sentences.push(`The band is ${words(band.low)} to ${words(band.high)}.`);
  return sentences.join(" ");
}
