import type { RenderFunction } from "@observablehq/plot";
import { edgeInset, type FlagLayout, type StripLayout } from "./lane-strip-layout.ts";

const svgNamespace = "http://www.w3.org/2000/svg" as const;

type Attributes = Record<string, string | number>;

function element(
  document: Document,
  name: string,
  attributes: Attributes,
  children: readonly (Element | string)[] = [],
) {
  const made = document.createElementNS(svgNamespace, name);
  for (const [key, value] of Object.entries(attributes)) made.setAttribute(key, String(value));
  made.append(...children);
  return made;
}

/** A mark drawn in the strip's own pixels, for the parts that are a drawing and not data. */
function drawing(make: (document: Document) => readonly Element[]): RenderFunction {
  return (_index, _scales, _values, _dimensions, context) => element(context.document, "g", {}, make(context.document));
}

/** The band on the road: hatched at 45°, edges that rise over the lane and close in a bracket. */
export function bandMark(layout: StripLayout, hatchId: string) {
  const { band, scale, laneTop, laneBottom, laneHeight } = layout;
  if (band === null) return null;
  const rise = laneTop - 6 * scale;
  const pitch = 9 * scale;
  return drawing((document) => [
    element(document, "defs", {}, [
      element(
        document,
        "pattern",
        { id: hatchId, width: pitch, height: pitch, patternUnits: "userSpaceOnUse", patternTransform: "rotate(45)" },
        [element(document, "rect", { width: 2.6 * scale, height: pitch, fill: "var(--color-lane-hatch)" })],
      ),
    ]),
    element(document, "rect", {
      "data-part": "hatch",
      x: round(band.x1),
      y: laneTop,
      width: round(band.x2 - band.x1),
      height: laneHeight,
      fill: `url(#${hatchId})`,
    }),
    element(document, "path", {
      d: `M${round(band.x1)} ${laneBottom}V${rise}H${round(band.x2)}V${laneBottom}`,
      fill: "none",
      stroke: "var(--color-lane-hatch)",
      "stroke-width": 2.5 * scale,
    }),
  ]);
}

/** The centre line, laid outwards from the median's break so that both sides start on a dash. */
export function centreLineMark(layout: StripLayout) {
  const { plate, interval, scale, centreY, width } = layout;
  const dash = {
    stroke: "var(--color-lane-paint)",
    "stroke-width": 2.5 * scale,
    "stroke-dasharray": `${18 * scale} ${14 * scale}`,
    fill: "none",
  };
  if (plate === null)
    return drawing((document) => [element(document, "path", { ...dash, d: `M0 ${centreY}H${width}` })]);
  const clear = 5 * scale;
  const left = Math.min(plate.x1 - clear, interval?.x1 ?? Infinity);
  const right = Math.max(plate.x2 + clear, interval?.x2 ?? -Infinity);
  return drawing((document) => [
    element(document, "path", { ...dash, d: `M${round(left)} ${centreY}H0M${round(right)} ${centreY}H${width}` }),
  ]);
}

/** The likely interval of the median: a bracket lying on the centre line. */
export function intervalMark(layout: StripLayout) {
  const { interval, scale, centreY } = layout;
  if (interval === null) return null;
  const half = 7 * scale;
  const [x1, x2] = [round(interval.x1), round(interval.x2)];
  return drawing((document) => [
    element(document, "path", {
      "data-part": "interval",
      d: `M${x1} ${centreY - half}V${centreY + half}M${x2} ${centreY - half}V${centreY + half}M${x1} ${centreY}H${x2}`,
      fill: "none",
      stroke: "var(--color-lane-paint)",
      "stroke-width": 2.5 * scale,
    }),
  ]);
}

/** Our stake on its casing, foot on the centre line; the flag above with the value, the note beside it. */
export function flagMark(layout: StripLayout) {
  const { flag, laneTop, centreY } = layout;
  if (flag === null) return null;
  const x = round(flag.x);
  const stake = { x1: x, x2: x, fill: "none" };
  return drawing((document) => [
    element(document, "line", {
      ...stake,
      y1: laneTop,
      y2: centreY,
      stroke: "var(--color-lane-casing)",
      "stroke-width": 7,
    }),
    element(document, "line", {
      ...stake,
      y1: laneTop,
      y2: centreY,
      stroke: "var(--color-lane-stake)",
      "stroke-width": 4,
    }),
    element(document, "line", {
      ...stake,
      y1: laneTop + 8,
      y2: centreY - 4,
      stroke: "var(--color-lane-casing)",
      "stroke-width": 4,
      "stroke-dasharray": "4 7",
    }),
    element(document, "line", { ...stake, y1: 1, y2: laneTop, stroke: "var(--color-spruce)", "stroke-width": 4 }),
    element(document, "circle", { cx: x, cy: centreY, r: 7, fill: "var(--color-lane-casing)" }),
    element(document, "circle", { cx: x, cy: centreY, r: 4.2, fill: "var(--color-lane-stake)" }),
    element(document, "path", { "data-part": "flag", d: flagOutline(flag), fill: "var(--color-spruce)" }),
    ...flagWords(document, flag),
  ]);
}

function flagOutline(flag: FlagLayout) {
  const pole = flag.isLeft ? flag.x + 2 : flag.x - 2;
  const notch = flag.isLeft ? flag.flyX + 7 : flag.flyX - 7;
  const [p, f, n] = [round(pole), round(flag.flyX), round(notch)];
  return `M${p} 1H${f}L${n} 14L${f} 27H${p}z`;
}

function flagWords(document: Document, flag: FlagLayout) {
  const toward = flag.isLeft ? 1 : -1;
  const middle = (flag.x + flag.flyX) / 2 + toward * 2.5;
  const words = element(
    document,
    "text",
    {
      x: round(middle),
      y: 19.7,
      "text-anchor": "middle",
      "font-size": 16,
      "font-weight": 700,
      fill: "var(--color-on-spruce)",
    },
    [flag.words],
  );
  if (flag.note === null) return [words];
  const anchor = flag.isLeft ? "end" : "start";
  const x = round(flag.flyX - toward * 8);
  const look = { x, y: 19, "text-anchor": anchor, "font-size": 14.4, "font-weight": 600, fill: "var(--color-spruce)" };
  return [words, element(document, "text", look, [flag.note])];
}

/** Edge lines of the lane. */
export function edgeYs({ laneTop, laneBottom, scale }: StripLayout) {
  return [laneTop + edgeInset * scale, laneBottom - edgeInset * scale];
}

export function round(px: number) {
  return Math.round(px * 10) / 10;
}
