import { Form } from "react-router";
import { Answer, Heading, Method } from "#app/components/layout/answer.tsx";
import { Page } from "#app/components/layout/page.tsx";
import { Button } from "#app/components/ui/button.tsx";
import { Dock } from "#app/components/ui/dock.tsx";
import { Kinds } from "#app/components/ui/kinds.tsx";
import { Notice } from "#app/components/ui/notice.tsx";
import { SideBySide } from "#app/components/ui/side-by-side.tsx";
import { TextLink } from "#app/components/ui/text-link.tsx";
import { formatInstant } from "#app/lib/format.ts";
import { countWords, sentenceStart } from "#app/lib/words.ts";
import { kindLabel, ProblemGroup } from "./problem-groups.tsx";
import { type ProblemGroupView, type RepairProps, withSinglesTogether } from "./problem-view.ts";
import { ReadyRows, type ReadySample } from "./ready-rows.tsx";
import { checkedAnswer, type UploadSummary } from "./upload-words.ts";

export type CheckedUpload = {
  id: number;
  kind: string;
  fileName: string;
  createdAt: string;
  failure: string | null;
  counts: UploadSummary["counts"];
  canLeaveOut: boolean;
  hasColumns: boolean;
  groups: ProblemGroupView[];
  choices: RepairProps["choices"];
  settledNames: { sort: "truck" | "material" | "storm-kind"; name: string; meaning: string }[];
  sample: ReadySample | null;
  overlaps: { uploadId: number; fileName: string; rowCount: number }[];
};

type Props = { upload: CheckedUpload; shownKey: string | null; refusal: string | null; isKnown: boolean };

const acceptForm = "accept-form";

function KindList({ upload, shownKey }: { upload: CheckedUpload; shownKey: string | null }) {
  const { counts, settledNames } = upload;
  const groups = withSinglesTogether(upload.groups);
  const settledOf = (group: ProblemGroupView) => settledNames.filter(({ sort }) => sort === group.names?.sort).length;
  const kinds = groups.map((group, place) => {
    const settled = settledOf(group);
    return {
      key: group.key,
      count: group.rowCount,
      to: `#${group.key}`,
      label: kindLabel(group),
      isCurrent: shownKey === null ? place === 0 : group.key === shownKey,
      detail:
        settled > 0
          ? `${countWords(settled, "name", "names")} settled just now`
          : group.severity === "error"
            ? "has to be put right"
            : "may stand",
    };
  });
  const rest = [
    { key: "left-out", count: counts.leftOut, label: "left out", isDone: true },
    { key: "ready", count: counts.ok, label: "ready", to: "#ready", isDone: true },
  ].filter(({ key, count }) => key === "ready" || count > 0);
  return (
    <>
      <Kinds label="Problems by kind" kinds={[...kinds, ...rest]} />
      {groups.length > 0 && (
        <p className="mt-3 text-note">
          <TextLink to={`/uploads/${upload.id}/problems`} isDocument>
            Download these rows with the reasons (CSV)
          </TextLink>
        </p>
      )}
      {counts.leftOut > 0 && (
        <Form method="post" preventScrollReset className="mt-3">
          <Button variant="quiet" size="slim" name="intent" value="bring-back">
            Bring back what is left out
          </Button>
        </Form>
      )}
    </>
  );
}

function Overlaps({ overlaps }: { overlaps: CheckedUpload["overlaps"] }) {
  if (overlaps.length === 0) return null;
  const total = overlaps.reduce((sum, { rowCount }) => sum + rowCount, 0);
  const rows = countWords(total, "row", "rows");
  return (
    <fieldset className="mt-6 max-w-method border-t-4 border-line pt-3">
      <legend className="float-left text-head font-bold">
        {sentenceStart(rows)} of these days {total === 1 ? "is" : "are"} in already, from{" "}
        {overlaps.map(({ uploadId, fileName }, place) => (
          <span key={uploadId}>
            {place > 0 && ", "}
            <TextLink to={`/uploads/${uploadId}`}>{fileName}</TextLink>
          </span>
        ))}
        .
      </legend>
      <p className="clear-left text-gravel">
        What gives way stays in the history of its file. What was typed in by hand stays where it is.
      </p>
      {[
        { value: "1", label: `This file takes their place: ${rows} give${total === 1 ? "s" : ""} way` },
        { value: "0", label: "Keep them and add this file to them" },
      ].map(({ value, label }) => (
        <label key={value} className="mt-1 flex min-h-target items-center gap-3">
          <input
            type="radio"
            name="isReplacing"
            value={value}
            form={acceptForm}
            defaultChecked={value === "1"}
            className="size-5 accent-spruce"
          />
          {label}
        </label>
      ))}
    </fieldset>
  );
}

