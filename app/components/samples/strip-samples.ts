import type { LaneStripSpec, ShownPeers } from "#app/components/charts/lane-strip-spec.ts";
import { exampleStrip } from "#app/components/charts/front-strip.tsx";

type Sample = { key: string; title: string; spec: LaneStripSpec };

const median = 320;
const few: ShownPeers = { state: "shown", median, interval: null, middleHalf: null, heaps: [], heapKind: "grains" };
const interval = { low: 280, high: 370 };
const middleHalf = { low: 270, high: 380 };
const heaps = exampleStrip.peers.state === "shown" ? exampleStrip.peers.heaps : [];
const many: ShownPeers = { ...few, interval, middleHalf, heaps };
const member: LaneStripSpec = {
  ...exampleStrip,
  peers: many,
  own: { value: 388, label: "388", note: "85th percentile" },
};

/** The strip in every state by count of towns, and at its edges. All figures are made up. */
export const stripSamples: readonly Sample[] = [
  {
    key: "withheld",
    title: "1 to 5 towns: hidden",
    spec: { ...member, peers: { state: "withheld", reason: "too few towns" }, townCountWords: "fewer than six towns" },
  },
  { key: "six", title: "6 to 8 towns: median", spec: { ...member, peers: few, townCountWords: "7 towns" } },
  {
    key: "nine",
    title: "9 to 11 towns: its interval",
    spec: { ...member, peers: { ...few, interval }, townCountWords: "10 towns" },
  },
  { key: "twelve", title: "12 and more: heaps", spec: member },
  {
    key: "tall",
    title: "A tall heap: bars",
    spec: {
      ...member,
      peers: { ...many, heaps: heaps.map((heap) => ({ ...heap, count: heap.count * 2 })) },
      townCountWords: "72 towns",
    },
  },
  {
    key: "in-band",
    title: "Ours in the band",
    spec: { ...member, own: { value: 278, label: "278", note: "30th percentile" }, peers: { ...many, median: 286 } },
  },
  {
    key: "beyond",
    title: "Ours beyond the axis",
    spec: { ...member, own: { value: 612, label: "612", note: "above all others" } },
  },
  { key: "no-own", title: "Nothing of ours", spec: { ...member, own: null } },
  {
    key: "ratio",
    title: "Salt for the winter it was",
    spec: {
      unit: "times the expected",
      axis: { from: 0.65, to: 1.35, step: 0.1 },
      band: null,
      own: { value: 1.18, label: "1.18", note: "80th percentile" },
      peers: {
        state: "shown",
        median: 1,
        interval: { low: 0.85, high: 1.1 },
        middleHalf: { low: 0.85, high: 1.15 },
        heaps: [
          { from: null, to: 0.75, count: 5 },
          { from: 0.75, to: 0.85, count: 3 },
          { from: 0.85, to: 0.95, count: 5 },
          { from: 0.95, to: 1.05, count: 9 },
          { from: 1.05, to: 1.2, count: 8 },
          { from: 1.2, to: null, count: 4 },
        ],
        heapKind: "grains",
      },
      townCountWords: "34 towns",
    },
  },
];

/** As the wall shows it: bars of about three, no flag, the count as a range. */
export const wallSample: LaneStripSpec = {
  ...member,
  own: null,
  peers: {
    ...many,
    medianWords: `half lay more than ${median}`,
    heapKind: "bars",
    heaps: heaps.map((heap) => ({ ...heap, count: Math.max(1, Math.round(heap.count / 3)) })),
  },
  townCountWords: "25 to 49 towns",
};
