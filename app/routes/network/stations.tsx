import { randomUUID } from "node:crypto";
import { data, Form, redirect } from "react-router";
import { ErrorSummary } from "#app/components/forms/error-summary.tsx";
import { TextField } from "#app/components/forms/field.tsx";
import { KeptForm } from "#app/components/forms/kept-form.tsx";
import { SelectField } from "#app/components/forms/select-field.tsx";
import { Answer, Heading, Method } from "#app/components/layout/answer.tsx";
import { Page } from "#app/components/layout/page.tsx";
import { NetworkPages } from "#app/components/network/network-pages.tsx";
import { SeasonSwitch } from "#app/components/season/season-switch.tsx";
import { StationTable } from "#app/components/network/station-table.tsx";
import { Button } from "#app/components/ui/button.tsx";
import { EmptyState } from "#app/components/ui/empty-state.tsx";
import { Notice } from "#app/components/ui/notice.tsx";
import { networkActor } from "#app/context.ts";
import { seasonLabel } from "#app/domain/dates.ts";
import { notFound } from "#app/lib/errors.ts";
import { readForm } from "#app/lib/form.ts";
import { formTexts } from "#app/lib/form-texts.ts";
import { idParam, seasonParam } from "#app/lib/params.ts";
import { countWords, listWords, sentenceStart } from "#app/lib/words.ts";
import { isStationId } from "#app/lib/weather/station-id.ts";
import { getSeasonYears, workingSeason } from "#app/services/season-figures.server.ts";
import { addStation, askForWeather, attachTown, listStations } from "#app/services/stations.server.ts";
import type { Route } from "./+types/stations";

export async function loader({ context, url }: Route.LoaderArgs) {
  const actor = networkActor(context);
  const asked = url.searchParams.get("season");
  const [working, seasonStartYears] = await Promise.all([workingSeason(), getSeasonYears()]);
  const seasonStartYear = asked === null ? working : seasonParam(asked);
  if (seasonStartYear === null) throw notFound("season: open the first one");
  const view = await listStations(actor, seasonStartYear);
  return {
    ...view,
    stations: view.stations.map(({ winter, ...station }) => ({
      ...station,
      winter:
        winter.state === "known"
          ? {
              points: winter.winter.severity.totalPoints,
              category: winter.winter.category?.category ?? null,
              missing: winter.winter.severity.missingDayCounts,
              isSound: winter.winter.quality.isTotalSound,
            }
          : null,
    })),
    seasonStartYear,
    seasonStartYears,
    userId: actor.userId,
    clientRef: randomUUID(),
  };
}

export async function action({ context, request }: Route.ActionArgs) {
  const actor = networkActor(context);
  const values = formTexts(await readForm(request));
  const season = seasonParam(values.seasonStartYear);
  const back = redirect(`/network/stations?season=${season}`);
  if (values.intent === "fetch") {
    const clientRef = (values.clientRef ?? "").slice(0, 36);
    await askForWeather(actor, { stationId: idParam(values.stationId, "station"), seasonStartYear: season, clientRef });
    return back;
  }
  if (values.intent === "attach") {
    const stationId = values.stationId === "" ? null : idParam(values.stationId, "station");
    await attachTown(actor, idParam(values.townId, "town"), stationId);
    return back;
  }
  const code = (values.code ?? "").trim().toUpperCase();
  const name = (values.name ?? "").trim();
  const errors: Record<string, string> = {};
  if (!isStationId(code)) errors.code = "The archive’s code has eleven characters, two letters first: USC00000001.";
  if (name.length < 2 || name.length > 80) errors.name = "Give the station a name of at most 80 letters.";
  if (Object.keys(errors).length > 0) return data({ errors, values }, { status: 400 });
  if (!(await addStation(actor, { code, name }))) {
    return data({ errors: { code: "A station of this code is there already." }, values }, { status: 409 });
  }
  return back;
}

export const handle = { notForSharing: true };

export const meta: Route.MetaFunction = () => [{ title: "Weather · Commonweigh" }];

