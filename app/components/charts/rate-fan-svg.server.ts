import { parseHTML } from "linkedom";
import { fingerprint } from "./chart-parts.ts";
import { rateFanPlot } from "./rate-fan-plot.ts";
import type { FanSize, RateFanSpec } from "./rate-fan-spec.ts";

const { document } = parseHTML("<!doctype html><html><body></body></html>");

function draw(spec: RateFanSpec, size: FanSize) {
  const hatchId = `fan-${size}-${fingerprint(JSON.stringify(spec))}`;
  return rateFanPlot(spec, { size, hatchId, document }).outerHTML;
}

/** Both drawings a page sends: which one shows is decided by the room there is. */
export function rateFanSvgs(spec: RateFanSpec) {
  return { desk: draw(spec, "desk"), phone: draw(spec, "phone") };
}
