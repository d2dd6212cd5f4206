import type { RenderFunction } from "@observablehq/plot";

const svgNamespace = "http://www.w3.org/2000/svg";

type Attributes = Record<string, string | number>;

function element(document: Document, name: string, attributes: Attributes, children: readonly Element[] = []) {
  const made = document.createElementNS(svgNamespace, name);
  for (const [key, value] of Object.entries(attributes)) made.setAttribute(key, String(value));
  made.append(...children);
  return made;
}

/** A tenth of a px is finer than any screen. */
export function tenth(px: number) {
  return Math.round(px * 10) / 10;
}

type Stretch = { x1: number; x2: number; y1: number; y2: number };

/** The band across a chart, in its own px: a hatch at 45° between two edges, so that it is told apart without colour. */
export function bandHatch({ x1, x2, y1, y2 }: Stretch, hatchId: string): RenderFunction {
  return (_index, _scales, _values, _dimensions, { document }) => {
    const line = { width: 2.2, height: 8, fill: "var(--color-beacon)" };
    const tile = { id: hatchId, width: 8, height: 8, patternUnits: "userSpaceOnUse", patternTransform: "rotate(45)" };
    const box = { x: tenth(x1), y: tenth(y1), width: tenth(x2 - x1), height: tenth(y2 - y1) };
    const edge = { x1: tenth(x1), x2: tenth(x2), stroke: "var(--color-beacon-ink)", "stroke-width": 1.2 };
    return element(document, "g", {}, [
      element(document, "defs", {}, [element(document, "pattern", tile, [element(document, "rect", line)])]),
      element(document, "rect", { ...box, fill: `url(#${hatchId})`, "fill-opacity": 0.55 }),
      element(document, "line", { ...edge, y1: tenth(y1), y2: tenth(y1) }),
      element(document, "line", { ...edge, y1: tenth(y2), y2: tenth(y2) }),
    ]);
  };
}

/** Names the picture for the ear, and takes out what the content security policy and a picture may not carry. */
export function finishChart(drawn: Element, sentence: string) {
  for (const style of drawn.querySelectorAll("style")) style.remove();
  for (const group of drawn.querySelectorAll("g[aria-label]")) group.removeAttribute("aria-label");
  const title = drawn.ownerDocument.createElementNS(svgNamespace, "title");
  title.append(sentence);
  drawn.prepend(title);
  drawn.setAttribute("role", "img");
  return drawn;
}

/** Short, and the same for the same text: names a hatch that must be the only one of its kind on a page. */
export function fingerprint(text: string) {
  let hash = 0x811c9dc5;
  for (let i = 0; i < text.length; i += 1) hash = Math.imul(hash ^ text.charCodeAt(i), 0x01000193) >>> 0;
  return hash.toString(36);
}

/** Labels down a side, each as near its place as the others let it be, from the top down. */
export function spread(places: readonly number[], gap: number, lowest: number): number[] {
  const order = places.map((y, index) => ({ y, index })).sort((a, b) => a.y - b.y);
  let from = -Infinity;
  for (const label of order) {
    label.y = Math.max(label.y, from + gap);
    from = label.y;
  }
  let to = lowest + gap;
  for (const label of [...order].reverse()) {
    label.y = Math.min(label.y, to - gap);
    to = label.y;
  }
  const laid = places.map(() => 0);
  for (const { y, index } of order) laid[index] = y;
  return laid;
}

/** Round steps for an axis: at most `most` of them from 0 to the given end. @example roundStep(900, 5) // 200 */
export function roundStep(end: number, most: number) {
  const least = end / most;
  const magnitude = 10 ** Math.floor(Math.log10(least));
  return ([1, 2, 5, 10].find((factor) => factor * magnitude >= least) ?? 10) * magnitude;
}
