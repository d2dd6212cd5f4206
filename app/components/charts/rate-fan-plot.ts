import * as Plot from "@observablehq/plot";
import { bandHatch, finishChart, roundStep, spread, tenth } from "./chart-parts.ts";
import {
  type FanGroup,
  fanGroups,
  fanPlace,
  type FanSize,
  fanTop,
  groupWords,
  type RateFanSpec,
  rateFanSentence,
} from "./rate-fan-spec.ts";

type DrawOptions = {
  size: FanSize;
  widthPx?: number;
  /** The only one of its kind on the page. */
  hatchId: string;
  /** Given on the server, where there is no page. */
  document?: Document;
};

const measures = {
  desk: { width: 760, height: 380, left: 44, right: 58, labelPx: 13.33 },
  phone: { width: 328, height: 330, left: 36, right: 40, labelPx: 13.33 },
} as const;
const top = 26;
const bottom = 44;

const quiet = "var(--color-gravel)";
const ink = "var(--color-asphalt)";
const ours = "var(--color-spruce)";

/** Application rate against speed, one line a setting, the band across: the same drawing for server and browser. */
export function rateFanPlot(spec: RateFanSpec, { size, widthPx, hatchId, document }: DrawOptions) {
  const { height, left, right, labelPx, ...measure } = measures[size];
  const width = widthPx ?? measure.width;
  const highest = fanTop(spec);
  const { speeds, band, working } = spec;
  const x = (speed: number) => left + ((speed - speeds.from) / (speeds.to - speeds.from)) * (width - left - right);
  const y = (rate: number) => top + (1 - rate / highest) * (height - top - bottom);
  const groups = fanGroups(spec);
  const drawn = Plot.plot({
    ...(document === undefined ? {} : { document }),
    className: "strip",
    width,
    height,
    margin: 0,
    x: { type: "linear", domain: [0, width], range: [0, width], axis: null },
    y: { type: "linear", domain: [0, height], range: [0, height], axis: null },
    marks: [
      band === null
        ? null
        : bandHatch({ x1: left, x2: width - right, y1: y(Math.min(band.high, highest)), y2: y(band.low) }, hatchId),
      axisMarks({ x, y, highest, width, height, left, right, spec, labelPx }),
      lineMarks(groups, { x, y, highest, spec }),
      workingMarks({ x, spec, height, labelPx, width }),
      inBandMarks(groups, { x, y, spec, highest }),
      labelMarks(groups, { y, spec, highest, width, right, labelPx, height }),
      band === null || band.high > highest
        ? null
        : Plot.text([{ x: left + 4, y: y(band.high) - 8 }], {
            x: "x",
            y: "y",
            text: () => `band ${Math.round(band.low)}–${Math.round(band.high)}`,
            textAnchor: "start",
            fill: "var(--color-beacon-ink)",
            stroke: "var(--color-salt)",
            strokeWidth: 4,
            fontSize: labelPx,
            fontWeight: 600,
            fontVariant: "normal",
          }),
      workingDot({ x, y, spec, highest, working }),
    ],
  });
  return finishChart(drawn, rateFanSentence(spec));
}

type Scale = (value: number) => number;
type Frame = { x: Scale; y: Scale; highest: number; spec: RateFanSpec };

function axisMarks(frame: Frame & { width: number; height: number; left: number; right: number; labelPx: number }) {
  const { x, y, highest, spec, width, height, left, right, labelPx } = frame;
  const step = roundStep(highest, 5);
  const rates = Array.from({ length: Math.floor(highest / step) + 1 }, (_, i) => i * step);
  const { from, to } = spec.speeds;
  const apart = width < 500 ? 10 : 5;
  const first = Math.ceil(from / apart) * apart;
  const shown = Array.from({ length: Math.floor((to - first) / apart) + 1 }, (_, i) => first + i * apart);
  const words = { fill: quiet, fontSize: labelPx, fontVariant: "normal" as const };
  return [
    Plot.ruleY(rates, {
      x1: left,
      x2: width - right,
      y: (rate: number) => tenth(y(rate)),
      stroke: "var(--color-rule)",
      strokeWidth: 1,
    }),
    Plot.ruleY([tenth(y(0))], { x1: left, x2: width - right, stroke: "var(--color-line)", strokeWidth: 2 }),
    Plot.text(rates, {
      x: left - 6,
      y: (rate: number) => tenth(y(rate)),
      text: (rate: number) => rate.toLocaleString("en-US"),
      textAnchor: "end",
      ...words,
    }),
    Plot.text(shown, {
      x: (speed: number) => tenth(x(speed)),
      y: height - bottom + 14,
      text: (speed: number) => String(speed),
      ...words,
    }),
    Plot.text([spec.rateUnit], { x: 0, y: 9, text: (unit: string) => unit, textAnchor: "start", ...words }),
    Plot.text([spec.speedUnit], {
      x: width - right,
      y: height - 8,
      text: (unit: string) => unit,
      textAnchor: "end",
      ...words,
    }),
  ];
}

