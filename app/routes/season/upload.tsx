import { data, Form, redirect } from "react-router";
import { groupKind, groupProblems, ProblemList } from "#app/components/season/problem-groups.tsx";
import { UploadHolds } from "#app/components/season/upload-holds.tsx";
import { Answer, Heading, Method } from "#app/components/layout/answer.tsx";
import { Page } from "#app/components/layout/page.tsx";
import { Button, ButtonLink } from "#app/components/ui/button.tsx";
import { Dock } from "#app/components/ui/dock.tsx";
import { Kinds } from "#app/components/ui/kinds.tsx";
import { Notice } from "#app/components/ui/notice.tsx";
import { SideBySide } from "#app/components/ui/side-by-side.tsx";
import { TextLink } from "#app/components/ui/text-link.tsx";
import { townActor } from "#app/context.ts";
import { formatInstant } from "#app/lib/format.ts";
import { idParam } from "#app/lib/params.ts";
import { countWords, sentenceStart } from "#app/lib/words.ts";
import { acceptUpload } from "#app/services/uploads/accept.server.ts";
import { getUpload } from "#app/services/uploads/read.server.ts";
import type { Route } from "./+types/upload";

export async function loader({ context, params }: Route.LoaderArgs) {
  return { upload: await getUpload(townActor(context), idParam(params.uploadId, "upload")) };
}

const refusals = {
  "errors-stand": "Errors stand in this file. Correct them in your spreadsheet and upload it again.",
  "accepted-before": "This file has been accepted already; it counts once.",
} as const;

export async function action({ context, params }: Route.ActionArgs) {
  const uploadId = idParam(params.uploadId, "upload");
  const outcome = await acceptUpload(townActor(context), uploadId);
  if (outcome.ok) return redirect(`/uploads/${uploadId}`);
  return data({ refusal: refusals[outcome.reason] }, { status: 409 });
}

export const meta: Route.MetaFunction = () => [{ title: "Check an upload · Commonweigh" }];

type Upload = Route.ComponentProps["loaderData"]["upload"];

function thingsOf({ kind, seasons, calibrations, trucks }: Upload) {
  if (kind === "season-figures") return countWords(seasons.length, "season", "seasons");
  if (kind === "calibrations") return countWords(calibrations.length, "calibration", "calibrations");
  return countWords(trucks.length, "truck", "trucks");
}

function answer(upload: Upload, errorCount: number, checkCount: number) {
  const things = thingsOf(upload);
  if (upload.state === "accepted")
    return `Accepted: ${things} ${upload.kind === "season-figures" ? "in your figures" : "in your fleet"}.`;
  if (upload.rowCount === 0) return "This file cannot be read.";
  if (errorCount > 0) {
    return `${sentenceStart(countWords(errorCount, "thing is", "things are"))} wrong in ${countWords(upload.rowCount, "row", "rows")}. Correct ${errorCount === 1 ? "it" : "them"} in your spreadsheet and upload it again.`;
  }
  const checks =
    checkCount === 0 ? "" : ` ${sentenceStart(countWords(checkCount, "thing", "things"))} to look at first.`;
  const rows = upload.rowCount === 1 ? "The row" : `All ${countWords(upload.rowCount, "row", "rows")}`;
  return `${rows} can be read: ${things}.${checks}`;
}

export default function UploadPage({ loaderData: { upload }, actionData }: Route.ComponentProps) {
  const errors = upload.problems.filter(({ severity }) => severity === "error");
  const checks = upload.problems.filter(({ severity }) => severity === "check");
  const groups = groupProblems(upload.problems);
  const isOpen = upload.state === "checked";
  const next =
    upload.kind === "season-figures"
      ? { to: "/season", words: "Open the season" }
      : { to: "/fleet", words: "Open the fleet" };
  return (
    <>
      <Page>
        <Answer>{answer(upload, errors.length, checks.length)}</Answer>
        <Method>
          <b className="text-asphalt">{upload.fileName}</b>, read {formatInstant(upload.createdAt)}.{" "}
          {isOpen
            ? "Nothing counts until you accept, and your file is not changed. You can leave and come back."
            : "The file is kept as it came."}
        </Method>
        {actionData && <Notice tone="problem" title={actionData.refusal} />}
        {!isOpen && (
          <p className="mt-5">
            <ButtonLink to={next.to}>{next.words}</ButtonLink>
          </p>
        )}
        {isOpen && groups.length > 0 && (
          <SideBySide
            side={
              <>
                <Kinds label="Problems by kind" kinds={groups.map(groupKind)} />
                <p className="mt-3 text-note">
                  <TextLink to={`/uploads/${upload.id}/problems`} isDocument>
                    Download the list (CSV)
                  </TextLink>
                </p>
              </>
            }
          >
            {groups.map((group) => (
              <ProblemList key={group.key} group={group} />
            ))}
          </SideBySide>
        )}
        {upload.seasons.length + upload.calibrations.length + upload.trucks.length > 0 && (
          <>
            <Heading>{errors.length > 0 ? "What could be read" : "What the file holds"}</Heading>
            <UploadHolds upload={upload} />
          </>
        )}
      </Page>
      {isOpen && (
        <Dock
          summaryId="dock-summary"
          summary={
            errors.length > 0 ? (
              <>
                <b>{sentenceStart(countWords(errors.length, "thing", "things"))} to correct.</b>{" "}
                <span className="max-sm:hidden">All rows go in together, or none do.</span>
              </>
            ) : (
              <>
                <b>{sentenceStart(countWords(upload.rowCount, "row", "rows"))} ready.</b>{" "}
                <span className="max-sm:hidden">
                  {upload.rowCount === 1 ? "It counts once you accept." : "All go in together, or none do."}
                </span>
              </>
            )
          }
        >
          <TextLink to={`/uploads?kind=${upload.kind}`} weight="bold">
            Upload another file
          </TextLink>
          <Form method="post">
            <Button notYet={errors.length > 0 && { reasonId: "dock-summary" }}>
              Accept {countWords(upload.rowCount, "row", "rows")}
            </Button>
          </Form>
        </Dock>
      )}
    </>
  );
}