export default function Stations({ loaderData, actionData }: Route.ComponentProps) {
  const { stations, towns, townsWithout, jobs, hasService, seasonStartYear, seasonStartYears, userId, clientRef } =
    loaderData;
  const label = seasonLabel(seasonStartYear);
  const known = stations.filter(({ winter }) => winter !== null);
  const unsound = known.filter(({ winter }) => winter?.isSound === false);
  const waiting = jobs.filter(({ state }) => state === "ready" || state === "running").length;
  const failed = jobs.find(({ state }) => state === "failed");
  const errors: Record<string, string> = actionData?.errors ?? {};
  const values: Record<string, string> = actionData?.values ?? {};
  return (
    <Page>
      <Answer>
        {stations.length === 0
          ? "No weather station is known yet."
          : `${known.length === stations.length ? "Every station has" : `${sentenceStart(countWords(known.length, "of", "of"))} ${countWords(stations.length, "station", "stations")} ${known.length === 1 ? "has" : "have"}`} the weather of ${label}${unsound.length === 0 ? "." : `; ${listWords(unsound.map(({ name }) => name))} with too many days missing.`}`}
      </Answer>
      <Method>
        Each town is held against the winter of one station. Missing days are counted and never filled in.
        {townsWithout.length > 0 && ` Without a station: ${listWords(townsWithout.map(({ name }) => name))}.`}
      </Method>
      <div className="mt-5">
        <NetworkPages />
      </div>
      <ErrorSummary
        key={JSON.stringify(errors)}
        errors={Object.entries(errors).map(([fieldId, message]) => ({ fieldId, message }))}
      />
      {waiting > 0 && (
        <Notice title={`${sentenceStart(countWords(waiting, "request is", "requests are"))} on the way.`}>
          The worker asks the service one after the other. Reload in a moment.
        </Notice>
      )}
      {failed !== undefined && waiting === 0 && (
        <Notice title="The last request that failed">{failed.lastError ?? "No reason was given."}</Notice>
      )}
      {stations.length === 0 ? (
        <EmptyState title="Stations stand here">Add one below by its code in the public daily archive.</EmptyState>
      ) : (
        <StationTable
          stations={stations}
          seasonStartYear={seasonStartYear}
          hasService={hasService}
          clientRef={clientRef}
        />
      )}
      {!hasService && (
        <p className="mt-3 text-note text-gravel">
          No weather service is set up, so weather comes in as the station’s file, uploaded by a town.
        </p>
      )}
      <div className="grid gap-x-10 md:grid-cols-2">
        <section>
          <Heading>Attach a town</Heading>
          <Form method="post" className="grid gap-5">
            <input type="hidden" name="seasonStartYear" value={seasonStartYear} />
            <SelectField
              name="townId"
              label="Town"
              prompt="choose a town"
              required
              choices={towns.map(({ id, name, stationId }) => ({
                value: String(id),
                label: stationId === null ? `${name}, without a station` : name,
              }))}
            />
            <SelectField
              name="stationId"
              label="Station"
              prompt="no station"
              choices={stations.map(({ id, name }) => ({ value: String(id), label: name }))}
            />
            <div>
              <Button name="intent" value="attach">
                Attach it
              </Button>
            </div>
          </Form>
        </section>
        <section>
          <Heading>Add a station</Heading>
          <KeptForm key={stations.length} formKey="station" ownerId={userId} method="post" className="grid gap-5">
            <input type="hidden" name="seasonStartYear" value={seasonStartYear} />
            <TextField
              name="code"
              label="Code"
              hint="Of the public daily archive (GHCN-Daily): eleven characters."
              maxLength={11}
              error={errors.code}
              defaultValue={values.code ?? ""}
            />
            <TextField name="name" label="Name" maxLength={80} error={errors.name} defaultValue={values.name ?? ""} />
            <div>
              <Button variant="quiet" name="intent" value="add">
                Add it
              </Button>
            </div>
          </KeptForm>
        </section>
      </div>
      <SeasonSwitch
        seasonStartYears={seasonStartYears}
        current={seasonStartYear}
        toOf={(year) => `/network/stations?season=${year}`}
      />
    </Page>
  );
}
