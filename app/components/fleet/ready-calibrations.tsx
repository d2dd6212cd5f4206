import { Form } from "react-router";
import { Heading } from "#app/components/layout/answer.tsx";
import { Button } from "#app/components/ui/button.tsx";
import { TextLink } from "#app/components/ui/text-link.tsx";
import { Timetable } from "#app/components/ui/timetable.tsx";
import { formatShortDay } from "#app/lib/format.ts";
import { countWords } from "#app/lib/words.ts";
import { gateWords } from "./fleet-words.ts";
import { LaysWords } from "./liquid-words.tsx";

type Ready = {
  truck: { id: number; unitNumber: string };
  calibration: {
    id: number;
    materialName: string;
    gateOpeningIn: number | null;
    testedOn: string;
  } & NonNullable<Parameters<typeof LaysWords>[0]["line"]>;
};

/** What was weighed and is not in force yet. The director can look at each, or approve them together. */
export function ReadyCalibrations({ isDirector, ready }: { isDirector: boolean; ready: readonly Ready[] }) {
  return (
    <section className="mb-8">
      <Heading>{isDirector ? "Waiting for your approval" : "Waiting for the director’s approval"}</Heading>
      <Timetable
        caption="Calibrations that are weighed and not yet in force"
        isCaptionHidden
        columns={[
          { key: "truck", label: "truck", foldPrefix: "Truck" },
          { key: "material", label: "material" },
          { key: "gate", label: "gate", unit: "in", isNumeric: true },
          { key: "lays", label: "lays", unit: "lb per lane mile", isNumeric: true },
          { key: "weighed", label: "weighed", isNumeric: true },
          { key: "look", label: "rates" },
        ]}
        rows={ready.map(({ truck, calibration }) => ({
          key: String(calibration.id),
          cells: {
            truck: <TextLink to={`/fleet/${truck.id}`}>{truck.unitNumber}</TextLink>,
            material: calibration.materialName,
            gate: gateWords(calibration.gateOpeningIn),
            lays: <LaysWords line={calibration} />,
            weighed: formatShortDay(calibration.testedOn),
            look: (
              <TextLink to={`/fleet/calibrations/${calibration.id}`}>
                Look<span className="sr-only"> at the rates of truck {truck.unitNumber}</span>
              </TextLink>
            ),
          },
        }))}
      />
      {isDirector && (
        <Form method="post" className="mt-4">
          {ready.map(({ calibration }) => (
            <input key={calibration.id} type="hidden" name="calibrationId" value={calibration.id} />
          ))}
          <Button>Approve {countWords(ready.length, "calibration", "calibrations")}</Button>
        </Form>
      )}
    </section>
  );
}
