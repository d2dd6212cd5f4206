import { seasonLabel } from "#app/domain/dates.ts";
import { formatOneDecimal } from "#app/lib/format.ts";
import type { SeasonColumn } from "./season-table.tsx";

type Props = {
  title: string;
  /** The season in question first, as in the table. */
  seasons: readonly SeasonColumn[];
  /** Whether the season in question stands out, and is drawn so. */
  isDoubtful: boolean;
};

const laneWidth = 254;
const edge = 14;

/** A town's own seasons as lanes, the oldest on top: salt per lane mile, all on one axis from nothing to the largest. */
export function OwnSeasons({ title, seasons, isDoubtful }: Props) {
  const largest = Math.max(...seasons.map(({ totals }) => totals.saltTonsPerLaneMile), Number.MIN_VALUE);
  const x = (tons: number) => edge + (tons / largest) * (laneWidth - 2 * edge);
  const asked = seasons[0];
  return (
    <section>
      <h3 className="mb-2 font-semibold">{title}</h3>
      <ol className="grid max-w-measure grid-cols-[auto_minmax(0,1fr)_auto] items-center gap-x-4 gap-y-2">
        {[...seasons].reverse().map((season) => {
          const isOut = season === asked && isDoubtful;
          const tons = season.totals.saltTonsPerLaneMile;
          return (
            <li key={season.seasonStartYear} className="col-span-3 grid grid-cols-subgrid items-center">
              <span className={season === asked ? "font-semibold" : "text-gravel"}>
                {seasonLabel(season.seasonStartYear)}
              </span>
              <svg viewBox={`0 0 ${laneWidth} 20`} aria-hidden="true" className="block w-full">
                <rect width={laneWidth} height="20" rx="2" className="fill-lane" />
                <path
                  d={`M6 10H${laneWidth - 4}`}
                  className="stroke-lane-edge"
                  strokeWidth="1.5"
                  strokeDasharray="8 6"
                />
                <circle
                  cx={x(tons)}
                  cy="10"
                  r={isOut ? 6.5 : 6}
                  className={isOut ? "fill-lane-paint stroke-rust" : "fill-lane-paint stroke-lane"}
                  strokeWidth={isOut ? 4 : 1.5}
                />
              </svg>
              <span className={`text-right tabular-nums ${isOut ? "font-bold text-rust" : ""}`}>
                {formatOneDecimal(tons)}
              </span>
            </li>
          );
        })}
      </ol>
    </section>
  );
}
