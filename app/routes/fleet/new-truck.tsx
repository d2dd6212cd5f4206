import { parseWithZod } from "@conform-to/zod/v4";
import { data, redirect } from "react-router";
import { FleetPages } from "#app/components/fleet/fleet-pages.tsx";
import { TruckForm } from "#app/components/fleet/truck-form.tsx";
import { readMaterials, TruckFormSchema } from "#app/components/fleet/truck-form-schema.ts";
import { Answer, Method } from "#app/components/layout/answer.tsx";
import { Page } from "#app/components/layout/page.tsx";
import { townActor } from "#app/context.ts";
import { carriedMaterials } from "#app/domain/fleet/carried.ts";
import { readForm } from "#app/lib/form.ts";
import { todaysDate } from "#app/services/fleet/read.server.ts";
import { addTruck, getTruckForm } from "#app/services/fleet/register.server.ts";
import type { Route } from "./+types/new-truck";

export async function loader({ context }: Route.LoaderArgs) {
  const actor = townActor(context);
  const { materials } = await getTruckForm(actor, null);
  return { materials, userId: actor.userId, isDirector: actor.role === "director", today: todaysDate() };
}

export async function action({ context, request }: Route.ActionArgs) {
  const actor = townActor(context);
  const form = await readForm(request);
  const submission = parseWithZod(form, { schema: TruckFormSchema });
  const typedMaterials = readMaterials(form, (await getTruckForm(actor, null)).materials);
  const { materials, errors: sinceErrors } = carriedMaterials(typedMaterials, todaysDate());
  const kept = { typedMaterials, sinceErrors };
  if (submission.status !== "success" || Object.keys(sinceErrors).length > 0) {
    return data({ reply: submission.reply(), ...kept }, { status: 400 });
  }
  const { version: _version, ...facts } = submission.value;
  const saved = await addTruck(actor, { ...facts, materials });
  if (saved.ok) return redirect(`/fleet/${saved.truckId}`);
  const taken = [`Truck ${facts.unitNumber} is in the fleet already. Open it there, or give another number.`];
  return data({ reply: submission.reply({ fieldErrors: { unitNumber: taken } }), ...kept }, { status: 409 });
}

export const meta: Route.MetaFunction = () => [{ title: "A new truck · Commonweigh" }];

export default function NewTruck({ loaderData, actionData }: Route.ComponentProps) {
  return (
    <Page>
      <Answer>Put a truck into the fleet.</Answer>
      <Method>What you say here decides at which setting and speed its calibrations are judged.</Method>
      <FleetPages />
      <TruckForm
        truck={null}
        version=""
        materials={loaderData.materials}
        typedMaterials={actionData?.typedMaterials ?? []}
        sinceErrors={actionData?.sinceErrors ?? {}}
        reply={actionData?.reply}
        ownerId={loaderData.userId}
        isDirector={loaderData.isDirector}
        today={loaderData.today}
        button="Put it into the fleet"
        backTo="/fleet"
      />
    </Page>
  );
}
