import { data, Form, redirect } from "react-router";
import { ErrorSummary } from "#app/components/forms/error-summary.tsx";
import { NumberField, TextField } from "#app/components/forms/field.tsx";
import { KeptForm } from "#app/components/forms/kept-form.tsx";
import { SelectField } from "#app/components/forms/select-field.tsx";
import { Answer, Heading, Method } from "#app/components/layout/answer.tsx";
import { Page } from "#app/components/layout/page.tsx";
import { SeasonPages } from "#app/components/season/season-pages.tsx";
import { Button } from "#app/components/ui/button.tsx";
import { EmptyState } from "#app/components/ui/empty-state.tsx";
import { Timetable } from "#app/components/ui/timetable.tsx";
import { townActor } from "#app/context.ts";
import { cellNumber } from "#app/domain/cell-number.ts";
import { seasonLabel } from "#app/domain/dates.ts";
import type { FileProblem } from "#app/domain/file-problem.ts";
import { readForm } from "#app/lib/form.ts";
import { formTexts } from "#app/lib/form-texts.ts";
import { formatOneDecimal } from "#app/lib/format.ts";
import { idParam, seasonParam } from "#app/lib/params.ts";
import { countWords } from "#app/lib/words.ts";
import { listRoads, removeRoadLength, saveRoadLength } from "#app/services/roads.server.ts";
import { workingSeason } from "#app/services/season-figures.server.ts";
import type { Route } from "./+types/roads";

export async function loader({ context }: Route.LoaderArgs) {
  const actor = townActor(context);
  const [roads, workingYear] = await Promise.all([listRoads(actor), workingSeason()]);
  return { ...roads, userId: actor.userId, workingYear };
}

export async function action({ context, request }: Route.ActionArgs) {
  const actor = townActor(context);
  const values = formTexts(await readForm(request));
  if (values.intent === "remove") {
    await removeRoadLength(actor, idParam(values.roadClassId, "road class"));
    return redirect("/season/roads");
  }
  const problems: FileProblem[] = [];
  const row = { row: 0, cells: new Map(Object.entries(values)) };
  const laneMiles = cellNumber(row, "laneMiles", { what: "lane miles", min: 0, max: 10_000 }, problems);
  const errors = Object.fromEntries(problems.map(({ column, message }) => [column ?? "", message]));
  const name = (values.name ?? "").replace(/\s+/g, " ").trim();
  if (name === "" || name.length > 40) errors.name = "Name the class of road, in at most 40 letters.";
  if (Object.keys(errors).length > 0 || laneMiles === null) return data({ errors, values }, { status: 400 });
  await saveRoadLength(actor, { name, seasonStartYear: seasonParam(values.seasonStartYear), laneMiles });
  return redirect("/season/roads");
}

export const meta: Route.MetaFunction = () => [{ title: "Roads · Commonweigh" }];

