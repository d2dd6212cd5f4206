import * as Plot from "@observablehq/plot";
import { type BuildUpSpec, monthStarts } from "./build-up-spec.ts";
import { type ChartSize, finishChart, narrowBelowPx } from "./chart-finish.ts";
import { textWidthPx } from "./text-width.ts";

type Day = BuildUpSpec["days"][number];
const labelPx = 13.3;

/**
 * The build-up of a winter: a heavy line for this one, with the part that snow gave under it, over the middle half of
 * the station's winters and their dashed median. Days with a missing reading are ticks on the ground.
 */
export function buildUpPlot(spec: BuildUpSpec, { widthPx, document }: ChartSize) {
  const isNarrow = widthPx < narrowBelowPx;
  const last = spec.days.at(-1);
  const usualLast = spec.usual?.at(-1);
  const most = Math.max(10, ...spec.days.map(({ totalPoints }) => totalPoints), usualLast?.highPoints ?? 0);
  const marginRight = isNarrow ? 12 : Math.max(70, textWidthPx(spec.endWords, 15, true) + 16);
  const missing = spec.days.filter(({ isMissing }) => isMissing);
  const firstDay = Math.min(93, spec.days[0]?.dayOfSeason ?? 93);
  const lastDay = Math.max(320, last?.dayOfSeason ?? 320);
  const usual = spec.usual?.filter(({ dayOfSeason }) => dayOfSeason <= lastDay) ?? [];
  const drawn = Plot.plot({
    ...(document === undefined ? {} : { document }),
    className: "strip",
    width: widthPx,
    height: isNarrow ? 260 : 330,
    marginTop: 18,
    marginBottom: 30,
    marginLeft: 52,
    marginRight,
    x: { domain: [firstDay, lastDay], axis: null },
    y: { domain: [0, most * 1.05], axis: null },
    marks: [
      Plot.gridY({ ticks: 4, stroke: "var(--color-rule)", strokeOpacity: 1 }),
      Plot.axisY({
        ticks: 4,
        tickSize: 0,
        fontSize: labelPx,
        color: "var(--color-gravel)",
        label: null,
        tickFormat: (points: number) => points.toLocaleString("en-US"),
      }),
      Plot.areaY(usual, {
        x: "dayOfSeason",
        y1: "lowPoints",
        y2: "highPoints",
        fill: "var(--color-lane-track)",
        fillOpacity: 0.28,
      }),
      Plot.lineY(usual, {
        x: "dayOfSeason",
        y: "medianPoints",
        stroke: "var(--color-lane-track)",
        strokeWidth: 2,
        strokeDasharray: "9 7",
      }),
      Plot.areaY(spec.days, { x: "dayOfSeason", y: "snowPoints", fill: "var(--color-glacier)", fillOpacity: 0.3 }),
      Plot.lineY(spec.days, {
        x: "dayOfSeason",
        y: "totalPoints",
        stroke: "var(--color-spruce)",
        strokeWidth: 3.5,
        curve: "step-after",
      }),
      Plot.ruleY([0], { stroke: "var(--color-line)", strokeWidth: 1.5 }),
      Plot.ruleX(missing, {
        x: "dayOfSeason",
        y1: 0,
        y2: most * 0.05,
        stroke: "var(--color-rust)",
        strokeWidth: 2,
      }),
      Plot.text(isNarrow ? monthStarts.filter((_, place) => place % 2 === 0) : monthStarts, {
        x: "dayOfSeason",
        frameAnchor: "bottom",
        text: "label",
        textAnchor: "start",
        dy: 20,
        fontSize: labelPx,
        fill: "var(--color-gravel)",
      }),
      last === undefined
        ? null
        : Plot.text([last], {
            x: "dayOfSeason",
            y: "totalPoints",
            text: (_day: Day) => spec.endWords,
            textAnchor: isNarrow ? "end" : "start",
            dx: isNarrow ? -4 : 4,
            dy: isNarrow ? -14 : 16,
            fontSize: 15,
            fontWeight: 700,
            fill: "var(--color-spruce)",
            stroke: "var(--color-salt)",
            strokeWidth: 4,
          }),
    ],
  });
  return finishChart(drawn, spec.sentence);
}
