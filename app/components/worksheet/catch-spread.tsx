type Props = { weightsLbPerRev: readonly number[]; meanLbPerRev: number; lowLbPerRev: number; highLbPerRev: number };

const width = 328;

/** The catches on a road, numbered as they were weighed; the worn track is what their mean may be. */
export function CatchSpread({ weightsLbPerRev, meanLbPerRev, lowLbPerRev, highLbPerRev }: Props) {
  const reach = Math.max(
    ...weightsLbPerRev.map((weight) => Math.abs(weight - meanLbPerRev)),
    highLbPerRev - meanLbPerRev,
    meanLbPerRev * 0.005,
  );
  const x = (weight: number) => width / 2 + ((weight - meanLbPerRev) / reach) * (width / 2 - 30);
  // When catches all but agree, the track would be a hair: it stays visible.
  const [from, to] = [x(lowLbPerRev), x(highLbPerRev)];
  const shown = weightsLbPerRev.map((weight) => weight.toFixed(1));
  return (
    <svg
      viewBox={`0 0 ${width} 74`}
      className="mt-2.5 block h-auto w-full overflow-visible"
      role="img"
      aria-label={`Catches of ${shown.join(", ")} lb a turn; mean ${meanLbPerRev.toFixed(1)}, between ${lowLbPerRev.toFixed(1)} and ${highLbPerRev.toFixed(1)}`}
    >
      <rect y="18" width={width} height="34" rx="2" className="fill-lane" />
      <rect x={from} y="25" width={Math.max(3, to - from)} height="20" rx="3" className="fill-lane-track" />
      <path d={`M0 35H${width}`} className="stroke-lane-paint" strokeWidth="2" strokeDasharray="12 10" opacity="0.6" />
      <path d={`M${width / 2} 16v38`} className="stroke-lane-casing" strokeWidth="6" />
      <path d={`M${width / 2} 16v38`} className="stroke-lane-stake" strokeWidth="3" />
      {weightsLbPerRev.map((weight, place) => (
        <g key={`${place} ${weight}`}>
          <circle cx={x(weight)} cy="35" r="9.5" className="fill-lane-casing stroke-lane" strokeWidth="1.5" />
          <text x={x(weight)} y="39.7" textAnchor="middle" className="fill-lane-plate-ink text-s font-bold">
            {place + 1}
          </text>
        </g>
      ))}
      <text x={width / 2} y="12" textAnchor="middle" className="fill-spruce text-note font-bold">
        mean {meanLbPerRev.toFixed(1)}
      </text>
      {to - from > 60 && (
        <>
          <path d={`M${from} 52v5M${to} 52v5`} className="stroke-gravel" />
          <text x={from} y="70" textAnchor="middle" className="fill-gravel text-s">
            {lowLbPerRev.toFixed(1)}
          </text>
          <text x={to} y="70" textAnchor="middle" className="fill-gravel text-s">
            {highLbPerRev.toFixed(1)}
          </text>
        </>
      )}
    </svg>
  );
}
