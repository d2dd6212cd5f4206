import { Form, redirect } from "react-router";
import { RateWords } from "#app/components/fleet/fleet-table.tsx";
import { Answer, Heading, Method } from "#app/components/layout/answer.tsx";
import { Page } from "#app/components/layout/page.tsx";
import { Button, ButtonLink } from "#app/components/ui/button.tsx";
import { EmptyState } from "#app/components/ui/empty-state.tsx";
import { InBand, Over, Under } from "#app/components/ui/state-mark.tsx";
import { TextLink } from "#app/components/ui/text-link.tsx";
import { Timetable } from "#app/components/ui/timetable.tsx";
import { townActor } from "#app/context.ts";
import { dueState } from "#app/domain/calibration/due.ts";
import { now } from "#app/lib/clock.server.ts";
import { readForm } from "#app/lib/form.ts";
import { formatInches, formatShortDay } from "#app/lib/format.ts";
import { countWords, sentenceStart } from "#app/lib/words.ts";
import { approveCalibrations, listFleet, type TruckView } from "#app/services/fleet.server.ts";
import type { Route } from "./+types/fleet";

export async function loader({ context }: Route.LoaderArgs) {
  const actor = townActor(context);
  return {
    isDirector: actor.role === "director",
    today: now().toISOString().slice(0, 10),
    trucks: await listFleet(actor),
  };
}

export async function action({ context, request }: Route.ActionArgs) {
  const form = await readForm(request);
  const ids = form
    .getAll("calibrationId")
    .flatMap((id) => (typeof id === "string" && /^[1-9]\d{0,9}$/.test(id) ? [Number(id)] : []));
  await approveCalibrations(townActor(context), ids);
  return redirect("/fleet");
}

export const meta: Route.MetaFunction = () => [{ title: "Fleet · Commonweigh" }];

const spreaderWords: Record<TruckView["spreaderKind"], string> = {
  "tailgate-auger": "auger under the tailgate",
  "hopper-auger": "auger in the hopper",
  conveyor: "conveyor",
  "liquid-tanks": "liquid tanks",
};

/** One line for each truck and material in use: the newest calibration, approved ones first. */
function fleetLines(trucks: readonly TruckView[], today: string) {
  return trucks
    .filter((truck) => truck.isInService)
    .flatMap((truck) => {
      const materials = [...new Set(truck.calibrations.map(({ materialName }) => materialName))];
      const names = materials.length > 0 ? materials : [null];
      return names.map((materialName) => {
        const own = truck.calibrations.filter((calibration) => calibration.materialName === materialName);
        const inForce = own.find(({ state }) => state === "approved") ?? null;
        return { truck, materialName, inForce, due: dueState(inForce?.testedOn ?? null, today) };
      });
    });
}

const dueWords = { "in-date": "in date", due: "due", never: "never weighed" } as const;

