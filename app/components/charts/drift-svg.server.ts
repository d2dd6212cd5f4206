import { parseHTML } from "linkedom";
import { fingerprint } from "./chart-parts.ts";
import { driftPlot } from "./drift-plot.ts";
import type { DriftSpec } from "./drift-spec.ts";

const { document } = parseHTML("<!doctype html><html><body></body></html>");

/** The drawings of a page's first view, for wide and for narrow room. */
export function driftSvgs(spec: DriftSpec) {
  const draw = (widthPx: number) =>
    driftPlot(spec, { widthPx, hatchId: `drift-${widthPx}-${fingerprint(JSON.stringify(spec))}`, document }).outerHTML;
  return { desk: draw(760), phone: draw(328) };
}
