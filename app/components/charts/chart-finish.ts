/** How a chart is drawn: the same on the server, which gives its document, and in the browser, which gives its width. */
export type ChartSize = { widthPx: number; document?: Document };
export type DrawChart<Spec> = (spec: Spec, size: ChartSize) => Element;

/** Under this width a chart is laid out as on a phone. */
export const narrowBelowPx = 520;

/**
 * Names the picture for the ear and takes out what a picture may not carry: the library's own style element, which the
 * content security policy would block, and labels on groups, which mean nothing there.
 */
export function finishChart(drawn: Element, sentence: string) {
  for (const style of drawn.querySelectorAll("style")) style.remove();
  for (const group of drawn.querySelectorAll("g[aria-label]")) group.removeAttribute("aria-label");
  const title = drawn.ownerDocument.createElementNS("http://www.w3.org/2000/svg", "title");
  title.append(sentence);
  drawn.prepend(title);
  drawn.setAttribute("role", "img");
  return drawn;
}