export default function Fleet({ loaderData: { isDirector, today, trucks } }: Route.ComponentProps) {
  const lines = fleetLines(trucks, today);
  const salt = lines.filter(({ inForce }) => inForce?.materialKind === "salt" && inForce.workingPlace !== null);
  const over = salt.filter(({ inForce }) => inForce?.workingPlace === "over").length;
  const due = new Set(lines.filter((line) => line.due !== "in-date").map(({ truck }) => truck.id)).size;
  const ready = trucks.flatMap((truck) =>
    truck.calibrations.filter(({ state }) => state === "ready").map((calibration) => ({ truck, calibration })),
  );
  if (trucks.length === 0) {
    return (
      <Page>
        <Answer>No truck is in the fleet yet.</Answer>
        <EmptyState title="Trucks and their calibrations belong here">
          The coordinator puts the first trucks in with your town. Then each truck is weighed with each material it
          carries.
        </EmptyState>
      </Page>
    );
  }
  return (
    <Page>
      <Answer>
        {salt.length === 0 ? (
          "No salt truck has a calibration in force."
        ) : over > 0 ? (
          <>
            <Over>
              {over === salt.length && over > 1
                ? `All ${countWords(over, "salt truck", "salt trucks")}`
                : `${sentenceStart(countWords(over, "", "").trim())} of ${countWords(salt.length, "salt truck", "salt trucks")}`}
            </Over>{" "}
            {over === 1 ? "lays" : "lay"} more than the band at the working setting.
          </>
        ) : (
          "No salt truck lays more than the band at its working setting."
        )}{" "}
        {due > 0 && `${sentenceStart(countWords(due, "is", "are"))} due for calibration.`}
      </Answer>
      <Method>
        Rates are measured: shaft turns counted at each setting, one turn’s catch weighed. The band is common practice,
        250 to 300 lb per lane mile for straight salt; it is a yardstick and tells no driver how much to apply.
      </Method>
      <p className="mt-4">
        <ButtonLink to="/uploads?kind=calibrations" variant={ready.length > 0 && isDirector ? "quiet" : "primary"}>
          Upload calibrations
        </ButtonLink>
      </p>
      {ready.length > 0 && <ReadyCalibrations isDirector={isDirector} ready={ready} />}
      <Heading>In force</Heading>
      <Timetable
        caption="Trucks by material: what they lay at the working setting and speed"
        isCaptionHidden
        hasStickyHead
        columns={[
          { key: "truck", label: "truck", foldPrefix: "Truck" },
          { key: "spreader", label: "spreader", isWideOnly: true },
          { key: "material", label: "material" },
          { key: "at", label: "working setting and speed", isWideOnly: true },
          { key: "gate", label: "gate", unit: "in", isNumeric: true, isWideOnly: true },
          { key: "lays", label: "lays", unit: "lb per lane mile", isNumeric: true },
          { key: "weighed", label: "weighed" },
          { key: "due", label: "calibration" },
        ]}
        rows={lines.map(({ truck, materialName, inForce, due: state }) => ({
          key: `${truck.id} ${materialName ?? ""}`,
          cells: {
            truck: <TextLink to={`/fleet/${truck.id}`}>{truck.unitNumber}</TextLink>,
            spreader: spreaderWords[truck.spreaderKind] + (truck.control === "ground-speed" ? ", ground-speed" : ""),
            material: materialName ?? "–",
            at: `setting ${truck.workingSetting}, ${truck.workingSpeedMph} mph`,
            gate: inForce ? formatInches(inForce.gateOpeningIn) : "–",
            lays: <RateWords rate={inForce?.workingRateLbPerLaneMile ?? null} place={inForce?.workingPlace ?? null} />,
            weighed: inForce ? formatShortDay(inForce.testedOn) : "–",
            due: state === "in-date" ? dueWords[state] : <b>{dueWords[state]}</b>,
          },
        }))}
      />
      <p className="mt-2 text-note text-gravel">
        <InBand>in the band</InBand> &ensp; <Over>above it</Over> &ensp; <Under>under it</Under>
      </p>
    </Page>
  );
}

type Ready = { truck: TruckView; calibration: TruckView["calibrations"][number] };

function ReadyCalibrations({ isDirector, ready }: { isDirector: boolean; ready: readonly Ready[] }) {
  return (
    <section>
      <Heading>{isDirector ? "Waiting for your approval" : "Waiting for the director’s approval"}</Heading>
      <Timetable
        caption="Calibrations that are weighed and not yet in force"
        isCaptionHidden
        columns={[
          { key: "truck", label: "truck", foldPrefix: "Truck" },
          { key: "material", label: "material" },
          { key: "gate", label: "gate", unit: "in", isNumeric: true },
          { key: "lays", label: "lays", unit: "lb per lane mile", isNumeric: true },
          { key: "weighed", label: "weighed" },
        ]}
        rows={ready.map(({ truck, calibration }) => ({
          key: String(calibration.id),
          cells: {
            truck: <TextLink to={`/fleet/${truck.id}`}>{truck.unitNumber}</TextLink>,
            material: calibration.materialName,
            gate: formatInches(calibration.gateOpeningIn),
            lays: <RateWords rate={calibration.workingRateLbPerLaneMile} place={calibration.workingPlace} />,
            weighed: formatShortDay(calibration.testedOn),
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
