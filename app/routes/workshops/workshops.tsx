import { randomUUID } from "node:crypto";
import { getFormProps, useForm } from "@conform-to/react";
import { getZodConstraint, parseWithZod } from "@conform-to/zod/v4";
import { data, redirect } from "react-router";
import { z } from "zod";
import { TextField } from "#app/components/forms/field.tsx";
import { fieldWords } from "#app/components/forms/field-words.ts";
import { KeptForm } from "#app/components/forms/kept-form.tsx";
import { SelectField } from "#app/components/forms/select-field.tsx";
import { Answer, Heading, Method } from "#app/components/layout/answer.tsx";
import { Page } from "#app/components/layout/page.tsx";
import { Button } from "#app/components/ui/button.tsx";
import { EmptyState } from "#app/components/ui/empty-state.tsx";
import { TextLink } from "#app/components/ui/text-link.tsx";
import { Timetable } from "#app/components/ui/timetable.tsx";
import { networkActor, personActor } from "#app/context.ts";
import { isLocalDate, seasonLabel } from "#app/domain/dates.ts";
import { readForm } from "#app/lib/form.ts";
import { formatDay } from "#app/lib/format.ts";
import { countWords, sentenceStart } from "#app/lib/words.ts";
import { listEditions } from "#app/services/editions.server.ts";
import { createWorkshop, listWorkshops } from "#app/services/workshops.server.ts";
import type { Route } from "./+types/workshops";

const WorkshopForm = z.object({
  clientRef: z.uuid(),
  title: z
    .string({ error: "Give the workshop a title." })
    .trim()
    .min(3, "Give the workshop a title.")
    .max(120, "At most 120 letters."),
  heldOn: z.string({ error: "Choose the day." }).refine(isLocalDate, "Choose the day."),
  editionId: z.string({ error: "Choose an edition." }).regex(/^[1-9]\d{0,9}$/, "Choose an edition."),
});

export async function loader({ context }: Route.LoaderArgs) {
  const actor = personActor(context);
  const isCoordinator = actor.kind === "network";
  const [workshops, editions] = await Promise.all([listWorkshops(actor), listEditions()]);
  return {
    workshops,
    isCoordinator,
    userId: actor.userId,
    editions: isCoordinator ? editions : [],
    clientRef: randomUUID(),
  };
}

export async function action({ context, request }: Route.ActionArgs) {
  const submission = parseWithZod(await readForm(request), { schema: WorkshopForm });
  if (submission.status !== "success") return data(submission.reply(), { status: 400 });
  const { editionId, ...input } = submission.value;
  const workshopId = await createWorkshop(networkActor(context), { ...input, editionId: Number(editionId) });
  return redirect(`/workshops/${workshopId}`);
}

export const meta: Route.MetaFunction = () => [{ title: "Workshops · Commonweigh" }];

export default function Workshops({ loaderData, actionData }: Route.ComponentProps) {
  const { workshops, isCoordinator, editions } = loaderData;
  const [next] = workshops;
  return (
    <Page>
      <Answer>
        {next
          ? `${sentenceStart(countWords(workshops.length, "workshop is", "workshops are"))} on the calendar: ${workshops.length > 1 ? "the latest, " : ""}“${next.title}”, on ${formatDay(next.heldOn)}.`
          : "No workshop is on the calendar yet."}
      </Answer>
      <Method>
        A workshop’s boards show protected figures without names. Your own place stays on your own screen.
      </Method>
      {workshops.length === 0 && !isCoordinator && (
        <EmptyState title="Workshops of the network stand here">The coordinator puts them on the calendar.</EmptyState>
      )}
      {workshops.length > 0 && (
        <div className="mt-6">
          <Timetable
            caption="Workshops, the latest first"
            isCaptionHidden
            columns={[
              { key: "title", label: "workshop" },
              { key: "day", label: "day" },
              { key: "edition", label: "drawn from" },
              { key: "boards", label: "boards", isNumeric: true },
            ]}
            rows={workshops.map((workshop) => ({
              key: String(workshop.id),
              cells: {
                title: isCoordinator ? (
                  <TextLink to={`/workshops/${workshop.id}`}>{workshop.title}</TextLink>
                ) : (
                  workshop.title
                ),
                day: formatDay(workshop.heldOn),
                edition: `${seasonLabel(workshop.seasonStartYear)}, edition ${workshop.editionNumber}`,
                boards: workshop.boardCount,
              },
            }))}
          />
        </div>
      )}
      {isCoordinator && editions.length > 0 && <NewWorkshop loaderData={loaderData} actionData={actionData} />}
      {isCoordinator && editions.length === 0 && (
        <EmptyState title="A workshop needs an edition">Publish one first; its boards are drawn from it.</EmptyState>
      )}
    </Page>
  );
}

function NewWorkshop({ loaderData, actionData }: Pick<Route.ComponentProps, "loaderData" | "actionData">) {
  const [form, fields] = useForm({
    lastResult: actionData,
    constraint: getZodConstraint(WorkshopForm),
    onValidate: ({ formData }) => parseWithZod(formData, { schema: WorkshopForm }),
    shouldRevalidate: "onInput",
  });
  return (
    <section>
      <Heading>Prepare a workshop</Heading>
      <KeptForm
        formKey="workshop"
        ownerId={loaderData.userId}
        method="post"
        {...getFormProps(form)}
        className="grid gap-5"
      >
        <input type="hidden" name="clientRef" value={loaderData.clientRef} />
        <TextField {...fieldWords(fields.title)} label="Title" isWide maxLength={120} />
        <TextField {...fieldWords(fields.heldOn)} type="date" label="Day" />
        <SelectField
          {...fieldWords(fields.editionId)}
          label="Edition its boards are drawn from"
          choices={loaderData.editions.map(({ id, seasonStartYear, number }) => ({
            value: String(id),
            label: `${seasonLabel(seasonStartYear)}, edition ${number}`,
          }))}
        />
        <div>
          <Button>Put it on the calendar</Button>
        </div>
      </KeptForm>
    </section>
  );
}
