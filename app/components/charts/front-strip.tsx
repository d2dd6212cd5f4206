import type { LaneStripSpec } from "./lane-strip-spec.ts";

/** Figures made up for the front page, so that a visitor sees what a member sees. */
export const exampleStrip: LaneStripSpec = {
  unit: "lb per lane mile",
  axis: { from: 180, to: 470, step: 50 },
  band: { low: 250, high: 300, label: "band 250–300" },
  peers: {
    state: "shown",
    median: 320,
    medianWords: "peer median 320",
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
  own: { value: 388, label: "388", note: "your own flag: only you see it" },
  townCountWords: "36 towns",
};

/** The road across the whole front page, from edge to edge, with its caption in the column. */
export function FrontStrip({ svg }: { svg: { desk: string; phone: string } }) {
  return (
    <figure>
      <div className="overflow-hidden sm:hidden" dangerouslySetInnerHTML={{ __html: svg.phone }} />
      {/* Never narrower than it was drawn: the road runs off both sides of a tablet, and its words stay legible. */}
      <div className="hidden justify-center overflow-hidden sm:flex">
        <div className="w-full min-w-222 flex-none" dangerouslySetInnerHTML={{ __html: svg.desk }} />
      </div>
      <figcaption className="mx-auto max-w-column px-4 pt-2 text-s text-gravel sm:px-8">
        Example with invented figures: salt, lb per lane mile at the working setting. Each dot is a town, never fewer
        than three together.
      </figcaption>
    </figure>
  );
}
