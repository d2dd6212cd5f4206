import { randomUUID } from "node:crypto";
import { getFormProps, useForm } from "@conform-to/react";
import { parseWithZod } from "@conform-to/zod/v4";
import { data, redirect, useNavigation } from "react-router";
import { z } from "zod";
import { partWords } from "#app/components/fleet/fleet-words.ts";
import { WorkTable } from "#app/components/fleet/work-table.tsx";
import { TextField } from "#app/components/forms/field.tsx";
import { fieldWords } from "#app/components/forms/field-words.ts";
import { KeptForm } from "#app/components/forms/kept-form.tsx";
import { SelectField } from "#app/components/forms/select-field.tsx";
import { TextArea } from "#app/components/forms/text-area.tsx";
import { Answer, Heading, Method } from "#app/components/layout/answer.tsx";
import { Page } from "#app/components/layout/page.tsx";
import { Button } from "#app/components/ui/button.tsx";
import { TextLink } from "#app/components/ui/text-link.tsx";
import { townActor } from "#app/context.ts";
import { isLocalDate } from "#app/domain/dates.ts";
import { readForm } from "#app/lib/form.ts";
import { idParam } from "#app/lib/params.ts";
import { getTruck, todaysDate } from "#app/services/fleet/read.server.ts";
import { enterWork } from "#app/services/fleet/work.server.ts";
import type { Route } from "./+types/work";

const parts = ["gate", "hydraulics", "feed", "controller"] as const;

const WorkForm = z.object({
  clientRef: z.uuid(),
  part: z.enum(parts, "Choose what was worked on."),
  doneOn: z
    .string({ error: "Give the day." })
    .refine(isLocalDate, "Write the day as year-month-day, as in 2026-10-09.")
    .refine((day) => !isLocalDate(day) || day >= "2000-01-01", "This day is too long ago."),
  note: z
    .string()
    .trim()
    .max(300, "At most 300 characters.")
    .optional()
    .transform((text) => text ?? ""),
});

export async function loader({ context, params }: Route.LoaderArgs) {
  const actor = townActor(context);
  const { unitNumber, work } = await getTruck(actor, idParam(params.truckId, "truck"));
  return { unitNumber, work, userId: actor.userId, clientRef: randomUUID(), today: todaysDate() };
}

export async function action({ context, params, request }: Route.ActionArgs) {
  const submission = parseWithZod(await readForm(request), { schema: WorkForm });
  if (submission.status !== "success") return data(submission.reply(), { status: 400 });
  if (submission.value.doneOn > todaysDate()) {
    return data(submission.reply({ fieldErrors: { doneOn: ["This day has not come yet."] } }), { status: 400 });
  }
  const truckId = idParam(params.truckId, "truck");
  await enterWork(townActor(context), truckId, submission.value);
  return redirect(`/fleet/${truckId}`);
}

export const meta: Route.MetaFunction = ({ loaderData }) => [
  { title: `Work on truck ${loaderData?.unitNumber ?? ""} · Commonweigh` },
];

export default function Work({ loaderData, actionData, params }: Route.ComponentProps) {
  const { unitNumber, work, userId, clientRef, today } = loaderData;
  const isSending = useNavigation().formMethod === "POST";
  const [form, fields] = useForm({
    lastResult: actionData,
    defaultValue: { doneOn: today },
    onValidate: ({ formData }) => parseWithZod(formData, { schema: WorkForm }),
    shouldRevalidate: "onBlur",
  });
  return (
    <Page>
      <Answer>What was worked on in truck {unitNumber}?</Answer>
      <Method>
        After work on gate, hydraulics, feed or controller the truck lays something else than before. Entered here,
        every calibration up to that day is due again at once.
      </Method>
      <KeptForm
        formKey="work"
        ownerId={userId}
        method="post"
        {...getFormProps(form)}
        noValidate
        className="mt-6 grid gap-5"
      >
        <input type="hidden" name="clientRef" value={clientRef} />
        <SelectField
          {...fieldWords(fields.part)}
          label="Worked on"
          prompt="choose what"
          choices={parts.map((value) => ({ value, label: partWords[value] }))}
        />
        <TextField {...fieldWords(fields.doneOn)} type="date" max={today} label="On" />
        <TextArea {...fieldWords(fields.note)} label="What was done" hint="As in: new motor on the auger." isOptional />
        <div className="flex flex-wrap items-center gap-x-5 gap-y-3">
          <Button busy={isSending && "Writing it down"}>Enter the work</Button>
          <TextLink to={`/fleet/${params.truckId}`}>Back to truck {unitNumber}</TextLink>
        </div>
      </KeptForm>
      {work.length > 0 && (
        <>
          <Heading>Work so far</Heading>
          <WorkTable work={work} />
        </>
      )}
    </Page>
  );
}
