import type { LaneStripSpec, ShownPeers } from "#app/components/charts/lane-strip-spec.ts";

/** Strips with invented figures, by how many towns stand behind them. */
export const manyTowns: LaneStripSpec = {
  unit: "lb per lane mile",
  axis: { from: 180, to: 470, step: 50 },
  band: { low: 250, high: 300, label: "band 250–300" },
  peers: {
    state: "shown",
    median: 320,
    interval: { low: 280, high: 370 },
    middleHalf: { low: 270, high: 380 },
    heaps: [
      { from: null, to: 220, count: 3 },
      { from: 220, to: 240, count: 3 },
      { from: 240, to: 260, count: 3 },
      { from: 260, to: 280, count: 3 },
      { from: 280, to: 320, count: 5 },
      { from: 320, to: 340, count: 4 },
      { from: 340, to: 380, count: 7 },
      { from: 380, to: 400, count: 4 },
      { from: 400, to: null, count: 4 },
    ],
    heapKind: "grains",
  },
  own: { value: 388, label: "388", note: "85th percentile" },
  townCountWords: "36 towns",
};

export const nineTowns = { ...shown(manyTowns, { middleHalf: null, heaps: [] }), townCountWords: "10 towns" };
export const sixTowns = { ...shown(nineTowns, { interval: null }), townCountWords: "7 towns" };
export const fewTowns: LaneStripSpec = {
  ...manyTowns,
  peers: { state: "withheld", reason: "too few towns" },
  townCountWords: "fewer than six towns",
};

/** The same strip with some of its peers' figures replaced. */
export function shown(spec: LaneStripSpec, change: Partial<ShownPeers>): LaneStripSpec {
  if (spec.peers.state === "withheld") throw new Error("a withheld strip has no figures to replace");
  return { ...spec, peers: { ...spec.peers, ...change } };
}
