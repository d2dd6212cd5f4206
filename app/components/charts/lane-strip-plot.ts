import * as Plot from "@observablehq/plot";
import { layOutStrip, type StripLayout } from "./lane-strip-layout.ts";
import { bandMark, centreLineMark, edgeYs, flagMark, intervalMark, round } from "./lane-strip-marks.ts";
import type { LaneStripSpec, StripSize } from "./lane-strip-spec.ts";
import { laneStripSentence } from "./lane-strip-words.ts";

type DrawOptions = {
  size: StripSize;
  widthPx?: number;
  /** Must be the only one of its kind on the page: the hatch is found by it. */
  hatchId: string;
  /** Given on the server, where there is no page. */
  document?: Document;
};

const lane = "var(--color-lane)";
const paint = "var(--color-lane-paint)";
const edge = "var(--color-lane-edge)";

/**
 * The lane strip, the same for the server and the browser. All colours are custom properties, so one drawing serves
 * light, dark and paper. It carries no style element, which the content security policy would block.
 */
export function laneStripPlot(spec: LaneStripSpec, { size, widthPx, hatchId, document }: DrawOptions) {
  const layout = layOutStrip(spec, size, widthPx);
  const { width, height } = layout;
  const drawn = Plot.plot({
    ...(document === undefined ? {} : { document }),
    className: "strip",
    width,
    height,
    margin: 0,
    x: { type: "linear", domain: [0, width], range: [0, width], axis: null },
    y: { type: "linear", domain: [0, height], range: [0, height], axis: null },
    marks: [
      roadMarks(layout),
      bandMark(layout, hatchId),
      lineMarks(layout),
      heapMarks(layout),
      wordMarks(layout),
      flagMark(layout),
    ],
  });
  return finish(drawn, laneStripSentence(spec, size));
}

function roadMarks({ width, laneTop, laneBottom, laneHeight, middleHalf, scale }: StripLayout) {
  const tracks =
    middleHalf === null ? [] : [0.118, 0.6125].map((share) => ({ ...middleHalf, top: laneTop + share * laneHeight }));
  const ends = tracks.flatMap((track) => [track.x1, track.x2].map((x) => ({ x, top: track.top })));
  const trackHeight = 0.2 * laneHeight;
  return [
    Plot.rect([0], { x1: 0, x2: width, y1: laneTop, y2: laneBottom, fill: lane, rx: 2 * scale }),
    Plot.rect(tracks, {
      x1: "x1",
      x2: "x2",
      y1: "top",
      y2: (track: { top: number }) => track.top + trackHeight,
      fill: "var(--color-lane-track)",
    }),
    Plot.ruleX(ends, {
      x: "x",
      y1: "top",
      y2: (end: { top: number }) => end.top + trackHeight,
      stroke: edge,
      strokeWidth: 2 * scale,
    }),
  ];
}

function lineMarks(layout: StripLayout) {
  const { width, laneTop, laneBottom, centreY, plate, notches, scale } = layout;
  return [
    Plot.ruleY(edgeYs(layout), { x1: 0, x2: width, stroke: edge, strokeWidth: 1.5 * scale }),
    Plot.ruleX(notches, {
      y1: laneBottom - 4 * scale,
      y2: laneBottom + 4 * scale,
      stroke: edge,
      strokeWidth: 1.2 * scale,
    }),
    Plot.ruleX(layout.ticks, {
      x: "x",
      y1: laneBottom + scale,
      y2: laneBottom + 5 * scale,
      stroke: "var(--color-gravel)",
      strokeWidth: scale,
    }),
    centreLineMark(layout),
    intervalMark(layout),
    plate === null
      ? null
      : [
          Plot.ruleX([plate.tickX], { y1: laneTop + 4 * scale, y2: centreY, stroke: paint, strokeWidth: 3 * scale }),
          Plot.rect([plate], {
            x1: "x1",
            x2: "x2",
            y1: centreY - plate.height / 2,
            y2: centreY + plate.height / 2,
            fill: lane,
            stroke: paint,
            strokeWidth: 1.2 * scale,
            rx: 2 * scale,
          }),
        ],
  ];
}

function heapMarks({ grains, grainRadius, bars, scale }: StripLayout) {
  const rim = { fill: paint, stroke: lane, strokeWidth: 1.2 * scale };
  return [
    grains.length === 0 ? null : Plot.dot(grains, { x: "x", y: "y", r: grainRadius, ...rim }),
    bars.length === 0
      ? null
      : Plot.rect(bars, {
          x1: "x1",
          x2: "x2",
          y1: "y1",
          y2: "y2",
          rx: ((bars[0]?.y2 ?? 0) - (bars[0]?.y1 ?? 0)) / 2,
          ...rim,
        }),
  ];
}

type Words = { x: number; words: string | null; anchor: "start" | "middle" | "end" };

function wordMarks(layout: StripLayout) {
  const { labelPx, laneTop, laneBottom, laneHeight, centreY, plate, band, openEnds, withheld, scale } = layout;
  // The text marks centre a line on y; the halo keeps words legible across hatch and tracks.
  const words = (items: readonly Words[], y: number, fill: string, fontWeight = 400, halo = false) =>
    (["start", "middle", "end"] as const).map((textAnchor) =>
      Plot.text(
        items.filter((item) => item.anchor === textAnchor && item.words !== null),
        {
          x: "x",
          y: () => round(y),
          text: "words",
          textAnchor,
          fill,
          fontSize: labelPx,
          fontWeight,
          fontVariant: "normal",
          ...(halo ? { stroke: lane, strokeWidth: 4 * scale } : {}),
        },
      ),
    );
  const axisY = laneBottom + (labelPx > 20 ? 28 : 15.5);
  const hidden = withheld === null ? [] : [{ ...withheld, anchor: "middle" as const }];
  return [
    words(layout.ticks, axisY, "var(--color-gravel)"),
    words(openEnds, laneTop + 0.22 * laneHeight, paint, 400, true),
    words(hidden, laneTop + 0.72 * laneHeight, paint, 600, true),
    band === null ? [] : words([band.label], laneTop - (labelPx > 20 ? 29 : 16.5), "var(--color-beacon-ink)", 600),
    plate === null
      ? []
      : words([{ x: (plate.x1 + plate.x2) / 2, words: plate.words, anchor: "middle" }], centreY + 0.5, paint, 700),
  ].flat();
}

/** Names the picture for the ear, and takes out what a picture may not carry. */
function finish(drawn: Element, sentence: string) {
  for (const style of drawn.querySelectorAll("style")) style.remove();
  for (const group of drawn.querySelectorAll("g[aria-label]")) group.removeAttribute("aria-label");
  const title = drawn.ownerDocument.createElementNS("http://www.w3.org/2000/svg", "title");
  title.append(sentence);
  drawn.prepend(title);
  drawn.setAttribute("role", "img");
  return drawn;
}
