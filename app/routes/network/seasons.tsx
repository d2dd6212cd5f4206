import { data, Form, redirect } from "react-router";
import { ErrorSummary } from "#app/components/forms/error-summary.tsx";
import { TextField } from "#app/components/forms/field.tsx";
import { KeptForm } from "#app/components/forms/kept-form.tsx";
import { Answer, Heading, Method } from "#app/components/layout/answer.tsx";
import { Page } from "#app/components/layout/page.tsx";
import { NetworkPages } from "#app/components/network/network-pages.tsx";
import { readSeasonDates } from "#app/components/network/season-form.ts";
import { Button } from "#app/components/ui/button.tsx";
import { EmptyState } from "#app/components/ui/empty-state.tsx";
import { TextLink } from "#app/components/ui/text-link.tsx";
import { networkActor } from "#app/context.ts";
import { seasonLabel, seasonStartYearOf } from "#app/domain/dates.ts";
import { now } from "#app/lib/clock.server.ts";
import { readForm } from "#app/lib/form.ts";
import { formTexts } from "#app/lib/form-texts.ts";
import { formatDay } from "#app/lib/format.ts";
import { seasonParam } from "#app/lib/params.ts";
import { changeSeason, listSeasons, openSeason } from "#app/services/seasons.server.ts";
import type { Route } from "./+types/seasons";

export async function loader({ context }: Route.LoaderArgs) {
  const actor = networkActor(context);
  const seasons = await listSeasons(actor);
  const newest = seasons[0]?.startYear;
  const current = seasonStartYearOf(now().toISOString().slice(0, 10));
  return { seasons, nextStartYear: newest === undefined ? current : newest + 1, userId: actor.userId };
}

export async function action({ context, request }: Route.ActionArgs) {
  const actor = networkActor(context);
  const values = formTexts(await readForm(request));
  const startYear = seasonParam(values.startYear);
  const reading = readSeasonDates(values, startYear);
  if (!reading.ok) return data({ errors: reading.errors, values }, { status: 400 });
  if (values.intent === "open") {
    if (!(await openSeason(actor, startYear, reading.dates))) {
      return data({ errors: { figuresDueOn: `${seasonLabel(startYear)} is open already.` }, values }, { status: 409 });
    }
  } else {
    await changeSeason(actor, startYear, reading.dates);
  }
  return redirect("/network/seasons");
}

export const meta: Route.MetaFunction = () => [{ title: "Seasons · Commonweigh" }];

type Dates = { opensOn: string | null; figuresDueOn: string | null; closesOn: string | null };

function DateFields({ dates, prefix, errors }: { dates: Dates; prefix: string; errors: Record<string, string> }) {
  return (
    <>
      <TextField
        name="opensOn"
        id={`${prefix}opensOn`}
        type="date"
        label="Opens"
        isOptional
        defaultValue={dates.opensOn ?? ""}
        error={errors.opensOn}
      />
      <TextField
        name="figuresDueOn"
        id={`${prefix}figuresDueOn`}
        type="date"
        label="Figures due"
        defaultValue={dates.figuresDueOn ?? ""}
        error={errors.figuresDueOn}
      />
      <TextField
        name="closesOn"
        id={`${prefix}closesOn`}
        type="date"
        label="Closes"
        isOptional
        defaultValue={dates.closesOn ?? ""}
        error={errors.closesOn}
      />
    </>
  );
}

