/** Grains of snow ahead of the plow, in a fixed pattern. */
const grains = Array.from({ length: 46 }, (_, place) => ({
  x: 6 + ((place * 61) % 317),
  y: 4 + ((place * 37) % 27),
  r: 0.9 + ((place * 7) % 10) / 10,
}));
const width = 328;
const truckWidth = 40;

type Props = { goneSeconds: number; seconds: number };

/** The time as a road: the plow clears it, and what is still white is still to go. */
export function MinuteRoad({ goneSeconds, seconds }: Props) {
  const share = Math.min(1, Math.max(0, goneSeconds / seconds));
  const front = share * (width - truckWidth) + truckWidth;
  return (
    <svg
      viewBox={`0 0 ${width} 34`}
      className="mt-3 block h-auto w-full"
      role="img"
      aria-label={`${Math.round(goneSeconds)} of ${seconds} seconds gone`}
    >
      <rect width={width} height="34" rx="2" className="fill-snow" />
      <g className="fill-rule-field">
        {grains
          .filter(({ x }) => x > front + 6)
          .map(({ x, y, r }) => (
            <circle key={`${x} ${y}`} cx={x} cy={y} r={r} />
          ))}
      </g>
      <rect width={front} height="34" rx="2" className="fill-lane" />
      <path
        d={`M6 17H${Math.max(6, front - truckWidth)}`}
        className="stroke-lane-paint"
        strokeWidth="3"
        strokeDasharray="14 10"
      />
      <g transform={`translate(${front - truckWidth} 0)`}>
        <path d="M0 8h30v18H0z" className="fill-lane-paint" />
        <path d="M2 10h16v14H2zM21 10h7v14h-7z" className="fill-lane-stake" />
        <path d="M32 4l7-2 6 30-7 2z" className="fill-asphalt stroke-lane-paint" strokeWidth="1.5" />
      </g>
      <rect
        x=".75"
        y=".75"
        width={width - 1.5}
        height="32.5"
        rx="2"
        className="fill-none stroke-line"
        strokeWidth="1.5"
      />
    </svg>
  );
}
