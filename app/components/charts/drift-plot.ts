import * as Plot from "@observablehq/plot";
import { bandHatch, finishChart, roundStep, tenth } from "./chart-parts.ts";
import { driftReach, driftSentence, type DriftPoint, type DriftSpec } from "./drift-spec.ts";

type DrawOptions = { widthPx: number; hatchId: string; document?: Document };

const height = 210;
const [left, right, top, bottom] = [44, 34, 30, 34];
const labelPx = 13.33;
const quiet = "var(--color-gravel)";

/** Calibrations of one truck and material over the years, each with its ±, the band across. */
export function driftPlot(spec: DriftSpec, { widthPx: width, hatchId, document }: DrawOptions) {
  const { points, band } = spec;
  const reach = driftReach(spec);
  const days = points.map(({ dayNumber }) => dayNumber);
  const [first, last] = [Math.min(...days), Math.max(...days)];
  const inset = 26;
  const x = ({ dayNumber }: DriftPoint) => {
    const share = last === first ? 0.5 : (dayNumber - first) / (last - first);
    return tenth(left + inset + share * (width - left - right - 2 * inset));
  };
  const y = (rate: number) =>
    tenth(top + (1 - (rate - reach.from) / (reach.to - reach.from)) * (height - top - bottom));
  const step = roundStep(reach.to - reach.from, 4);
  const firstTick = Math.ceil(reach.from / step) * step;
  const ticks = Array.from({ length: Math.floor((reach.to - firstTick) / step) + 1 }, (_, i) => firstTick + i * step);
  const words = { fill: quiet, fontSize: labelPx, fontVariant: "normal" as const };
  const measured = points.filter(({ plusMinus }) => plusMinus !== null);
  const drawn = Plot.plot({
    ...(document === undefined ? {} : { document }),
    className: "strip",
    width,
    height,
    margin: 0,
    x: { type: "linear", domain: [0, width], range: [0, width], axis: null },
    y: { type: "linear", domain: [0, height], range: [0, height], axis: null },
    marks: [
      band === null ? null : bandHatch({ x1: left, x2: width - right, y1: y(band.high), y2: y(band.low) }, hatchId),
      Plot.ruleY(ticks, { x1: left, x2: width - right, y, stroke: "var(--color-rule)" }),
      Plot.text(ticks, {
        x: left - 6,
        y,
        text: (rate: number) => rate.toLocaleString("en-US"),
        textAnchor: "end",
        ...words,
      }),
      Plot.text([spec.rateUnit], { x: 0, y: 9, text: (unit: string) => unit, textAnchor: "start", ...words }),
      Plot.line(points, { x, y: ({ rate }: DriftPoint) => y(rate), stroke: quiet, strokeWidth: 1.5 }),
      Plot.ruleX(measured, {
        x,
        y1: ({ rate, plusMinus }: DriftPoint) => y(rate - (plusMinus ?? 0)),
        y2: ({ rate, plusMinus }: DriftPoint) => y(rate + (plusMinus ?? 0)),
        stroke: "var(--color-asphalt)",
        strokeWidth: 1.6,
      }),
      Plot.dot(points, {
        x,
        y: ({ rate }: DriftPoint) => y(rate),
        r: ({ isOurs }: DriftPoint) => (isOurs ? 7 : 4.5),
        fill: ({ isOurs }: DriftPoint) => (isOurs ? "var(--color-spruce)" : "var(--color-asphalt)"),
        stroke: "var(--color-salt)",
        strokeWidth: 1.6,
      }),
      yearMarks(points, x, words),
    ],
    r: { type: "identity" },
    color: { type: "identity" },
  });
  return finishChart(drawn, driftSentence(spec));
}

/** One label a year at its first calibration; more would run into one another. */
function yearMarks(points: readonly DriftPoint[], x: (point: DriftPoint) => number, words: object) {
  const firsts = points.filter(
    ({ testedOn }, position) => testedOn.slice(0, 4) !== points[position - 1]?.testedOn.slice(0, 4),
  );
  return Plot.text(firsts, {
    x,
    y: height - bottom + 16,
    text: ({ testedOn }: DriftPoint) => testedOn.slice(0, 4),
    ...words,
  });
}
