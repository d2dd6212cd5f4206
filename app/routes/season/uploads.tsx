import { data, redirect, useNavigation } from "react-router";
import { FileField } from "#app/components/forms/field.tsx";
import { ErrorSummary } from "#app/components/forms/error-summary.tsx";
import { KeptForm } from "#app/components/forms/kept-form.tsx";
import { SelectField } from "#app/components/forms/select-field.tsx";
import { Answer, Heading, Method } from "#app/components/layout/answer.tsx";
import { Page } from "#app/components/layout/page.tsx";
import { Button } from "#app/components/ui/button.tsx";
import { TextLink } from "#app/components/ui/text-link.tsx";
import { Timetable } from "#app/components/ui/timetable.tsx";
import { townActor } from "#app/context.ts";
import { formatInstant } from "#app/lib/format.ts";
import { receiveForm } from "#app/lib/multipart.server.ts";
import { temporaryFile } from "#app/lib/temporary-file.server.ts";
import { countWords } from "#app/lib/words.ts";
import { isUploadKind, uploadKinds } from "#app/services/uploads/kinds.server.ts";
import { listUploads } from "#app/services/uploads/read.server.ts";
import { receiveUpload } from "#app/services/uploads/receive.server.ts";
import type { Route } from "./+types/uploads";

const largestFileBytes = 50 * 1024 * 1024;

export async function loader({ context, url }: Route.LoaderArgs) {
  const actor = townActor(context);
  const kind = url.searchParams.get("kind");
  return {
    userId: actor.userId,
    kind: isUploadKind(kind) ? kind : "storms",
    kinds: Object.entries(uploadKinds).map(([value, { label }]) => ({ value, label })),
    uploads: await listUploads(actor),
  };
}

const refusals = {
  "too-large": { status: 413, message: "This file is over 50 MB. Split it by season and upload the parts." },
  "not-whole": { status: 400, message: "The file did not arrive whole. Choose it again and send it once more." },
  "not-a-form": { status: 400, message: "This was not sent as a file. Choose it in the form below." },
  "disk-full": { status: 507, message: "There is no room for this file just now. Nothing was kept; try again later." },
} as const;

function refuse(status: number, message: string) {
  return data({ message }, { status, ...(status === 413 ? { statusText: "Content Too Large" } : {}) });
}

export async function action({ context, request }: Route.ActionArgs) {
  const actor = townActor(context);
  const place = await temporaryFile();
  try {
    const form = await receiveForm(request, place.path, largestFileBytes);
    if (!form.ok) return refuse(refusals[form.reason].status, refusals[form.reason].message);
    const kind = form.fields.get("kind");
    if (!isUploadKind(kind)) return refuse(400, "Choose what the file holds.");
    if (!form.file) return refuse(400, "Choose a file first.");
    if (form.file.byteCount === 0) {
      return refuse(400, `“${form.file.fileName}” is empty. Choose the file again, or save it once more.`);
    }
    const { uploadId, isKnown } = await receiveUpload(actor, kind, form.file, place.path);
    return redirect(`/uploads/${uploadId}${isKnown ? "?known" : ""}`);
  } finally {
    await place.remove();
  }
}

export const meta: Route.MetaFunction = () => [{ title: "Uploads · Commonweigh" }];

type Line = Route.ComponentProps["loaderData"]["uploads"][number];

function stateWords({ state, errorCount, isReplaced }: Line) {
  switch (state) {
    case "received":
    case "checking":
      return "being read";
    case "matching":
      return "columns to match";
    case "checked":
      return errorCount === 0 ? "ready to accept" : `${countWords(errorCount, "row", "rows")} to put right`;
    case "accepting":
      return "being taken in";
    case "accepted":
      return isReplaced ? "accepted, since given way" : "accepted";
    case "cancelled":
      return "taken back";
    case "failed":
      return "cannot be read";
  }
}

function answer(uploads: readonly Line[]) {
  const open = uploads.filter(({ state }) => state === "checked" || state === "matching").length;
  if (open > 0) return `${open === 1 ? "One file waits" : `${open} files wait`} for you to put right or accept.`;
  return "Upload a file: every row is checked, and nothing counts until you accept it.";
}

export default function Uploads({ loaderData, actionData }: Route.ComponentProps) {
  const { kind, kinds, uploads, userId } = loaderData;
  const isSending = useNavigation().formMethod === "POST";
  return (
    <Page>
      <Answer>{answer(uploads)}</Answer>
      <Method>
        A CSV file or an .xlsx workbook of at most 50 MB and 250,000 rows, with the columns it happens to have. The file
        is kept as it came.
      </Method>
      {actionData && (
        <ErrorSummary key={actionData.message} errors={[{ fieldId: "file", message: actionData.message }]} />
      )}
      <KeptForm
        formKey="upload"
        ownerId={userId}
        method="post"
        encType="multipart/form-data"
        className="mt-6 grid gap-5"
      >
        <SelectField key={kind} name="kind" label="What it holds" choices={kinds} defaultValue={kind} />
        <FileField
          name="file"
          label="The file"
          accept=".csv,.xlsx,text/csv,application/vnd.openxmlformats-officedocument.spreadsheetml.sheet"
          required
          error={actionData?.message}
          hint={
            <>
              Nothing to fill in yet? Templates:{" "}
              {kinds.map(({ value, label }, position) => (
                <span key={value}>
                  {position > 0 && ", "}
                  <TextLink to={`/uploads/templates/${value}`} isDocument>
                    {label.toLowerCase()}
                  </TextLink>
                </span>
              ))}
              . Units stand in the heads.
            </>
          }
        />
        <div>
          <Button busy={isSending && "Sending the file"}>Check the file</Button>
        </div>
      </KeptForm>
      {uploads.length > 0 && (
        <>
          <Heading>Files so far</Heading>
          <Timetable
            caption="Newest first"
            isCaptionHidden
            columns={[
              { key: "file", label: "file" },
              { key: "kind", label: "holds" },
              { key: "rows", label: "rows", isNumeric: true },
              { key: "state", label: "state" },
              { key: "when", label: "received" },
            ]}
            rows={uploads.map((upload) => ({
              key: String(upload.id),
              cells: {
                file: (
                  <TextLink to={`/uploads/${upload.id}`} className="[overflow-wrap:anywhere]">
                    {upload.fileName}
                  </TextLink>
                ),
                kind: upload.kindLabel.toLowerCase(),
                rows: upload.rowCount.toLocaleString("en-US"),
                state: stateWords(upload),
                when: formatInstant(upload.createdAt),
              },
            }))}
          />
        </>
      )}
    </Page>
  );
}
