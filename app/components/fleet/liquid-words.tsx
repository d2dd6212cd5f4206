import { directGalPerLaneMile, prewetGalPerTon, timedGalPerMin } from "#app/domain/calibration/liquids.ts";
import { formatOneDecimal } from "#app/lib/format.ts";
import { WorkingRateWords } from "./rate-words.tsx";
import type { UnitChoice } from "./shown-units.ts";

export type Liquid = {
  kind: "prewet" | "direct";
  gallons: number;
  seconds: number;
  speedMph: number | null;
  lanes: number | null;
  dryLbPerMin: number | null;
};

export function exact(value: number) {
  return value.toLocaleString("en-US", { maximumFractionDigits: 3 });
}

export function lanesWords(lanes: number) {
  return lanes === 1 ? "one lane" : `${lanes} lanes`;
}

/** "40.0 gal per lane mile" or "10.0 gal per ton"; a dash where speed or dry discharge is not known. */
export function liquidRate(reading: Liquid): string {
  const galPerMin = timedGalPerMin(reading);
  const { kind, dryLbPerMin, speedMph, lanes } = reading;
  if (kind === "prewet") {
    return dryLbPerMin === null ? "–" : `${formatOneDecimal(prewetGalPerTon({ galPerMin, dryLbPerMin }))} gal per ton`;
  }
  if (speedMph === null) return "–";
  return `${formatOneDecimal(directGalPerLaneMile({ galPerMin, speedMph, lanes: lanes ?? 1 }))} gal per lane mile`;
}

/** The rate with what it holds for: "40.0 gal per lane mile at 30 mph, one lane in a pass". */
export function liquidRateAt(reading: Liquid): string {
  const { kind, speedMph, lanes } = reading;
  if (kind === "prewet" || speedMph === null) return liquidRate(reading);
  return `${liquidRate(reading)} at ${exact(speedMph)} mph, ${lanesWords(lanes ?? 1)} in a pass`;
}

type LaysProps = {
  line: { working: Parameters<typeof WorkingRateWords>[0]["working"]; liquids: readonly Liquid[] } | null;
  units?: UnitChoice;
};

/** What a truck lays by one calibration: its dry rate, or after liquid alone what each catch gives, with its own unit. */
export function LaysWords({ line, units = "us" }: LaysProps) {
  if (line === null) return "–";
  if (line.working !== null || line.liquids.length === 0)
    return <WorkingRateWords working={line.working} units={units} />;
  return line.liquids.map((reading, position) => (
    <span key={position} className="block">
      {liquidRate(reading)}
    </span>
  ));
}
