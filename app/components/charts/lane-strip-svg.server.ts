import { parseHTML } from "linkedom";
import { laneStripPlot } from "./lane-strip-plot.ts";
import type { LaneStripSpec, StripSize } from "./lane-strip-spec.ts";

const { document } = parseHTML("<!doctype html><html><body></body></html>");

/** A tenth of a px is finer than any screen; more digits only make the page heavier. */
const longFigure = /="(-?\d+\.\d{2,})"/g;

const keptCount = 200;
const kept = new Map<string, string>();

/**
 * The strip as text, for the first view of a page. Editions never change, so the drawing of a spec is kept and the
 * least recently asked for goes first.
 */
export function laneStripSvg(spec: LaneStripSpec, size: StripSize) {
  const key = JSON.stringify([size, spec]);
  const known = kept.get(key);
  const svg = known ?? draw(spec, size, key);
  kept.delete(key);
  kept.set(key, svg);
  if (kept.size > keptCount) {
    const oldest = kept.keys().next();
    if (oldest.done !== true) kept.delete(oldest.value);
  }
  return svg;
}

/** Both drawings a page sends: which one shows is decided by the room there is. */
export function laneStripSvgs(spec: LaneStripSpec) {
  return { desk: laneStripSvg(spec, "desk"), phone: laneStripSvg(spec, "phone") };
}

function draw(spec: LaneStripSpec, size: StripSize, key: string) {
  const drawn = laneStripPlot(spec, { size, hatchId: `hatch-${size}-${fingerprint(key)}`, document });
  return drawn.outerHTML.replace(longFigure, (_, figure: string) => `="${Math.round(Number(figure) * 10) / 10}"`);
}

/** Short and the same for the same text: two equal strips may share a hatch, two different ones must not. */
function fingerprint(text: string) {
  let hash = 0x811c9dc5;
  for (let i = 0; i < text.length; i += 1) hash = Math.imul(hash ^ text.charCodeAt(i), 0x01000193) >>> 0;
  return hash.toString(36);
}
