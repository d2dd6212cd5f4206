import { useCallback, useId } from "react";
import type { DriftSpec } from "./drift-spec.ts";
import { useLivePlot } from "./use-live-plot.ts";

type Props = { spec: DriftSpec; svg: { desk: string; phone: string }; title: string };

/** How the rate moved from one calibration to the next. The table beside it says the same in figures. */
export function DriftChart({ spec, svg, title }: Props) {
  const hatchId = `drift-${useId()}`;
  const draw = useCallback(
    async (widthPx: number) => {
      const { driftPlot } = await import("./drift-plot.ts");
      return driftPlot(spec, { widthPx, hatchId });
    },
    [spec, hatchId],
  );
  const { frame, isLive } = useLivePlot(draw);
  return (
    <figure aria-label={title} className="@container">
      {!isLive && (
        <>
          <div className="max-w-120 @min-[35rem]:hidden" dangerouslySetInnerHTML={{ __html: svg.phone }} />
          <div className="hidden @min-[35rem]:block" dangerouslySetInnerHTML={{ __html: svg.desk }} />
        </>
      )}
      <div ref={frame} />
    </figure>
  );
}
