import { formatInches } from "#app/lib/format.ts";

type Props = { fromIn: number; toIn: number };

const bedY = 80;
const widestPx = 46;
const pxPerInch = 19.5;

/** The gate from the side: material behind it, the bed below, the old edge dashed, the new opening measured. */
export function GateDrawing({ fromIn, toIn }: Props) {
  // The same scale from truck to truck while it fits, so that a narrow gate looks narrow.
  const scale = Math.min(pxPerInch, widestPx / Math.max(fromIn, toIn));
  const oldY = bedY - fromIn * scale;
  const newY = bedY - toIn * scale;
  const label = `Gate from ${formatInches(fromIn)} in ${toIn < fromIn ? "down" : "up"} to ${formatInches(toIn)} in above the bed`;
  const middle = (newY + bedY) / 2;
  return (
    <svg viewBox="0 0 150 98" role="img" aria-label={label} className="block h-auto w-full max-w-75">
      <path d={`M0 4C14 22 26 ${newY - 14} 34 ${newY - 6}V${newY}H150V${bedY}H0z`} className="fill-frost" />
      <path
        d={`M0 4C14 22 26 ${newY - 14} 34 ${newY - 6}M43 ${newY}H150`}
        className="fill-none stroke-rule-field"
        strokeWidth="1.5"
      />
      <path d={`M0 ${bedY + 2.5}H150`} className="stroke-asphalt" strokeWidth="5" />
      <path d="M8 92h140" className="stroke-asphalt" strokeWidth="3" strokeDasharray="3 10" strokeLinecap="round" />
      <rect
        x="34"
        y={oldY - 40}
        width="9"
        height="40"
        className="fill-none stroke-gravel"
        strokeWidth="1.5"
        strokeDasharray="3 3"
      />
      <rect x="34" y={newY - 38} width="9" height="38" className="fill-spruce" />
      <path
        d={`M58 ${newY + 2}V${bedY - 1}M54 ${newY + 7}l4-5 4 5M54 ${bedY - 6}l4 5 4-5`}
        className="fill-none stroke-asphalt"
        strokeWidth="1.8"
      />
      <text x="68" y={middle + 5} fontSize="14" fontWeight="700" className="fill-asphalt">
        {formatInches(toIn)} in
      </text>
      <path d={`M45 ${oldY}h12`} className="stroke-gravel" strokeWidth="1.2" />
      <text x="61" y={toIn < fromIn ? Math.min(oldY + 3, newY - 4) : oldY + 12} fontSize="12" className="fill-gravel">
        was {formatInches(fromIn)}
      </text>
    </svg>
  );
}
