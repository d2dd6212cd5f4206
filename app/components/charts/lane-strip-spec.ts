/** The interval, the middle half, or the band: both ends in the strip's unit. */
type Range = { low: number; high: number };

/** Several towns together. `null` marks the open end of the first and the last heap. */
export type Heap = { from: number | null; to: number | null; count: number };

export type ShownPeers = {
  state: "shown";
  median: number;
  /** Replaces "median 320" on the plate where there is room: "half lay more than 320". */
  medianWords?: string;
  interval: Range | null;
  middleHalf: Range | null;
  heaps: Heap[];
  /** Grains: `count` is towns, each a dot. Bars: `count` is bars, each about three towns. */
  heapKind: "grains" | "bars";
};

/** All that a lane strip shows, already protected: nothing in it is another town's own figure. */
export type LaneStripSpec = {
  unit: string;
  /** Frozen with the edition and rounded outward; never the data's own ends. */
  axis: { from: number; to: number; step: number };
  band: { low: number; high: number; label: string } | null;
  peers: { state: "withheld"; reason: string } | ShownPeers;
  /** `label` stands on the flag ("388", "you 388"), `note` beside it; where there is no room for that, `shortNote`. */
  own: { value: number; label: string; note: string; shortNote?: string } | null;
  townCountWords: string;
  /** Bars even where dots would do, because another strip of the page needs them. */
  isInBars?: boolean;
};

export type StripSize = "desk" | "phone" | "wall";

/** Which parts of the strip are drawn. */
export type StripParts = {
  hasPlate: boolean;
  hasInterval: boolean;
  hasMiddleHalf: boolean;
  heaps: "none" | "grains" | "bars";
  hasFlag: boolean;
  /** Towns that one dot or one bar stands for, about. */
  townsPerMark: number;
};

const rowsOfGrains = 3;
const grainsInRow = 3;
const barsInHeap = 5;
const townsPerBar = 3;

/**
 * The parts a strip has. The more towns report, the more the edition releases: first the median, then its interval,
 * then the middle half (which takes the interval's place on the road) and the heaps.
 *
 * The wall never shows a town's own flag and counts in bars, whatever it is handed.
 */
export function stripParts(spec: LaneStripSpec, size: StripSize = "desk"): StripParts {
  const { peers } = spec;
  const isShown = peers.state === "shown";
  const hasMiddleHalf = isShown && peers.middleHalf !== null;
  const marks = isShown ? heapMarks(peers, size, spec.isInBars === true) : { heaps: "none" as const, townsPerMark: 1 };
  return {
    hasPlate: isShown,
    hasInterval: isShown && !hasMiddleHalf && peers.interval !== null,
    hasMiddleHalf,
    ...marks,
    hasFlag: spec.own !== null && size !== "wall",
  };
}

/** The strips of one page, all in dots or all in bars: a page that counts in two ways would be misread. */
export function markedAlike(specs: readonly LaneStripSpec[]): LaneStripSpec[] {
  const isInBars = specs.some((spec) => stripParts(spec).heaps === "bars");
  return specs.map((spec) => ({ ...spec, isInBars }));
}

/** How many dots or bars each heap is drawn with, in the order of the heaps. */
export function marksPerHeap(spec: LaneStripSpec, size: StripSize = "desk") {
  const { peers } = spec;
  if (peers.state === "withheld") return [];
  const { heaps, townsPerMark } = stripParts(spec, size);
  if (heaps === "grains") return peers.heaps.map((heap) => heap.count);
  return peers.heaps.map((heap) => Math.max(1, Math.round(townsInHeap(peers, heap) / townsPerMark)));
}

/** Towns in one heap; about, when the heap was counted in bars. */
export function townsInHeap(peers: ShownPeers, heap: Heap) {
  return peers.heapKind === "bars" ? heap.count * townsPerBar : heap.count;
}

function heapMarks(peers: ShownPeers, size: StripSize, isInBars: boolean): Pick<StripParts, "heaps" | "townsPerMark"> {
  if (peers.heaps.length === 0) return { heaps: "none", townsPerMark: 1 };
  const tallestTownCount = Math.max(...peers.heaps.map((heap) => townsInHeap(peers, heap)));
  const isLow = tallestTownCount <= rowsOfGrains * grainsInRow;
  if (peers.heapKind === "grains" && isLow && !isInBars && size !== "wall") return { heaps: "grains", townsPerMark: 1 };
  return { heaps: "bars", townsPerMark: townsPerBarFor(tallestTownCount) };
}

/** Three, unless a heap would outgrow the lane; then the next round number that keeps it at five bars. */
function townsPerBarFor(tallestTownCount: number) {
  if (tallestTownCount <= townsPerBar * barsInHeap) return townsPerBar;
  const least = tallestTownCount / barsInHeap;
  const magnitude = 10 ** Math.floor(Math.log10(least));
  const factor = [1, 2, 5, 10].find((candidate) => candidate * magnitude >= least) ?? 10;
  return factor * magnitude;
}
