import { exact, liquidRateAt } from "#app/components/fleet/liquid-words.tsx";
import type { WorksheetReadings } from "#app/domain/calibration/worksheet.ts";
import { Say } from "./yard-field.tsx";

type Props = { step: "rates" | "decision"; readings: WorksheetReadings };

/** What stands in place of the rates and the gate's decision when no feed setting was measured: the liquid's own rate. */
export function StepWithoutRates({ step, readings: { liquids, gateOpeningIn } }: Props) {
  if (step === "decision") {
    return (
      <>
        <Say>
          {gateOpeningIn === null ? "Liquid passes no gate, so none is to be moved." : "No setting was measured."}
        </Say>
        <p className="mt-2 text-gravel">Finish the sheet; the director decides whether it becomes the one in force.</p>
      </>
    );
  }
  return (
    <>
      <Say>No feed setting was measured, so there is no rate in pounds.</Say>
      <ul className="mt-3 grid">
        {liquids.map((reading) => (
          <li key={reading.id} className="border-b border-rule py-2 leading-snug first:border-t">
            {exact(reading.gallons)} gal in {exact(reading.seconds)} s give{" "}
            <b>{liquidRateAt({ speedMph: null, lanes: null, dryLbPerMin: null, ...reading })}</b>.
          </li>
        ))}
      </ul>
      <p className="mt-3 text-table leading-snug text-gravel">
        A yardstick: policy, road, weather and the person responsible decide how much is applied.
      </p>
    </>
  );
}
