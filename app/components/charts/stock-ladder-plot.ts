import * as Plot from "@observablehq/plot";
import { type ChartSize, finishChart, narrowBelowPx } from "./chart-finish.ts";
import type { Rung, StockLadderSpec } from "./stock-ladder-spec.ts";
import { textWidthPx } from "./text-width.ts";

const fills: Record<Rung["tone"], string> = {
  pile: "var(--color-lane)",
  in: "var(--color-spruce)",
  out: "var(--color-lane-track)",
  over: "var(--color-rust)",
};
const labelPx = 14;

/**
 * The stock ladder: each rung starts where the one before ended, so that what is missing at the foot can be seen.
 * Piles are dark from the left edge; movements hang between them; what is unexplained and over the flag is rust with a
 * thick edge and a word, so that it does not rest on its colour.
 */
export function stockLadderPlot(spec: StockLadderSpec, { widthPx, document }: ChartSize) {
  const isNarrow = widthPx < narrowBelowPx;
  const rung = isNarrow ? 30 : 34;
  const wordsPx = Math.max(...spec.rungs.map(({ words }) => textWidthPx(words, labelPx, true)));
  const marginLeft = isNarrow ? 96 : 112;
  const low = Math.min(0, ...spec.rungs.flatMap(({ fromTons, toTons }) => [fromTons, toTons]));
  const rows = spec.rungs.map((each, place) => ({
    ...each,
    low: Math.min(each.fromTons, each.toTons),
    high: Math.max(each.fromTons, each.toTons),
    next: spec.rungs[place + 1]?.label ?? null,
  }));
  const links = rows.flatMap((row, place) => {
    const below = rows[place + 1];
    return below ? [{ tons: row.toTons, from: row.label, to: below.label }] : [];
  });
  const drawn = Plot.plot({
    ...(document === undefined ? {} : { document }),
    className: "strip",
    width: widthPx,
    height: rows.length * rung + 30,
    marginTop: 2,
    marginBottom: 26,
    marginLeft,
    marginRight: wordsPx + 14,
    x: { domain: [low, spec.mostTons], nice: false, axis: null },
    y: { type: "band", domain: rows.map(({ label }) => label), padding: 0.28, axis: null },
    marks: [
      Plot.axisX({
        ticks: isNarrow ? 3 : 6,
        tickSize: 4,
        fontSize: 13.3,
        color: "var(--color-gravel)",
        label: null,
        tickFormat: (tons: number) => tons.toLocaleString("en-US"),
      }),
      Plot.gridX({ ticks: isNarrow ? 3 : 6, stroke: "var(--color-rule)", strokeOpacity: 1 }),
      Plot.rect(rows, {
        x1: "low",
        x2: "high",
        y: "label",
        fill: (row: Rung) => fills[row.tone],
        rx: 2,
      }),
      // A movement too small to see still has its place.
      Plot.ruleX(
        rows.filter(({ tone }) => tone !== "pile"),
        {
          x: "toTons",
          y: "label",
          stroke: (row: Rung) => fills[row.tone],
          strokeWidth: (row: Rung) => (row.tone === "over" ? 5 : 3),
        },
      ),
      Plot.link(links, {
        x1: "tons",
        x2: "tons",
        y1: "from",
        y2: "to",
        stroke: "var(--color-gravel)",
        strokeWidth: 1,
        strokeDasharray: "2 3",
      }),
      Plot.text(rows, {
        x: () => low,
        y: "label",
        text: "label",
        textAnchor: "end",
        dx: -10,
        fontSize: labelPx,
        fill: (row: Rung) => (row.tone === "over" ? fills.over : "var(--color-asphalt)"),
      }),
      Plot.text(rows, {
        x: "high",
        y: "label",
        text: "words",
        textAnchor: "start",
        dx: 8,
        fontSize: labelPx,
        fontWeight: 700,
        fill: (row: Rung) => (row.tone === "over" ? fills.over : "var(--color-asphalt)"),
        stroke: "var(--color-salt)",
        strokeWidth: 4,
      }),
    ],
  });
  return finishChart(drawn, spec.sentence);
}
