import { useEffect, useRef, useState } from "react";
import type { DrawChart } from "./chart-finish.ts";

type Props<Spec> = {
  spec: Spec;
  /** The server's drawings of the same spec. */
  svg: { desk: string; phone: string };
  /** Brings the drawing on demand. Declared outside the component, so that it is the same at every render. */
  load: () => Promise<DrawChart<Spec>>;
};

/** A chart that stands there from the first view, and is drawn again at the width there is once the page is alive. */
export function LiveChart<Spec>({ spec, svg, load }: Props<Spec>) {
  const frame = useRef<HTMLDivElement>(null);
  const [isAlive, setAlive] = useState(false);

  useEffect(() => {
    const host = frame.current;
    if (host === null) return;
    let isGone = false;
    let drawnPx = 0;
    let watcher: ResizeObserver | null = null;
    void load().then(
      (draw) => {
        if (isGone) return;
        watcher = new ResizeObserver(([entry]) => {
          const widthPx = Math.round(entry?.contentRect.width ?? 0);
          if (widthPx === 0 || widthPx === drawnPx) return;
          drawnPx = widthPx;
          host.replaceChildren(draw(spec, { widthPx }));
          setAlive(true);
        });
        watcher.observe(host);
      },
      // No signal, no drawing library: the static drawing says the same.
      () => undefined,
    );
    return () => {
      isGone = true;
      watcher?.disconnect();
    };
  }, [spec, load]);

  return (
    <div className="@container">
      {!isAlive && (
        <>
          <div className="max-w-120 @min-[33rem]:hidden" dangerouslySetInnerHTML={{ __html: svg.phone }} />
          <div className="hidden @min-[33rem]:block" dangerouslySetInnerHTML={{ __html: svg.desk }} />
        </>
      )}
      <div ref={frame} />
    </div>
  );
}
