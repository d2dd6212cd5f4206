import type { BandPlace } from "#app/domain/calibration/band.ts";
import { formatWhole } from "#app/lib/format.ts";

const looks: Record<BandPlace | "none", string> = {
  under: "text-glacier",
  over: "text-rust",
  in: "rounded-[3px] bg-beacon text-[oklch(20%_0.03_80)] outline-2 -outline-offset-2 outline-beacon-ink font-bold",
  none: "",
};
const glyphs: Record<BandPlace, string> = {
  over: "M5 0 10 10H0z",
  under: "M0 0h10L5 10z",
  in: "M0 0h10v10H0z",
};
const words: Record<BandPlace, string> = { over: "over the band", under: "under the band", in: "in the band" };

type Props = { lbPerLaneMile: number; plusMinus: number | null; place: BandPlace | null };

/** One rate: a shape and a word beside the colour, and its ± under it. */
export function RateCell({ lbPerLaneMile, plusMinus, place }: Props) {
  return (
    <span
      className={`flex min-h-12 flex-col items-end justify-center px-1.5 leading-none font-semibold tabular-nums ${looks[place ?? "none"]}`}
    >
      <span className="flex w-full items-center justify-between">
        {place === null ? (
          <span />
        ) : (
          <svg viewBox="0 0 10 10" aria-hidden="true" className="size-2.25 flex-none fill-current">
            <path d={glyphs[place]} />
          </svg>
        )}
        <span className="tracking-[-0.02em]">{formatWhole(lbPerLaneMile)}</span>
      </span>
      {place !== null && <span className="sr-only">, {words[place]}</span>}
      {plusMinus !== null && <span className="mt-0.5 text-s leading-none font-normal">± {formatWhole(plusMinus)}</span>}
    </span>
  );
}
