import { data, redirect, useNavigation } from "react-router";
import { BandFields } from "#app/components/fleet/band-fields.tsx";
import { readBandForm, typedBands } from "#app/components/fleet/band-form.ts";
import { FleetPages } from "#app/components/fleet/fleet-pages.tsx";
import { ErrorSummary } from "#app/components/forms/error-summary.tsx";
import { KeptForm } from "#app/components/forms/kept-form.tsx";
import { Answer, Heading, Method } from "#app/components/layout/answer.tsx";
import { Page } from "#app/components/layout/page.tsx";
import { Button } from "#app/components/ui/button.tsx";
import { Timetable } from "#app/components/ui/timetable.tsx";
import { townActor } from "#app/context.ts";
import { readForm } from "#app/lib/form.ts";
import { formatWhole } from "#app/lib/format.ts";
import { type BandInForce, bandsOfNetwork, bandsOfTown, setTownBands } from "#app/services/bands.server.ts";
import type { Route } from "./+types/bands";

export async function loader({ context }: Route.LoaderArgs) {
  const actor = townActor(context);
  const [bands, networkBands] = await Promise.all([bandsOfTown(actor), bandsOfNetwork()]);
  return { bands, networkBands, userId: actor.userId, isDirector: actor.role === "director" };
}

export async function action({ context, request }: Route.ActionArgs) {
  const { typed, errors, bands } = readBandForm(await readForm(request));
  if (Object.keys(errors).length > 0) return data({ typed, errors }, { status: 400 });
  await setTownBands(townActor(context), bands);
  return redirect("/fleet/bands");
}

export const meta: Route.MetaFunction = () => [{ title: "Bands · Commonweigh" }];

const originWords = { town: "your town", network: "the network", "common-practice": "common practice" };
const rows = [
  { kind: "salt", words: "straight salt" },
  { kind: "mix", words: "salt and sand mixed" },
  { kind: "sand", words: "sand" },
] as const;

function range(band: BandInForce) {
  return band ? `${formatWhole(band.lowLbPerLaneMile)}–${formatWhole(band.highLbPerLaneMile)}` : "none";
}

export default function Bands({ loaderData, actionData }: Route.ComponentProps) {
  const { bands, networkBands, userId, isDirector } = loaderData;
  const isSending = useNavigation().formMethod === "POST";
  const errors = Object.entries(actionData?.errors ?? {}).map(([fieldId, message]) => ({ fieldId, message }));
  return (
    <Page>
      <Answer>
        {bands.salt
          ? `The band for straight salt is ${formatWhole(bands.salt.lowLbPerLaneMile)} to ${formatWhole(bands.salt.highLbPerLaneMile)} lb per lane mile here.`
          : "No band is set for straight salt."}
      </Answer>
      <Method>
        Bands are yardsticks that your own calibrations are read against. Peers compares every town with one band, the
        edition’s; a change here moves nothing there.
      </Method>
      <FleetPages />
      <Timetable
        caption="Bands in force, lb per lane mile, and who set them"
        columns={[
          { key: "material", label: "material" },
          { key: "band", label: "band", unit: "lb per lane mile", isNumeric: true },
          { key: "origin", label: "set by" },
        ]}
        rows={rows.map(({ kind, words }) => ({
          key: kind,
          cells: {
            material: words,
            band: range(bands[kind]),
            origin: bands[kind] ? originWords[bands[kind].origin] : "–",
          },
        }))}
      />
      <p className="mt-2 text-note text-gravel">
        Common practice has no published source; that is why it can be changed.
      </p>
      {isDirector ? (
        <>
          <Heading>Your town’s own bands</Heading>
          {errors.length > 0 && <ErrorSummary key={JSON.stringify(actionData)} errors={errors} />}
          <KeptForm formKey="bands" ownerId={userId} method="post" noValidate>
            <BandFields
              typed={actionData?.typed ?? typedBands(bands, "town")}
              errors={actionData?.errors ?? {}}
              fallback={networkBands}
              fallbackWords="the network’s"
            />
            <div className="mt-6">
              <Button busy={isSending && "Saving"}>Save your bands</Button>
            </div>
          </KeptForm>
        </>
      ) : (
        <p className="mt-6 font-semibold">The director sets the town’s own bands.</p>
      )}
    </Page>
  );
}