function Decision({ upload }: { upload: CheckedUpload }) {
  const { ok, check, error } = upload.counts;
  const ready = ok + check;
  const all = ready + error;
  const allWords = all === 1 ? "the row" : `all ${all.toLocaleString("en-US")}`;
  const leftWords = countWords(error, "row", "rows");
  return (
    <Dock
      summaryId="dock-summary"
      summary={
        error > 0 ? (
          <>
            <b>
              {ready.toLocaleString("en-US")} ready, {error.toLocaleString("en-US")} to go.
            </b>{" "}
            All rows go in together, or none do.
          </>
        ) : check > 0 ? (
          <>
            <b>
              {ok.toLocaleString("en-US")} ready, {check.toLocaleString("en-US")} to look at.
            </b>{" "}
            Accepting takes them as they stand.
          </>
        ) : (
          <>
            <b>{countWords(ready, "row", "rows")} ready.</b> All go in together, or none do.
          </>
        )
      }
    >
      <Form method="post">
        <button
          type="submit"
          name="intent"
          value="cancel"
          className="min-h-target cursor-pointer font-semibold text-spruce underline decoration-1 underline-offset-3 hover:decoration-2"
        >
          Take back this upload
        </button>
      </Form>
      <Form method="post" id={acceptForm} className="flex flex-wrap gap-x-3 gap-y-2">
        {error > 0 && ready > 0 && upload.canLeaveOut && (
          <Button variant="quiet" name="intent" value="accept-without">
            Leave {leftWords} out and accept {ready.toLocaleString("en-US")}
          </Button>
        )}
        <Button name="intent" value="accept" notYet={(error > 0 || ready === 0) && { reasonId: "dock-summary" }}>
          Accept {allWords}
        </Button>
      </Form>
    </Dock>
  );
}

/** A file whose rows have been looked at: what is ready, what is not, and the decision. */
export function CheckPage({ upload, shownKey, refusal, isKnown }: Props) {
  const { counts } = upload;
  const groups = withSinglesTogether(upload.groups);
  const hasProblems = groups.length > 0 || counts.leftOut > 0;
  const shared = {
    uploadId: upload.id,
    canFix: upload.hasColumns,
    choices: upload.choices,
    settledNames: upload.settledNames,
  };
  return (
    <>
      <Page>
        <Answer>{checkedAnswer(upload)}</Answer>
        <Method>
          <b className="text-asphalt">{upload.fileName}</b>, read {formatInstant(upload.createdAt)}.{" "}
          {isKnown && "You had sent this very file before, so it was looked at again. "}
          Nothing counts until you accept, and your file is not changed. You can leave and come back.
          {upload.hasColumns && (
            <>
              {" "}
              <TextLink to={`/uploads/${upload.id}/columns`}>How its columns were read</TextLink>
            </>
          )}
        </Method>
        {(refusal ?? upload.failure) !== null && (
          <Notice tone="problem" title={refusal ?? upload.failure ?? ""}>
            <Form method="post">
              <Button variant="quiet" size="slim" name="intent" value="again">
                Check the file again
              </Button>
            </Form>
          </Notice>
        )}
        <Overlaps overlaps={upload.overlaps} />
        {hasProblems && (
          <SideBySide side={<KindList upload={upload} shownKey={shownKey} />}>
            {groups.map((group) => (
              <ProblemGroup
                key={group.key}
                {...shared}
                group={group}
                canLeaveOut={upload.canLeaveOut}
                isShowingMany={group.key === shownKey}
              />
            ))}
            {groups.length === 0 && <p className="pt-2">Nothing else stands in the way.</p>}
          </SideBySide>
        )}
        {upload.sample !== null && (
          <section id="ready" aria-label="Rows that are ready">
            <Heading>{counts.error > 0 ? "What could be read" : "What the file holds"}</Heading>
            <ReadyRows sample={upload.sample} />
          </section>
        )}
      </Page>
      <Decision upload={upload} />
    </>
  );
}
