import { useEffect, useRef, useState } from "react";

type Draw = (widthPx: number) => Promise<Element>;

/**
 * Draws a chart again in the browser at the width there is, and again when that changes.
 *
 * @param draw - kept the same between renders unless what it draws changes
 * @returns the frame to draw in, and whether it holds a drawing: until then that of the server stands
 */
export function useLivePlot(draw: Draw) {
  const frame = useRef<HTMLDivElement>(null);
  const [isLive, setLive] = useState(false);

  useEffect(() => {
    const host = frame.current;
    if (host === null) return;
    let isGone = false;
    let drawnPx = 0;
    const watcher = new ResizeObserver(([entry]) => {
      const widthPx = Math.round(entry?.contentRect.width ?? 0);
      if (widthPx === 0 || widthPx === drawnPx) return;
      drawnPx = widthPx;
      draw(widthPx).then(
        (drawn) => {
          if (isGone || drawnPx !== widthPx) return;
          host.replaceChildren(drawn);
          setLive(true);
        },
        // No signal, no drawing library: the static chart says the same.
        () => undefined,
      );
    });
    watcher.observe(host);
    return () => {
      isGone = true;
      watcher.disconnect();
    };
  }, [draw]);

  return { frame, isLive };
}
