import { InBand, Over, Under } from "#app/components/ui/state-mark.tsx";
import { TextLink } from "#app/components/ui/text-link.tsx";
import { Timetable } from "#app/components/ui/timetable.tsx";
import { formatShortDay, formatWhole } from "#app/lib/format.ts";

export type FleetLine = {
  truckId: number;
  unitNumber: string;
  workingSpeedMph: number;
  rateLbPerLaneMile: number | null;
  place: "under" | "in" | "over" | null;
  testedOn: string | null;
  isDue: boolean;
  isWaiting: boolean;
};

/** A rate with the shape that says where it lies; the bare figure where there is no band. */
function RateWords({ rate, place }: { rate: number | null; place: FleetLine["place"] }) {
  const words = formatWhole(rate);
  if (place === "over") return <Over isWordHidden>{words}</Over>;
  if (place === "under") return <Under isWordHidden>{words}</Under>;
  if (place === "in") return <InBand isWordHidden>{words}</InBand>;
  return words;
}

function weighedWords({ isWaiting, isDue, testedOn }: FleetLine) {
  if (isWaiting) return "to approve";
  if (isDue) return <b>due</b>;
  return testedOn === null ? "–" : formatShortDay(testedOn);
}

/** The fleet at a glance: what each truck lays, and when it was weighed. */
export function FleetTable({ lines }: { lines: readonly FleetLine[] }) {
  return (
    <>
      <Timetable
        caption="Trucks, what they lay at the working setting and speed, and when they were weighed"
        isCaptionHidden
        onPhone="keep"
        columns={[
          { key: "truck", label: "truck", foldPrefix: "Truck" },
          { key: "lays", label: "lays", isNumeric: true },
          { key: "weighed", label: "weighed", isNumeric: true },
        ]}
        rows={lines.map((line) => ({
          key: String(line.truckId),
          cells: {
            truck: <TextLink to={`/fleet/${line.truckId}`}>{line.unitNumber}</TextLink>,
            lays: <RateWords rate={line.rateLbPerLaneMile} place={line.place} />,
            weighed: weighedWords(line),
          },
        }))}
      />
      <p className="mt-2 text-note text-gravel">
        <InBand>in the band</InBand> &ensp; <Over>above it</Over> &ensp; <Under>under it</Under>
      </p>
    </>
  );
}
