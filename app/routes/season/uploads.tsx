import {
  FormDataParseError,
  MaxFileSizeExceededError,
  MaxHeaderSizeExceededError,
  MaxPartsExceededError,
  parseFormData,
} from "@remix-run/form-data-parser";
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
import { countWords, sentenceStart } from "#app/lib/words.ts";
import { isUploadKind, uploadKinds } from "#app/services/uploads/kinds.server.ts";
import { listUploads } from "#app/services/uploads/read.server.ts";
import { receiveUpload } from "#app/services/uploads/receive.server.ts";
import type { Route } from "./+types/uploads";

const largestFile = 5 * 1024 * 1024;

export async function loader({ context, url }: Route.LoaderArgs) {
  const actor = townActor(context);
  const kind = url.searchParams.get("kind");
  return {
    userId: actor.userId,
    kind: isUploadKind(kind) ? kind : "season-figures",
    kinds: Object.entries(uploadKinds).map(([value, { label }]) => ({ value, label })),
    uploads: await listUploads(actor),
  };
}

async function readForm(request: Request) {
  try {
    const form = await parseFormData(request, { maxFiles: 1, maxFileSize: largestFile });
    const file = form.get("file");
    const kind = form.get("kind");
    if (!isUploadKind(kind)) return { ok: false, status: 400, message: "Choose what the file holds." } as const;
    if (!(file instanceof File) || file.name === "")
      return { ok: false, status: 400, message: "Choose a file first." } as const;
    return { ok: true, kind, file } as const;
  } catch (error) {
    if (error instanceof MaxFileSizeExceededError) {
      return {
        ok: false,
        status: 413,
        message: "This file is over 5 MB. Split it, or leave out what is not needed.",
      } as const;
    }
    if (
      error instanceof FormDataParseError ||
      error instanceof MaxHeaderSizeExceededError ||
      error instanceof MaxPartsExceededError
    ) {
      return {
        ok: false,
        status: 400,
        message: "The file did not arrive whole. Choose it again and send it once more.",
      } as const;
    }
    throw error;
  }
}

export async function action({ context, request }: Route.ActionArgs) {
  const form = await readForm(request);
  if (!form.ok) return data({ message: form.message }, { status: form.status });
  const content = new Uint8Array(await form.file.arrayBuffer());
  const uploadId = await receiveUpload(townActor(context), { kind: form.kind, fileName: form.file.name, content });
  return redirect(`/uploads/${uploadId}`);
}

export const meta: Route.MetaFunction = () => [{ title: "Uploads · Commonweigh" }];

type Upload = Route.ComponentProps["loaderData"]["uploads"][number];

/** A file that a later, accepted one of its kind has made good no longer waits for anybody. */
function isWaiting(upload: Upload, uploads: readonly Upload[]) {
  const isMadeGood = uploads.some(
    (other) => other.kind === upload.kind && other.state === "accepted" && other.id > upload.id,
  );
  return upload.state === "checked" && !isMadeGood;
}

const stateWords = (state: "checked" | "accepted", errorCount: number) => {
  if (state === "accepted") return "accepted";
  return errorCount === 0 ? "ready to accept" : countWords(errorCount, "error", "errors");
};

export default function Uploads({ loaderData, actionData }: Route.ComponentProps) {
  const { kind, kinds, uploads, userId } = loaderData;
  const isSending = useNavigation().formMethod === "POST";
  const open = uploads.filter((upload) => isWaiting(upload, uploads)).length;
  return (
    <Page>
      <Answer>
        {open === 0
          ? "Upload a file: every row is checked, and nothing counts until you accept it."
          : `${sentenceStart(countWords(open, "file waits", "files wait"))} for you to put right or accept.`}
      </Answer>
      <Method>A CSV file of at most 5 MB, as any spreadsheet saves it. The file is kept as it came.</Method>
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
          accept=".csv,text/csv"
          required
          error={actionData?.message}
          hint={
            <>
              Templates:{" "}
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
          <Button busy={isSending && "Checking every row"}>Check the file</Button>
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
              { key: "kind", label: "holds", isWideOnly: true },
              { key: "rows", label: "rows", isNumeric: true, isWideOnly: true },
              { key: "state", label: "state" },
              { key: "when", label: "received" },
            ]}
            rows={uploads.map((upload) => ({
              key: String(upload.id),
              cells: {
                file: <TextLink to={`/uploads/${upload.id}`}>{upload.fileName}</TextLink>,
                kind: kinds.find(({ value }) => value === upload.kind)?.label.toLowerCase() ?? "",
                rows: upload.rowCount.toLocaleString("en-US"),
                state: stateWords(upload.state, upload.errorCount),
                when: formatInstant(upload.createdAt),
              },
            }))}
          />
        </>
      )}
    </Page>
  );
}