/** Each line begins where it comes into the picture, so that nothing has to be cut off. */
function points(group: FanGroup, { spec, highest }: Pick<Frame, "spec" | "highest">) {
  const { from, to } = spec.speeds;
  const start = Math.max(from, group.rateAtOne / highest);
  if (start >= to) return [];
  const steps = 48;
  return Array.from({ length: steps + 1 }, (_, i) => {
    const speed = start + ((to - start) * i) / steps;
    return { speed, rate: group.rateAtOne / speed };
  });
}

function lineMarks(groups: readonly FanGroup[], frame: Frame) {
  const { x, y } = frame;
  return groups.map((group) =>
    Plot.line(points(group, frame), {
      x: (point: { speed: number }) => tenth(x(point.speed)),
      y: (point: { rate: number }) => tenth(y(point.rate)),
      stroke: group.isWorking ? ours : quiet,
      strokeWidth: group.isWorking ? 3.2 : 1.5,
    }),
  );
}

function workingMarks({
  x,
  spec,
  height,
  labelPx,
  width,
}: Pick<Frame, "x" | "spec"> & { height: number; labelPx: number; width: number }) {
  const at = tenth(x(spec.working.speed));
  const isRight = at > width * 0.62;
  return [
    Plot.ruleX([at], { y1: top, y2: height - bottom, stroke: ink, strokeWidth: 1.4, strokeDasharray: "5 4" }),
    Plot.text([at], {
      x: (px: number) => px + (isRight ? -6 : 6),
      y: top + 7,
      text: () => `works at ${Math.round(spec.working.speed)}`,
      textAnchor: isRight ? "end" : "start",
      fill: ink,
      stroke: "var(--color-salt)",
      strokeWidth: 4,
      fontSize: labelPx,
      fontWeight: 600,
      fontVariant: "normal",
    }),
  ];
}

/** A square wherever a cell of the table lies in the band. */
function inBandMarks(groups: readonly FanGroup[], { x, y, spec, highest }: Frame) {
  const { from, to, step } = spec.speeds;
  const speeds = Array.from({ length: Math.floor((to - from) / step + 1e-9) + 1 }, (_, i) => from + i * step);
  const cells = groups.flatMap((group) =>
    speeds
      .map((speed) => ({ speed, rate: group.rateAtOne / speed }))
      .filter(({ rate }) => rate <= highest && fanPlace(rate, spec.band) === "in"),
  );
  return Plot.dot(cells, {
    x: (cell: { speed: number }) => tenth(x(cell.speed)),
    y: (cell: { rate: number }) => tenth(y(cell.rate)),
    symbol: "square",
    r: 4.6,
    fill: "var(--color-beacon-ink)",
    stroke: "var(--color-salt)",
    strokeWidth: 1.6,
  });
}

function workingDot({ x, y, spec, highest, working }: Frame & { working: RateFanSpec["working"] }) {
  const own = spec.lines.find(({ setting }) => setting === working.setting);
  const rate = own ? own.rateAtOne / working.speed : Infinity;
  if (rate > highest) return null;
  return Plot.dot([0], {
    x: tenth(x(working.speed)),
    y: tenth(y(rate)),
    r: 6.5,
    fill: ours,
    stroke: "var(--color-salt)",
    strokeWidth: 2,
  });
}

function labelMarks(
  groups: readonly FanGroup[],
  {
    y,
    spec,
    highest,
    width,
    right,
    labelPx,
    height,
  }: Omit<Frame, "x"> & { width: number; right: number; labelPx: number; height: number },
) {
  const ends = groups.filter((group) => group.rateAtOne / spec.speeds.to <= highest);
  const places = spread(
    ends.map((group) => y(group.rateAtOne / spec.speeds.to)),
    labelPx + 1.5,
    height - bottom - 4,
  );
  const labels = ends.map((group, i) => ({ group, y: tenth(places[i] ?? 0) }));
  return [false, true].map((isWorking) =>
    Plot.text(
      labels.filter(({ group }) => group.isWorking === isWorking),
      {
        x: width - right + 7,
        y: "y",
        text: ({ group }: { group: FanGroup }) => groupWords(group),
        textAnchor: "start",
        fill: isWorking ? ours : quiet,
        fontSize: isWorking ? labelPx + 2 : labelPx,
        fontWeight: isWorking ? 700 : 600,
        fontVariant: "normal",
      },
    ),
  );
}
