import { InBand, Over, Under } from "#app/components/ui/state-mark.tsx";
import { formatWhole } from "#app/lib/format.ts";
import { shownRate, type UnitChoice } from "./shown-units.ts";

type Working = {
  lbPerLaneMile: number;
  plusMinusLbPerLaneMile: number | null;
  place: "under" | "in" | "over" | null;
} | null;

/** A rate with its ± and the shape that says where it lies; bare where there is no band, a dash where there is none. */
export function WorkingRateWords({ working, units = "us" }: { working: Working; units?: UnitChoice }) {
  if (working === null) return "–";
  const { lbPerLaneMile, plusMinusLbPerLaneMile: plusMinus, place } = working;
  const words = (
    <span className="whitespace-nowrap">
      {formatWhole(shownRate(lbPerLaneMile, units))}
      {plusMinus !== null && (
        <span className="font-normal text-gravel"> ± {formatWhole(shownRate(plusMinus, units))}</span>
      )}
    </span>
  );
  if (place === "over") return <Over isWordHidden>{words}</Over>;
  if (place === "under") return <Under isWordHidden>{words}</Under>;
  if (place === "in") return <InBand isWordHidden>{words}</InBand>;
  return words;
}

/** What the shapes of rates stand for. */
export function PlaceKey({ band }: { band?: { lowLbPerLaneMile: number; highLbPerLaneMile: number } | null }) {
  const range = band ? `, ${formatWhole(band.lowLbPerLaneMile)}–${formatWhole(band.highLbPerLaneMile)}` : "";
  return (
    <span>
      <Under>under</Under> &ensp; <InBand>in the band{range}</InBand> &ensp; <Over>over</Over>
    </span>
  );
}
