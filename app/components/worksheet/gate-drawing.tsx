import { formatInches } from "#app/lib/format.ts";

type Props = { openingIn: number | null; wasIn: number | null };

const bedY = 82;
const mostHeight = 60;

/** The gate above the bed: the measured opening, and the edge as it was, dashed. Drawn to scale between the two. */
export function GateDrawing({ openingIn, wasIn }: Props) {
  const widestIn = Math.max(openingIn ?? 0, wasIn ?? 0, 1);
  const edge = (inches: number) => bedY - 2.5 - Math.max(10, (inches / widestIn) * mostHeight * 0.6);
  const now = edge(openingIn ?? wasIn ?? widestIn);
  const was = wasIn === null ? null : edge(wasIn);
  const isMoved = openingIn !== null && wasIn !== null && openingIn !== wasIn;
  const words =
    openingIn === null
      ? "The gate above the bed; its opening is not measured yet"
      : `Gate ${formatInches(openingIn)} in above the bed${isMoved ? `; it was ${formatInches(wasIn)} in` : ""}`;
  return (
    <svg viewBox="0 0 116 96" className="block h-24 w-29" role="img" aria-label={words}>
      <path d={`M0 8C14 ${now - 21} 26 ${now - 17} 34 ${now - 7}V${now}H116V${bedY - 2}H0z`} className="fill-frost" />
      <path
        d={`M0 8C14 ${now - 21} 26 ${now - 17} 34 ${now - 7}M43 ${now}H116`}
        className="fill-none stroke-rule-field"
        strokeWidth="1.5"
      />
      <path d={`M0 ${bedY + 0.5}H116`} className="stroke-asphalt" strokeWidth="5" />
      <path d="M8 90h104" className="stroke-asphalt" strokeWidth="3" strokeDasharray="3 10" strokeLinecap="round" />
      {isMoved && was !== null && (
        <rect
          x="34"
          y={was - 38}
          width="9"
          height="38"
          className="fill-none stroke-gravel"
          strokeWidth="1.5"
          strokeDasharray="3 3"
        />
      )}
      <rect x="34" y={Math.max(0, now - 38)} width="9" height={Math.min(38, now)} className="fill-spruce" />
      {openingIn !== null && (
        <>
          <path
            d={`M56 ${now + 2}V${bedY - 3}M52 ${now + 7}l4-5 4 5M52 ${bedY - 8}l4 5 4-5`}
            className="fill-none stroke-asphalt"
            strokeWidth="1.8"
          />
          <text x="64" y={(now + bedY) / 2 + 5} className="fill-asphalt text-note font-bold">
            {formatInches(openingIn)}
          </text>
        </>
      )}
      {isMoved && (
        <text x="52" y={Math.max(12, Math.min(now, was ?? now) - 8)} className="fill-gravel text-s">
          was {formatInches(wasIn)}
        </text>
      )}
    </svg>
  );
}
