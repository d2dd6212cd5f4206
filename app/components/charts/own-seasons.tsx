import { seasonLabel } from "#app/domain/dates.ts";

type Props = {
  /** Oldest first; the last is the one in question. In one unit. */
  seasons: readonly { seasonStartYear: number; value: number }[];
  title: string;
  /** Whether the last one is in doubt: it then carries a ring and its figure is in weight. */
  isDoubtful: boolean;
};

const lane = { left: 70, width: 270, height: 18, pitch: 30 };
const oneDecimal = new Intl.NumberFormat("en-US", { minimumFractionDigits: 1, maximumFractionDigits: 1 });

/** A town's own seasons, one short lane each, on one axis from nothing: what stands out can be seen at once. */
export function OwnSeasons({ seasons, title, isDoubtful }: Props) {
  const most = Math.max(1e-9, ...seasons.map(({ value }) => value)) * 1.12;
  const x = (value: number) => lane.left + 9 + ((lane.width - 18) * value) / most;
  const words = seasons.map(
    ({ seasonStartYear, value }) => `${seasonLabel(seasonStartYear)} ${oneDecimal.format(value)}`,
  );
  return (
    <figure className="max-w-100">
      <figcaption className="mb-1 font-semibold">{title}</figcaption>
      <svg
        viewBox={`0 0 400 ${seasons.length * lane.pitch}`}
        role="img"
        aria-label={`${title}: ${words.join(", ")}`}
        className="strip"
      >
        {seasons.map(({ seasonStartYear, value }, place) => {
          const top = place * lane.pitch + 6;
          const middle = top + lane.height / 2;
          const isMarked = isDoubtful && place === seasons.length - 1;
          return (
            <g key={seasonStartYear}>
              <text x="0" y={middle + 5} fontSize="14" className="fill-gravel">
                {seasonLabel(seasonStartYear)}
              </text>
              <rect x={lane.left} y={top} width={lane.width} height={lane.height} rx="2" className="fill-lane" />
              <line
                x1={lane.left + 2}
                x2={lane.left + lane.width - 2}
                y1={middle}
                y2={middle}
                className="stroke-lane-paint opacity-50"
                strokeDasharray="8 7"
                strokeWidth="1.4"
              />
              <circle
                cx={x(value)}
                cy={middle}
                r="7"
                className={`fill-lane-paint ${isMarked ? "stroke-rust" : "stroke-lane"}`}
                strokeWidth={isMarked ? 4 : 1}
              />
              <text
                x="400"
                y={middle + 5}
                textAnchor="end"
                fontSize="15"
                fontWeight={isMarked ? 700 : 400}
                className={isMarked ? "fill-rust" : "fill-asphalt"}
              >
                {oneDecimal.format(value)}
              </text>
            </g>
          );
        })}
      </svg>
    </figure>
  );
}