export default function Seasons({ loaderData, actionData }: Route.ComponentProps) {
  const { seasons, nextStartYear, userId } = loaderData;
  const errors: Record<string, string> = actionData?.errors ?? {};
  const values: Record<string, string> = actionData?.values ?? {};
  const isOpening = values.intent === "open";
  const prefixOf = (startYear: number) => `season-${startYear}-`;
  const prefix = isOpening ? "" : prefixOf(Number(values.startYear));
  const newest = seasons[0];
  const label = seasonLabel(nextStartYear);
  return (
    <Page>
      <Answer>
        {newest === undefined
          ? "No season is open yet."
          : `${seasonLabel(newest.startYear)} is the newest season; its figures are due ${formatDay(newest.figuresDueOn)}.`}
      </Answer>
      <Method>
        A season runs from 1 July to 30 June. Towns write into it from the day it opens until the day it closes; what
        was sent back to a town can be put right at any time.
      </Method>
      <div className="mt-5">
        <NetworkPages />
      </div>
      <ErrorSummary
        key={JSON.stringify(errors)}
        errors={Object.entries(errors).map(([field, message]) => ({ fieldId: `${prefix}${field}`, message }))}
      />
      <Heading>Open {label}</Heading>
      <KeptForm key={nextStartYear} formKey="open" ownerId={userId} method="post" className="grid gap-5">
        <input type="hidden" name="startYear" value={nextStartYear} />
        <div className="grid gap-x-8 gap-y-5 sm:grid-cols-3">
          <DateFields
            prefix=""
            dates={{
              opensOn: (isOpening ? values.opensOn : undefined) ?? `${nextStartYear}-09-01`,
              figuresDueOn: (isOpening ? values.figuresDueOn : undefined) ?? `${nextStartYear + 1}-08-31`,
              closesOn: (isOpening ? values.closesOn : undefined) ?? "",
            }}
            errors={isOpening ? errors : {}}
          />
        </div>
        <div className="flex flex-wrap items-center gap-x-5 gap-y-2">
          <Button name="intent" value="open">
            Open {label}
          </Button>
          <p className="text-note text-gravel">Everybody of every town is told by mail, who has not said no to it.</p>
        </div>
      </KeptForm>
      <Heading>Seasons so far</Heading>
      {seasons.length === 0 && (
        <EmptyState title="Seasons stand here, the newest first">Open the first one above.</EmptyState>
      )}
      <ol className="border-t-2 border-line">
        {seasons.map((season) => {
          const isBack = !isOpening && values.startYear === String(season.startYear);
          const missing = season.townCount - season.sentCount - season.returnedCount - season.acceptedCount;
          return (
            <li key={season.startYear} className="border-b border-rule py-4">
              <h3 className="text-head font-bold">{seasonLabel(season.startYear)}</h3>
              <p className="text-table text-gravel">
                {season.acceptedCount} accepted,{" "}
                {season.sentCount > 0 ? (
                  <TextLink to={`/network/review?season=${season.startYear}`}>
                    {season.sentCount} waiting for review
                  </TextLink>
                ) : (
                  "none waiting for review"
                )}
                , {season.returnedCount} sent back, {missing} not sent
              </p>
              <details open={isBack} className="group">
                <summary className="flex min-h-target w-fit list-none items-center text-table font-semibold text-spruce underline decoration-1 underline-offset-3 hover:decoration-2">
                  {season.opensOn === null ? "" : `Opened ${formatDay(season.opensOn)}, `}due{" "}
                  {formatDay(season.figuresDueOn)},{" "}
                  {season.closesOn === null ? "not closed" : `closes ${formatDay(season.closesOn)}`}: change
                </summary>
                <Form method="post" className="mt-2 grid items-end gap-x-6 gap-y-4 sm:grid-cols-[1fr_1fr_1fr_auto]">
                  <input type="hidden" name="startYear" value={season.startYear} />
                  <DateFields
                    prefix={prefixOf(season.startYear)}
                    dates={
                      isBack
                        ? {
                            opensOn: values.opensOn ?? "",
                            figuresDueOn: values.figuresDueOn ?? "",
                            closesOn: values.closesOn ?? "",
                          }
                        : season
                    }
                    errors={isBack ? errors : {}}
                  />
                  <div>
                    <Button variant="quiet">
                      Save<span className="sr-only"> {seasonLabel(season.startYear)}</span>
                    </Button>
                  </div>
                </Form>
              </details>
            </li>
          );
        })}
      </ol>
    </Page>
  );
}
