import { useEffect, useId, useRef, useState } from "react";
import { layOutStrip, phoneBelowPx, type StripLayout } from "./lane-strip-layout.ts";
import type { LaneStripSpec } from "./lane-strip-spec.ts";

/**
 * Draws the strip again in the browser at the width there is, and again when that changes.
 * `layout` is null until then: the drawing the server sent stands, and goes on standing if this fails.
 */
export function useLiveStrip(spec: LaneStripSpec) {
  const frame = useRef<HTMLDivElement>(null);
  const hatchId = `hatch-${useId()}`;
  const [layout, setLayout] = useState<StripLayout | null>(null);

  useEffect(() => {
    const host = frame.current;
    if (host === null) return;
    let isGone = false;
    let drawnPx = 0;
    let watcher: ResizeObserver | null = null;
    void import("./lane-strip-plot.ts").then(({ laneStripPlot }) => {
      if (isGone) return;
      watcher = new ResizeObserver(([entry]) => {
        const widthPx = Math.round(entry?.contentRect.width ?? 0);
        if (widthPx === 0 || widthPx === drawnPx) return;
        drawnPx = widthPx;
        const size = widthPx < phoneBelowPx ? "phone" : "desk";
        host.replaceChildren(laneStripPlot(spec, { size, widthPx, hatchId }));
        setLayout(layOutStrip(spec, size, widthPx));
      });
      watcher.observe(host);
    }, keepStaticDrawing);
    return () => {
      isGone = true;
      watcher?.disconnect();
    };
  }, [spec, hatchId]);

  return { frame, layout };
}

/** No signal, no drawing library: the static strip says the same. */
function keepStaticDrawing() {
  return undefined;
}
