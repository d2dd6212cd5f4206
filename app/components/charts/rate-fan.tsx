import { useCallback, useId, useState } from "react";
import { InBand, Over, Under } from "#app/components/ui/state-mark.tsx";
import { fanGroups, fanPlace, groupWords, type RateFanSpec } from "./rate-fan-spec.ts";
import { useLivePlot } from "./use-live-plot.ts";

type Props = {
  spec: RateFanSpec;
  /** The server's drawings of the same spec. */
  svg: { desk: string; phone: string };
  title: string;
};

const phoneBelowPx = 560;

/** Rate against speed, a line for each setting. Static first; alive, it also reads any speed off. */
export function RateFan({ spec, svg, title }: Props) {
  const hatchId = `fan-${useId()}`;
  const draw = useCallback(
    async (widthPx: number) => {
      const { rateFanPlot } = await import("./rate-fan-plot.ts");
      return rateFanPlot(spec, { size: widthPx < phoneBelowPx ? "phone" : "desk", widthPx, hatchId });
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
      <figcaption className="mt-1 text-note text-gravel">
        One line for each setting, named at its end; the thick one is the working setting. Squares: cells of the table
        in the band.
      </figcaption>
      {isLive && <SpeedReader spec={spec} />}
    </figure>
  );
}

/** What every setting lays at a speed that one chooses: by thumb, by mouse, or with the arrow keys. */
function SpeedReader({ spec }: { spec: RateFanSpec }) {
  const { speeds, working, band, speedUnit } = spec;
  const [speed, setSpeed] = useState(Math.round(working.speed));
  return (
    <div className="mt-3 print:hidden">
      <label className="flex flex-wrap items-center gap-x-4 text-note">
        <span className="font-semibold">Read it at</span>
        <input
          type="range"
          min={Math.ceil(speeds.from)}
          max={Math.floor(speeds.to)}
          step={1}
          value={speed}
          aria-valuetext={`${speed} ${speedUnit}`}
          onChange={(event) => setSpeed(Number(event.currentTarget.value))}
          className="h-target min-w-40 flex-1 accent-spruce"
        />
        <output className="w-20 font-bold tabular-nums">
          {speed} {speedUnit}
        </output>
      </label>
      <ul className="flex flex-wrap gap-x-5 gap-y-1 text-note tabular-nums">
        {fanGroups(spec).map((group) => {
          const rate = group.rateAtOne / speed;
          const words = Math.round(rate).toLocaleString("en-US");
          const place = fanPlace(rate, band);
          return (
            <li key={groupWords(group)} className={group.isWorking ? "font-bold" : ""}>
              {groupWords(group)}:{" "}
              {place === "over" ? (
                <Over isWordHidden>{words}</Over>
              ) : place === "under" ? (
                <Under isWordHidden>{words}</Under>
              ) : place === "in" ? (
                <InBand isWordHidden>{words}</InBand>
              ) : (
                words
              )}
            </li>
          );
        })}
      </ul>
    </div>
  );
}
