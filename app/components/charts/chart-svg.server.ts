import { parseHTML } from "linkedom";
import type { DrawChart } from "./chart-finish.ts";

const { document } = parseHTML("<!doctype html><html><body></body></html>");
/** A tenth of a px is finer than any screen; more digits only make the page heavier. */
const longFigure = /(-?\d+\.\d{2,})/g;

function drawn<Spec>(draw: DrawChart<Spec>, spec: Spec, widthPx: number) {
  const { outerHTML } = draw(spec, { widthPx, document });
  return outerHTML.replace(/ (?:d|x|y|x1|x2|y1|y2|width|height|cx|cy|transform|points)="[^"]*"/g, (attribute) =>
    attribute.replace(longFigure, (figure) => String(Math.round(Number(figure) * 10) / 10)),
  );
}

/** Both drawings of a chart that a page sends for its first view: which one shows is decided by the room there is. */
export function chartSvgs<Spec>(draw: DrawChart<Spec>, spec: Spec) {
  return { desk: drawn(draw, spec, 860), phone: drawn(draw, spec, 328) };
}
