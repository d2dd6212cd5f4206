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
import { idParam } from "#app/lib/params.ts";
import { todaysDate } from "#app/services/fleet/read.server.ts";
import { changeTruck, getTruckForm } from "#app/services/fleet/register.server.ts";
import type { Route } from "./+types/edit-truck";

export async function loader({ context, params }: Route.LoaderArgs) {
  const actor = townActor(context);
  const { truck, ...form } = await getTruckForm(actor, idParam(params.truckId, "truck"));
  return { truck, ...form, userId: actor.userId, isDirector: actor.role === "director", today: todaysDate() };
}

const refusals = {
  "number-taken": (unit: string) => ({
    fieldErrors: { unitNumber: [`Another truck of the town has the number ${unit}.`] },
  }),
  "changed-meanwhile": () => ({
    formErrors: ["Somebody changed this truck since you opened the form. Look it over; sending again overwrites it."],
  }),
};

export async function action({ context, params, request }: Route.ActionArgs) {
  const actor = townActor(context);
  const truckId = idParam(params.truckId, "truck");
  const form = await readForm(request);
  const submission = parseWithZod(form, { schema: TruckFormSchema });
  const now = await getTruckForm(actor, truckId);
  const typedMaterials = readMaterials(form, now.materials);
  const { materials, errors: sinceErrors } = carriedMaterials(typedMaterials, todaysDate());
  const typedVersion = form.get("version");
  const kept = { typedMaterials, sinceErrors, version: typeof typedVersion === "string" ? typedVersion : "" };
  if (submission.status !== "success" || Object.keys(sinceErrors).length > 0) {
    return data({ reply: submission.reply(), ...kept }, { status: 400 });
  }
  const { version, ...facts } = submission.value;
  const saved = await changeTruck(actor, truckId, version ?? "", { ...facts, materials });
  if (saved.ok) return redirect(`/fleet/${truckId}`);
  const reply = submission.reply(refusals[saved.reason](facts.unitNumber));
  return data({ reply, ...kept, version: now.version }, { status: 409 });
}

export const meta: Route.MetaFunction = ({ loaderData }) => [
  { title: `Change truck ${loaderData?.truck?.unitNumber ?? ""} · Commonweigh` },
];

export default function EditTruck({ loaderData, actionData, params }: Route.ComponentProps) {
  const { truck, version, materials } = loaderData;
  const carried = truck?.materials ?? [];
  const typedBefore = materials.map(({ id }) => {
    const own = carried.find(({ materialId }) => materialId === id);
    return { materialId: id, isCarried: own !== undefined, since: own?.sinceOn ?? "" };
  });
  return (
    <Page>
      <Answer>Change truck {truck?.unitNumber}.</Answer>
      <Method>
        The working setting, speed and lanes decide what its calibrations say; their readings stay as they are.
      </Method>
      <FleetPages />
      <TruckForm
        truck={truck}
        version={actionData?.version ?? version}
        materials={materials}
        typedMaterials={actionData?.typedMaterials ?? typedBefore}
        sinceErrors={actionData?.sinceErrors ?? {}}
        reply={actionData?.reply}
        ownerId={loaderData.userId}
        isDirector={loaderData.isDirector}
        today={loaderData.today}
        button="Save the truck"
        backTo={`/fleet/${params.truckId}`}
      />
    </Page>
  );
}
