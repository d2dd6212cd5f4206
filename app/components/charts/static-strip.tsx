import { createContext, use } from "react";
import type { LaneStripSpec, StripSize } from "./lane-strip-spec.ts";

/** Draws a strip as text. The server gives it; the browser has none, and draws live instead. */
export const DrawStripContext = createContext<((spec: LaneStripSpec, size: StripSize) => string) | null>(null);

type Props = { spec: LaneStripSpec; size: StripSize; className: string };

/**
 * The server's drawing of a strip. It stands in the page alone, not a second time in the page's data: the browser
 * leaves what it finds untouched, and on a page it opens by itself it keeps an empty lane until the live one is there.
 */
export function StaticStrip({ spec, size, className }: Props) {
  const draw = use(DrawStripContext);
  return (
    <div
      className={`empty:mt-12 empty:mb-6 empty:h-22 empty:rounded-plate empty:bg-lane ${className}`}
      suppressHydrationWarning
      dangerouslySetInnerHTML={{ __html: draw === null ? "" : draw(spec, size) }}
    />
  );
}
