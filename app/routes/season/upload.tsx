import { data, Form, redirect } from "react-router";
import { groupKind, groupProblems, ProblemList } from "#app/components/season/problem-groups.tsx";
import { SeasonTable } from "#app/components/season/season-table.tsx";
import { Answer, Heading, Method } from "#app/components/layout/answer.tsx";
import { Page } from "#app/components/layout/page.tsx";
import { Button, ButtonLink } from "#app/components/ui/button.tsx";
import { Dock } from "#app/components/ui/dock.tsx";
import { Kinds } from "#app/components/ui/kinds.tsx";
import { Notice } from "#app/components/ui/notice.tsx";
import { SideBySide } from "#app/components/ui/side-by-side.tsx";
import { TextLink } from "#app/components/ui/text-link.tsx";
import { Timetable } from "#app/components/ui/timetable.tsx";
import { townActor } from "#app/context.ts";
import { catchVariationPercent } from "#app/domain/calibration/catch-weight.ts";
import { seasonTotals } from "#app/domain/season/season-totals.ts";
import { formatInches, formatInstant, formatOneDecimal, formatShortDay } from "#app/lib/format.ts";
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

function answer(upload: Upload, errorCount: number, checkCount: number) {
  const things =
    upload.kind === "season-figures"
      ? countWords(upload.seasons.length, "season", "seasons")
      : countWords(upload.calibrations.length, "calibration", "calibrations");
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

function Holds({ upload }: { upload: Upload }) {
  if (upload.seasons.length > 0) {
    return (
      <SeasonTable
        caption="As read from the file, and worked out from it"
        seasons={upload.seasons.map(({ seasonStartYear, amounts }) => ({
          seasonStartYear,
          amounts,
          totals: seasonTotals(amounts),
        }))}
      />
    );
  }
  if (upload.calibrations.length === 0) return null;
  return (
    <Timetable
      caption="Calibrations as read from the file"
      columns={[
        { key: "truck", label: "truck", foldPrefix: "Truck" },
        { key: "material", label: "material" },
        { key: "day", label: "weighed" },
        { key: "gate", label: "gate", unit: "in", isNumeric: true },
        { key: "counts", label: "settings counted", isNumeric: true },
        { key: "catches", label: "catches", isNumeric: true },
        { key: "spread", label: "catches differ by", unit: "%", isNumeric: true },
      ]}
      rows={upload.calibrations.map((calibration) => ({
        key: String(calibration.row),
        cells: {
          truck: calibration.unitNumber,
          material: calibration.materialName,
          day: formatShortDay(calibration.testedOn),
          gate: formatInches(calibration.gateOpeningIn),
          counts: calibration.counts.length,
          catches: calibration.catches.length,
          spread: calibration.catches.length === 0 ? "–" : formatOneDecimal(catchVariationPercent(calibration.catches)),
        },
      }))}
    />
  );
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
        {(upload.seasons.length > 0 || upload.calibrations.length > 0) && (
          <>
            <Heading>{errors.length > 0 ? "What could be read" : "What the file holds"}</Heading>
            <Holds upload={upload} />
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