export default function Roads({ loaderData, actionData }: Route.ComponentProps) {
  const { seasons, lengths, seasonStartYears, userId, workingYear } = loaderData;
  const current = seasons.find(({ seasonStartYear }) => seasonStartYear === workingYear) ?? seasons[0];
  const total = current?.roads.reduce((sum, road) => sum + road.laneMiles, 0) ?? 0;
  const names = [...new Set(lengths.map(({ name }) => name))];
  const errors: Record<string, string> = actionData?.errors ?? {};
  const values: Record<string, string> = actionData?.values ?? {};
  return (
    <Page>
      <Answer>
        {current === undefined || current.roads.length === 0
          ? "No road is written down yet."
          : `You keep ${formatOneDecimal(total)} lane miles in ${countWords(current.roads.length, "class", "classes")} of road in ${seasonLabel(current.seasonStartYear)}.`}
      </Answer>
      <Method>
        A length holds from its season on, until a later one is written down. Figures that were sent in keep the lane
        miles they were sent with.
      </Method>
      {workingYear !== null && <SeasonPages seasonStartYear={workingYear} />}
      <ErrorSummary
        key={JSON.stringify(errors)}
        errors={Object.entries(errors).map(([fieldId, message]) => ({ fieldId, message }))}
      />
      {names.length === 0 ? (
        <EmptyState title="Roads stand here by class">
          Give each class the lane miles you treat: two lanes of a mile are two lane miles.
        </EmptyState>
      ) : (
        <div>
          <Timetable
            caption="Lane miles by class and season"
            onPhone="stack"
            columns={[
              { key: "name", label: "class" },
              ...seasons.map(({ seasonStartYear }) => ({
                key: String(seasonStartYear),
                label: seasonLabel(seasonStartYear),
                isNumeric: true,
              })),
            ]}
            rows={[
              ...names.map((name) => ({
                key: name,
                cells: {
                  name,
                  ...Object.fromEntries(
                    seasons.map(({ seasonStartYear, roads }) => [
                      String(seasonStartYear),
                      formatOneDecimal(roads.find((road) => road.name === name)?.laneMiles ?? null),
                    ]),
                  ),
                },
              })),
              {
                key: "all roads",
                isOurs: true,
                cells: {
                  name: "All roads",
                  ...Object.fromEntries(
                    seasons.map(({ seasonStartYear, roads }) => [
                      String(seasonStartYear),
                      roads.length === 0 ? "–" : formatOneDecimal(roads.reduce((sum, road) => sum + road.laneMiles, 0)),
                    ]),
                  ),
                },
              },
            ]}
          />
        </div>
      )}
      <Heading>Write a length down</Heading>
      <KeptForm key={lengths.length} formKey="road" ownerId={userId} method="post" className="grid gap-5">
        <div className="grid gap-x-8 gap-y-5 sm:grid-cols-3">
          <TextField
            name="name"
            label="Class of road"
            hint="As in arterial, collector, local, or a class of your own."
            list="road-classes"
            maxLength={40}
            error={errors.name}
            defaultValue={values.name ?? ""}
          />
          <NumberField
            name="laneMiles"
            label="Lane miles"
            hint="0 ends the class."
            error={errors.laneMiles}
            defaultValue={values.laneMiles ?? ""}
          />
          <SelectField
            name="seasonStartYear"
            label="From the season"
            defaultValue={values.seasonStartYear ?? String(workingYear ?? "")}
            choices={seasonStartYears.map((year) => ({ value: String(year), label: seasonLabel(year) }))}
          />
        </div>
        <datalist id="road-classes">
          {names.map((name) => (
            <option key={name} value={name} />
          ))}
        </datalist>
        <div>
          <Button>Write it down</Button>
        </div>
      </KeptForm>
      {lengths.length > 0 && (
        <details className="group mt-8">
          <summary className="flex min-h-target w-fit list-none items-center font-semibold text-spruce underline decoration-1 underline-offset-3 hover:decoration-2">
            As it was written down, length by length
          </summary>
          <Timetable
            caption="Lengths and the season from which they hold"
            isCaptionHidden
            columns={[
              { key: "name", label: "class" },
              { key: "from", label: "from" },
              { key: "miles", label: "lane miles", isNumeric: true },
              { key: "remove", label: "" },
            ]}
            rows={lengths.map(({ id, name, seasonStartYear, laneMiles }) => ({
              key: String(id),
              cells: {
                name,
                from: seasonLabel(seasonStartYear),
                miles: formatOneDecimal(laneMiles),
                remove: (
                  <Form method="post">
                    <input type="hidden" name="roadClassId" value={id} />
                    <Button variant="quiet" size="slim" name="intent" value="remove">
                      Remove
                      <span className="sr-only">
                        {" "}
                        {name} from {seasonLabel(seasonStartYear)}
                      </span>
                    </Button>
                  </Form>
                ),
              },
            }))}
          />
        </details>
      )}
    </Page>
  );
}
