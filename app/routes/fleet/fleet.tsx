import { Form, redirect } from "react-router";
import { FleetPages } from "#app/components/fleet/fleet-pages.tsx";
import { PlaceKey } from "#app/components/fleet/rate-words.tsx";
import { ReadyCalibrations } from "#app/components/fleet/ready-calibrations.tsx";
import { RegisterTable } from "#app/components/fleet/register-table.tsx";
import { dueOfTruck, readView, showTrucks, sortChoices, stateChoices } from "#app/components/fleet/register-view.ts";
import { TextField } from "#app/components/forms/field.tsx";
import { SelectField } from "#app/components/forms/select-field.tsx";
import { Answer, Heading, Method } from "#app/components/layout/answer.tsx";
import { Page } from "#app/components/layout/page.tsx";
import { Button, ButtonLink } from "#app/components/ui/button.tsx";
import { EmptyState } from "#app/components/ui/empty-state.tsx";
import { Over } from "#app/components/ui/state-mark.tsx";
import { TextLink } from "#app/components/ui/text-link.tsx";
import { townActor } from "#app/context.ts";
import { readForm } from "#app/lib/form.ts";
import { countWords, sentenceStart } from "#app/lib/words.ts";
import { approveCalibrations } from "#app/services/fleet/approve.server.ts";
import { listFleet, type TruckLine } from "#app/services/fleet/read.server.ts";
import type { Route } from "./+types/fleet";

export async function loader({ context, url }: Route.LoaderArgs) {
  const actor = townActor(context);
  return {
    isDirector: actor.role === "director",
    view: readView(url.searchParams),
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

function Sentence({ trucks }: { trucks: readonly TruckLine[] }) {
  const inService = trucks.filter((truck) => truck.isInService);
  const salt = inService.flatMap(({ materials }) =>
    materials.flatMap(({ materialKind, inForce }) =>
      materialKind === "salt" && inForce?.working && inForce.working.place !== null ? [inForce.working.place] : [],
    ),
  );
  const over = salt.filter((place) => place === "over").length;
  const due = inService.filter((truck) => ["due", "overdue"].includes(dueOfTruck(truck)?.state ?? "")).length;
  return (
    <>
      {salt.length === 0 ? (
        "No salt truck has a calibration in force."
      ) : over > 0 ? (
        <>
          <Over>
            {over === salt.length && over > 1
              ? `All ${countWords(over, "truck", "trucks")}`
              : `${sentenceStart(countWords(over, "truck", "trucks"))} of ${salt.length}`}
          </Over>{" "}
          {over === 1 ? "lays" : "lay"} more salt than the band at the working setting.
        </>
      ) : (
        "No salt truck lays more than the band at its working setting."
      )}{" "}
      {due > 0 && `${sentenceStart(countWords(due, "is", "are"))} due for calibration.`}
    </>
  );
}

export default function Fleet({ loaderData: { isDirector, trucks, view } }: Route.ComponentProps) {
  const ready = trucks.flatMap((truck) =>
    truck.materials.flatMap((line) => line.ready.map((calibration) => ({ truck, calibration }))),
  );
  if (trucks.length === 0) {
    return (
      <Page>
        <Answer>No truck is in the fleet yet.</Answer>
        <EmptyState
          title="Trucks and their calibrations belong here"
          action={<ButtonLink to="/fleet/trucks/new">Put in the first truck</ButtonLink>}
        >
          One by one, or all of them from a spreadsheet:{" "}
          <TextLink to="/uploads?kind=trucks">upload a list of trucks</TextLink>. Then each truck is weighed with each
          material it carries.
        </EmptyState>
      </Page>
    );
  }
  const shown = showTrucks(trucks, view);
  return (
    <Page>
      <Answer>
        <Sentence trucks={trucks} />
      </Answer>
      <Method>
        Rates are measured: shaft turns counted at each setting, one turn’s catch weighed. A band is a yardstick and
        tells no driver how much to apply.
      </Method>
      <FleetPages />
      {ready.length > 0 && <ReadyCalibrations isDirector={isDirector} ready={ready} />}
      <div className="flex flex-wrap items-center gap-x-6 gap-y-2">
        {ready.length > 0 && isDirector ? (
          <TextLink to="/fleet/worksheets" weight="bold">
            Calibrate a truck
          </TextLink>
        ) : (
          <ButtonLink to="/fleet/worksheets">Calibrate a truck</ButtonLink>
        )}
        <TextLink to="/fleet/trucks/new">Put in a truck</TextLink>
        <TextLink to="/uploads?kind=calibrations">Upload calibrations</TextLink>
        <TextLink to="/uploads?kind=trucks">Upload trucks</TextLink>
        <TextLink to="/fleet/export" isDocument>
          Download the fleet (CSV)
        </TextLink>
      </div>
      <Heading>Trucks</Heading>
      <Form className="mb-5 flex flex-wrap items-end gap-x-4 gap-y-3 print:hidden" role="search">
        <div className="w-full sm:w-56">
          <TextField name="q" label="Find" type="search" defaultValue={view.q} placeholder="number, body or material" />
        </div>
        <div className="w-[47%] sm:w-44">
          <SelectField name="state" label="Show" choices={stateChoices} defaultValue={view.state} />
        </div>
        <div className="w-[47%] sm:w-52">
          <SelectField name="sort" label="In the order of" choices={sortChoices} defaultValue={view.sort} />
        </div>
        <Button variant="quiet">Show them</Button>
        {shown.length < trucks.length && (
          <p className="flex min-h-target items-center gap-3" role="status">
            {shown.length} of {trucks.length} <TextLink to="/fleet">Show all</TextLink>
          </p>
        )}
      </Form>
      {shown.length === 0 ? (
        <p>No truck is like that. Look for less, or show all of them.</p>
      ) : (
        <>
          <RegisterTable trucks={shown} />
          <p className="mt-2 text-note text-gravel">
            <PlaceKey /> &ensp; ± is about 95 %; without it, a single catch was weighed
          </p>
        </>
      )}
    </Page>
  );
}
