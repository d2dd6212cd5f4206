import { data, Form, redirect } from "react-router";
import { z } from "zod";
import { ErrorSummary } from "#app/components/forms/error-summary.tsx";
import { SelectField } from "#app/components/forms/select-field.tsx";
import { Answer, Heading, Method } from "#app/components/layout/answer.tsx";
import { Page } from "#app/components/layout/page.tsx";
import { ColumnTable } from "#app/components/season/column-table.tsx";
import { Button } from "#app/components/ui/button.tsx";
import { Dock } from "#app/components/ui/dock.tsx";
import { TextLink } from "#app/components/ui/text-link.tsx";
import { townActor } from "#app/context.ts";
import { densitySource } from "#app/domain/season/bulk-density.ts";
import { measureUnits } from "#app/domain/upload/measure.ts";
import { badRequest } from "#app/lib/errors.ts";
import { readForm } from "#app/lib/form.ts";
import { idParam } from "#app/lib/params.ts";
import { countWords, listWords, sentenceStart } from "#app/lib/words.ts";
import { getColumns } from "#app/services/uploads/columns.server.ts";
import { lookElsewhere, matchColumns } from "#app/services/uploads/decide.server.ts";
import type { Route } from "./+types/upload-columns";

const ColumnsForm = z.object({
  field: z.array(z.string().max(40)).max(200),
  unit: z.array(z.union([z.enum(measureUnits), z.literal("")])).max(200),
  decimalMark: z.enum(["point", "comma"]),
  dateOrder: z.enum(["month-first", "day-first"]),
});

const PlaceForm = z.object({
  sheetName: z.string().max(100).nullable(),
  headRow: z
    .string()
    .regex(/^\d{1,7}$/)
    .transform(Number)
    .nullable(),
});

export async function loader({ context, params }: Route.LoaderArgs) {
  const upload = await getColumns(townActor(context), idParam(params.uploadId, "upload"));
  if (!upload.isOpen) throw redirect(`/uploads/${upload.id}`);
  return { upload };
}

export async function action({ context, params, request }: Route.ActionArgs) {
  const actor = townActor(context);
  const uploadId = idParam(params.uploadId, "upload");
  const form = await readForm(request);
  if (form.get("intent") === "elsewhere") {
    const place = PlaceForm.safeParse({ sheetName: form.get("sheetName"), headRow: form.get("headRow") });
    if (!place.success) throw badRequest("This choice could not be read. Go back and choose again.");
    await lookElsewhere(actor, uploadId, place.data);
    return redirect(`/uploads/${uploadId}/columns`);
  }
  const parsed = ColumnsForm.safeParse({
    field: form.getAll("field"),
    unit: form.getAll("unit"),
    decimalMark: form.get("decimalMark"),
    dateOrder: form.get("dateOrder"),
  });
  if (!parsed.success) throw badRequest("This choice could not be read. Go back and choose again.");
  const { field, unit, decimalMark, dateOrder } = parsed.data;
  const columns = field.map((key, place) => ({ field: key === "" ? null : key, unit: unit[place] || null }));
  const outcome = await matchColumns(actor, uploadId, { columns, decimalMark, dateOrder });
  if (outcome.ok) return redirect(`/uploads/${uploadId}`);
  return data({ message: outcome.message, columns }, { status: 400 });
}

export const meta: Route.MetaFunction = () => [{ title: "Match the columns · Commonweigh" }];

type Upload = Route.ComponentProps["loaderData"]["upload"];

function answer({ columns, missing, decimalMark, dateOrder }: Upload) {
  const doubtful = columns.filter(({ isCertain, head }) => !isCertain && head !== "");
  if (missing.length > 0) return `Which column holds the ${listWords(missing)}?`;
  if (doubtful.length > 0) {
    const names = listWords(doubtful.slice(0, 3).map(({ head }) => `“${head}”`));
    const more = doubtful.length > 3 ? ` and ${countWords(doubtful.length - 3, "other", "others")}` : "";
    return `${sentenceStart(countWords(columns.length - doubtful.length, "column is", "columns are"))} clear. What is in ${names}${more}?`;
  }
  if (!dateOrder.isCertain) return "Every column is clear. Is the month or the day first in its dates?";
  if (!decimalMark.isCertain) return "Every column is clear. Does a comma or a point stand before its decimals?";
  return "This is how the columns were read.";
}

function Elsewhere({ upload }: { upload: Upload }) {
  if (upload.sheetNames.length < 2 && upload.headRows.length < 2) return null;
  return (
    <Form method="post" className="mt-5 flex flex-wrap items-end gap-x-4 gap-y-3">
      {upload.sheetNames.length > 1 && (
        <SelectField
          name="sheetName"
          label="Sheet"
          choices={upload.sheetNames.map((name) => ({ value: name, label: name }))}
          defaultValue={upload.sheetName ?? ""}
        />
      )}
      <SelectField
        name="headRow"
        label="The heads stand in row"
        choices={upload.headRows.map((row) => ({ value: String(row), label: String(row) }))}
        defaultValue={String(upload.headRow)}
      />
      <Button variant="quiet" name="intent" value="elsewhere">
        Look there
      </Button>
    </Form>
  );
}

export default function UploadColumns({ loaderData: { upload }, actionData }: Route.ComponentProps) {
  return (
    <>
      <Page>
        <Answer>{answer(upload)}</Answer>
        <Method>
          <b className="text-asphalt">{upload.fileName}</b>, taken for: {upload.kindLabel.toLowerCase()}. What you
          choose is remembered for your next file with these heads.
        </Method>
        {actionData && (
          <ErrorSummary key={actionData.message} errors={[{ fieldId: "field-0", message: actionData.message }]} />
        )}
        <Elsewhere upload={upload} />
        <Form method="post" id="columns-form">
          <Heading>Columns</Heading>
          <ColumnTable
            columns={upload.columns}
            fields={upload.fields}
            samples={upload.samples}
            chosen={actionData?.columns}
          />
          {upload.hasCubicYards && (
            <p className="mt-2 max-w-method text-note text-gravel">Cubic yards are weighed by: {densitySource}.</p>
          )}
          <Heading>How it is written</Heading>
          <div className="grid gap-5 sm:grid-cols-2">
            <SelectField
              name="dateOrder"
              label="Days written in digits"
              choices={[
                { value: "month-first", label: "month first: 1/5/2026 is 5 January" },
                { value: "day-first", label: "day first: 1/5/2026 is 1 May" },
              ]}
              defaultValue={upload.dateOrder.value}
              hint={upload.dateOrder.isCertain ? undefined : "The file does not show which it is."}
            />
            <SelectField
              name="decimalMark"
              label="Figures"
              choices={[
                { value: "point", label: "a point before decimals: 1,204.5" },
                { value: "comma", label: "a comma before decimals: 1.204,5" },
              ]}
              defaultValue={upload.decimalMark.value}
              hint={upload.decimalMark.isCertain ? undefined : "The file does not show which it is."}
            />
          </div>
        </Form>
        <Form method="post" action={`/uploads/${upload.id}`} className="mt-6">
          <input type="hidden" name="intent" value="cancel" />
          <Button variant="quiet" size="slim">
            Take back this upload
          </Button>
        </Form>
        <p className="mt-4">
          <TextLink to="/uploads">All uploads</TextLink>
        </p>
      </Page>
      <Dock
        label="What is next"
        summary={
          <>
            <b>Every row is checked next.</b> Nothing counts until you accept.
          </>
        }
      >
        <Button form="columns-form">Check the rows</Button>
      </Dock>
    </>
  );
}
