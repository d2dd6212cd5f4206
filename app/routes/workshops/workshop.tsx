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
import { Button, ButtonLink } from "#app/components/ui/button.tsx";
import { TextLink } from "#app/components/ui/text-link.tsx";
import { Timetable } from "#app/components/ui/timetable.tsx";
import { networkActor } from "#app/context.ts";
import { seasonLabel } from "#app/domain/dates.ts";
import { indicators } from "#app/domain/peers/indicators.ts";
import { readForm } from "#app/lib/form.ts";
import { formatDay } from "#app/lib/format.ts";
import { idParam } from "#app/lib/params.ts";
import { countWords } from "#app/lib/words.ts";
import { addBoard, getWorkshop } from "#app/services/workshops.server.ts";
import type { Route } from "./+types/workshop";

const BoardForm = z.object({
  clientRef: z.uuid(),
  shows: z
    .string({ error: "Choose what the board shows." })
    .regex(/^[a-z0-9-]+\|[a-z0-9-]+$/, "Choose what the board shows."),
  question: z
    .string({ error: "Write the question the room is to discuss." })
    .trim()
    .min(8, "Write the question the room is to discuss.")
    .max(200, "At most 200 letters: it must be read from the back of the room."),
});

export async function loader({ context, params }: Route.LoaderArgs) {
  const actor = networkActor(context);
  const workshop = await getWorkshop(actor, idParam(params.workshopId, "workshop"));
  return { workshop, userId: actor.userId, clientRef: randomUUID() };
}

export async function action({ context, params, request }: Route.ActionArgs) {
  const workshopId = idParam(params.workshopId, "workshop");
  const submission = parseWithZod(await readForm(request), { schema: BoardForm });
  if (submission.status !== "success") return data(submission.reply(), { status: 400 });
  const { shows, clientRef, question } = submission.value;
  const [indicator = "", groupKey = ""] = shows.split("|");
  await addBoard(networkActor(context), workshopId, { clientRef, indicator, groupKey, question });
  return redirect(`/workshops/${workshopId}`);
}

export const meta: Route.MetaFunction = ({ loaderData }) => [
  { title: `${loaderData?.workshop.title ?? "Workshop"} · Commonweigh` },
];

export default function WorkshopPage({ loaderData, actionData }: Route.ComponentProps) {
  const { workshop, userId, clientRef } = loaderData;
  const [form, fields] = useForm({
    lastResult: actionData,
    constraint: getZodConstraint(BoardForm),
    onValidate: ({ formData }) => parseWithZod(formData, { schema: BoardForm }),
    shouldRevalidate: "onInput",
  });
  const groupLabel = (key: string) => workshop.choices.find(({ groupKey }) => groupKey === key)?.groupLabel ?? key;
  return (
    <Page>
      <Answer>
        {workshop.boards.length === 0
          ? `“${workshop.title}” has no board yet.`
          : `“${workshop.title}” on ${formatDay(workshop.heldOn)} has ${countWords(workshop.boards.length, "board", "boards")}.`}
      </Answer>
      <Method>
        Drawn from {seasonLabel(workshop.seasonStartYear)}, edition {workshop.editionNumber}. The wall shows no names,
        and the number of towns only as a band.
      </Method>
      {workshop.boards.length > 0 && (
        <>
          <p className="mt-5">
            <ButtonLink to={`/workshops/${workshop.id}/boards/1`}>Show the first board</ButtonLink>
          </p>
          <Heading>Boards</Heading>
          <Timetable
            caption="Boards in the order they are shown"
            isCaptionHidden
            columns={[
              { key: "position", label: "board", foldPrefix: "Board" },
              { key: "shows", label: "shows" },
              { key: "group", label: "peer group" },
              { key: "question", label: "question", isProse: true },
            ]}
            rows={workshop.boards.map((board) => ({
              key: String(board.position),
              cells: {
                position: (
                  <TextLink to={`/workshops/${workshop.id}/boards/${board.position}`}>{board.position}</TextLink>
                ),
                shows: indicators[board.indicator].name,
                group: groupLabel(board.groupKey),
                question: board.question,
              },
            }))}
          />
        </>
      )}
      <Heading>{workshop.boards.length === 0 ? "Add the first board" : "Add a board"}</Heading>
      <KeptForm
        key={clientRef}
        formKey="board"
        ownerId={userId}
        method="post"
        {...getFormProps(form)}
        className="grid gap-5"
      >
        <input type="hidden" name="clientRef" value={clientRef} />
        <SelectField
          {...fieldWords(fields.shows)}
          label="What it shows"
          isWide
          hint="Groups that must stay hidden on a wall are left out."
          choices={workshop.choices
            .filter(({ isShown }) => isShown)
            .map((choice) => ({
              value: `${choice.indicator}|${choice.groupKey}`,
              label: `${indicators[choice.indicator].name}: ${choice.groupLabel}`,
            }))}
        />
        <TextField
          {...fieldWords(fields.question)}
          label="Question to discuss"
          isWide
          maxLength={200}
          hint="Stands under the strip, large. One question a board."
        />
        <div>
          <Button variant={workshop.boards.length === 0 ? "primary" : "quiet"}>Add the board</Button>
        </div>
      </KeptForm>
    </Page>
  );
}
