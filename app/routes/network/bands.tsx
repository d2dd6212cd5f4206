import { data, redirect, useNavigation } from "react-router";
import { BandFields } from "#app/components/fleet/band-fields.tsx";
import { readBandForm, typedBands } from "#app/components/fleet/band-form.ts";
import { ErrorSummary } from "#app/components/forms/error-summary.tsx";
import { NumberField } from "#app/components/forms/field.tsx";
import { KeptForm } from "#app/components/forms/kept-form.tsx";
import { Answer, Heading, Method } from "#app/components/layout/answer.tsx";
import { Page } from "#app/components/layout/page.tsx";
import { NetworkPages } from "#app/components/network/network-pages.tsx";
import { Button } from "#app/components/ui/button.tsx";
import { networkActor } from "#app/context.ts";
import { readForm } from "#app/lib/form.ts";
import { formatWhole } from "#app/lib/format.ts";
import { typedNumber } from "#app/lib/typed-figures.ts";
import { bandsOfNetwork, practiceBands, setNetworkBands, tolerancePercent } from "#app/services/bands.server.ts";
import type { Route } from "./+types/bands";

const Tolerance = typedNumber({ what: "tolerance, percent", min: 0.5, max: 50 });

export async function loader({ context }: Route.LoaderArgs) {
  const actor = networkActor(context);
  const [bands, tolerance] = await Promise.all([bandsOfNetwork(), tolerancePercent()]);
  return { bands, practice: practiceBands(), tolerance, userId: actor.userId };
}

export async function action({ context, request }: Route.ActionArgs) {
  const form = await readForm(request);
  const { typed, errors, bands } = readBandForm(form);
  const text = form.get("tolerance");
  typed.tolerance = typeof text === "string" ? text : "";
  const tolerance = Tolerance.safeParse(typed.tolerance);
  if (!tolerance.success) errors.tolerance = tolerance.error.issues[0]?.message ?? "Give the tolerance.";
  if (!tolerance.success || Object.keys(errors).length > 0) return data({ typed, errors }, { status: 400 });
  await setNetworkBands(networkActor(context), bands, tolerance.data);
  return redirect("/network/bands");
}

export const meta: Route.MetaFunction = () => [{ title: "Bands · Commonweigh" }];

export default function NetworkBands({ loaderData, actionData }: Route.ComponentProps) {
  const { bands, practice, tolerance, userId } = loaderData;
  const isSending = useNavigation().formMethod === "POST";
  const errors = Object.entries(actionData?.errors ?? {}).map(([fieldId, message]) => ({ fieldId, message }));
  return (
    <Page>
      <Answer>
        {bands.salt
          ? `Towns read their salt rates against ${formatWhole(bands.salt.lowLbPerLaneMile)} to ${formatWhole(bands.salt.highLbPerLaneMile)} lb per lane mile.`
          : "No band is set for straight salt."}
      </Answer>
      <Method>
        What the network sets holds in every town that has no band of its own. Editions keep the band they were
        published with.
      </Method>
      <div className="mt-5">
        <NetworkPages />
      </div>
      {errors.length > 0 && <ErrorSummary key={JSON.stringify(actionData)} errors={errors} />}
      <KeptForm formKey="bands" ownerId={userId} method="post" noValidate>
        <Heading>Bands</Heading>
        <BandFields
          typed={actionData?.typed ?? typedBands(bands, "network")}
          errors={actionData?.errors ?? {}}
          fallback={practice}
          fallbackWords="common practice"
        />
        <Heading>Ground-speed control</Heading>
        <NumberField
          name="tolerance"
          label="A controller may miss what it was told by"
          unit="%"
          hint="A choice of the network: no published figure is known."
          defaultValue={actionData?.typed.tolerance ?? String(tolerance)}
          error={actionData?.errors.tolerance ?? null}
        />
        <div className="mt-6">
          <Button busy={isSending && "Saving"}>Save for the network</Button>
        </div>
      </KeptForm>
    </Page>
  );
}
