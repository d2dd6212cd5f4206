import { randomUUID } from "node:crypto";
import { data, Form, redirect } from "react-router";
import { ErrorSummary } from "#app/components/forms/error-summary.tsx";
import { NumberField, TextField } from "#app/components/forms/field.tsx";
import { KeptForm } from "#app/components/forms/kept-form.tsx";
import { SelectField } from "#app/components/forms/select-field.tsx";
import { Answer, Heading, Method } from "#app/components/layout/answer.tsx";
import { Page } from "#app/components/layout/page.tsx";
import { SeasonPages } from "#app/components/season/season-pages.tsx";
import { gridColumns, stormCells } from "#app/components/season/storm-texts.ts";
import { Button } from "#app/components/ui/button.tsx";
import { Notice } from "#app/components/ui/notice.tsx";
import { TextLink } from "#app/components/ui/text-link.tsx";
import { townActor } from "#app/context.ts";
import { seasonLabel } from "#app/domain/dates.ts";
import { readStormCells } from "#app/domain/season/storm-cells.ts";
import { stormKinds, stormKindWords } from "#app/domain/season/storm.ts";
import { readForm } from "#app/lib/form.ts";
import { formTexts } from "#app/lib/form-texts.ts";
import { formatLocalTime } from "#app/lib/format.ts";
import { idParam, seasonParam } from "#app/lib/params.ts";
import { getStorm, getStormKnowledge, removeStorm, saveStorms } from "#app/services/storms.server.ts";
import type { Route } from "./+types/storm";

export async function loader({ context, params }: Route.LoaderArgs) {
  const actor = townActor(context);
  const seasonStartYear = seasonParam(params.seasonStartYear);
  const known = await getStormKnowledge(actor, seasonStartYear);
  const storm =
    params.stormId === "new" ? null : await getStorm(actor, seasonStartYear, idParam(params.stormId, "storm"));
  return {
    seasonStartYear,
    userId: actor.userId,
    known,
    storm: storm && { id: storm.id, version: storm.version, startedAt: storm.startedAt },
    cells: storm ? stormCells(storm, known) : {},
    clientRef: randomUUID(),
  };
}

export async function action({ context, params, request }: Route.ActionArgs) {
  const actor = townActor(context);
  const seasonStartYear = seasonParam(params.seasonStartYear);
  const cells = formTexts(await readForm(request));
  const id = params.stormId === "new" ? null : idParam(params.stormId, "storm");
  const version = id === null ? null : idParam(cells.version, "version of this storm");
  const back = redirect(`/season/${seasonStartYear}/storms`);
  if (cells.intent === "remove" && id !== null && version !== null) {
    const refusal = await removeStorm(actor, seasonStartYear, id, version);
    return refusal === null ? back : data({ errors: {}, refusal }, { status: 409 });
  }
  const reading = readStormCells(cells, await getStormKnowledge(actor, seasonStartYear));
  if (!reading.ok) return data({ errors: reading.errors, refusal: null }, { status: 400 });
  const clientRef = (cells.clientRef ?? "").slice(0, 36);
  const saved = await saveStorms(actor, seasonStartYear, [{ clientRef, id, version, entry: reading.entry }]);
  if (!saved.ok) return data({ errors: {}, refusal: saved.refusal }, { status: 409 });
  if (saved.outcomes.some(({ state }) => state === "changed-meanwhile")) {
    const refusal = "Somebody changed or removed this storm meanwhile. Go back to the log and look at it again.";
    return data({ errors: {}, refusal }, { status: 409 });
  }
  return back;
}

export const meta: Route.MetaFunction = () => [{ title: "One storm · Commonweigh" }];

const hints: Record<string, string> = {
  startedAt: "Your local time, as in 1/12 4:30 am, or 2026-01-12 04:30.",
  hours: "Of all trucks together.",
  truck: "Its number, when the line is one truck’s.",
};

export default function StormPage({ loaderData, actionData }: Route.ComponentProps) {
  const { seasonStartYear, userId, known, storm, cells, clientRef } = loaderData;
  const columns = gridColumns(known);
  const errors: Record<string, string> = actionData?.errors ?? {};
  return (
    <Page>
      <Answer>
        {storm === null
          ? `A storm of ${seasonLabel(seasonStartYear)}`
          : `The storm of ${formatLocalTime(storm.startedAt)}`}
      </Answer>
      <Method>What is not known is left empty: an empty field is not a zero.</Method>
      <SeasonPages seasonStartYear={seasonStartYear} />
      {actionData?.refusal != null && <Notice tone="problem" title={actionData.refusal} />}
      <ErrorSummary
        key={JSON.stringify(errors)}
        errors={Object.entries(errors).map(([fieldId, message]) => ({ fieldId, message }))}
      />
      <KeptForm formKey="storm" ownerId={userId} method="post" className="grid gap-5">
        <input type="hidden" name="clientRef" value={clientRef} />
        <input type="hidden" name="version" value={storm?.version ?? ""} />
        <div className="grid gap-x-8 gap-y-5 sm:grid-cols-2 lg:grid-cols-3">
          {columns.map(({ key, label, unit, isNumeric }) => {
            const words = {
              name: key,
              label: label.charAt(0).toUpperCase() + label.slice(1),
              error: errors[key],
              isOptional: !["startedAt", "kind"].includes(key),
              ...(hints[key] === undefined ? {} : { hint: hints[key] }),
            };
            if (key === "kind") {
              return (
                <SelectField
                  key={key}
                  {...words}
                  defaultValue={stormKinds.find((kind) => stormKindWords[kind] === cells.kind) ?? ""}
                  prompt="choose what it was"
                  choices={stormKinds.map((kind) => ({ value: kind, label: stormKindWords[kind] }))}
                />
              );
            }
            return isNumeric === true ? (
              <NumberField
                key={key}
                {...words}
                defaultValue={cells[key] ?? ""}
                {...(unit === undefined ? {} : { unit })}
              />
            ) : (
              <TextField key={key} {...words} defaultValue={cells[key] ?? ""} />
            );
          })}
        </div>
        <div className="flex flex-wrap items-center gap-x-6 gap-y-2">
          <Button>{storm === null ? "Put it in the log" : "Save the storm"}</Button>
          <TextLink to={`/season/${seasonStartYear}/storms`} weight="bold">
            Back to the log
          </TextLink>
        </div>
      </KeptForm>
      {storm !== null && (
        <section>
          <Heading>Take it out</Heading>
          <Form method="post">
            <input type="hidden" name="version" value={storm.version} />
            <Button variant="quiet" name="intent" value="remove">
              Remove this storm
            </Button>
          </Form>
        </section>
      )}
    </Page>
  );
}
