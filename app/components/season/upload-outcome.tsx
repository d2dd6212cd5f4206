import { Form } from "react-router";
import { Answer, Method } from "#app/components/layout/answer.tsx";
import { Page } from "#app/components/layout/page.tsx";
import { Button, ButtonLink } from "#app/components/ui/button.tsx";
import { Notice } from "#app/components/ui/notice.tsx";
import { TextLink } from "#app/components/ui/text-link.tsx";
import { formatDay, formatInstant } from "#app/lib/format.ts";
import { countWords, sentenceStart } from "#app/lib/words.ts";
import { sizeWords } from "./upload-words.ts";

type Overlap = { uploadId: number; fileName: string; rowCount: number };
type Props = {
  upload: {
    id: number;
    kind: string;
    fileName: string;
    byteCount: number;
    createdAt: string;
    settledAt: string | null;
    state: string;
    failure: string | null;
    things: { one: string; many: string };
    home: { to: string; words: string };
    accepted: { rowCount: number; firstDay: string | null; lastDay: string | null } | null;
    counts: { error: number; leftOut: number };
    hasColumns: boolean;
    replaced: Overlap[];
    replacedBy: Overlap[];
  };
  isKnown: boolean;
};

function Replacements({ overlaps, words }: { overlaps: readonly Overlap[]; words: (rows: string) => string }) {
  return overlaps.map(({ uploadId, fileName, rowCount }) => (
    <p key={uploadId} className="mt-2 max-w-method">
      {words(countWords(rowCount, "row", "rows"))} <TextLink to={`/uploads/${uploadId}`}>{fileName}</TextLink>.
    </p>
  ));
}

function Kept({ upload }: Props) {
  return (
    <p className="mt-6 text-gravel">
      The file is kept as it came ({sizeWords(upload.byteCount)}):{" "}
      <TextLink to={`/uploads/${upload.id}/file`} isDocument>
        download it
      </TextLink>
      . <TextLink to="/uploads">All uploads</TextLink>
    </p>
  );
}

function Accepted({ upload, isKnown }: Props) {
  const { accepted, things, home, counts } = upload;
  const span =
    accepted?.firstDay && accepted.lastDay
      ? `, ${accepted.firstDay === accepted.lastDay ? formatDay(accepted.firstDay) : `${formatDay(accepted.firstDay)} to ${formatDay(accepted.lastDay)}`}`
      : "";
  const left = counts.error + counts.leftOut;
  return (
    <Page>
      {isKnown && (
        <Notice title="This very file is in already.">It counts once; nothing was changed by sending it again.</Notice>
      )}
      <Answer>
        Accepted: {countWords(accepted?.rowCount ?? 0, things.one, things.many)}
        {span}.
      </Answer>
      <Method>
        <b className="text-asphalt">{upload.fileName}</b>, accepted{" "}
        {upload.settledAt === null ? "" : formatInstant(upload.settledAt)}.
        {left > 0 && (
          <>
            {" "}
            {sentenceStart(countWords(left, "row was", "rows were"))} left out on purpose:{" "}
            <TextLink to={`/uploads/${upload.id}/problems`} isDocument>
              download {left === 1 ? "it" : "them"}
            </TextLink>
            .
          </>
        )}
      </Method>
      <Replacements
        overlaps={upload.replaced}
        words={(rows) => `It took the place of ${rows} of the same days, from`}
      />
      <Replacements
        overlaps={upload.replacedBy}
        words={(rows) => `${sentenceStart(rows)} of it have since given way to a newer file,`}
      />
      <p className="mt-5">
        <ButtonLink to={home.to}>{home.words}</ButtonLink>
      </p>
      <Kept upload={upload} isKnown={isKnown} />
    </Page>
  );
}

/** Where an upload ended: taken in, taken back, or not readable. */
export function UploadOutcome(props: Props) {
  const { upload } = props;
  if (upload.state === "accepted") return <Accepted {...props} />;
  const isFailed = upload.state === "failed";
  return (
    <Page>
      <Answer>
        {isFailed ? "This file cannot be read." : "This upload was taken back. Nothing of it was taken in."}
      </Answer>
      <Method>
        <b className="text-asphalt">{upload.fileName}</b>, received {formatInstant(upload.createdAt)}.
      </Method>
      {upload.failure !== null && (
        <Notice tone="problem" title={upload.failure}>
          Nothing was taken in, and your figures are as they were.
        </Notice>
      )}
      <div className="mt-5 flex flex-wrap items-center gap-x-5 gap-y-2">
        <ButtonLink to={`/uploads?kind=${upload.kind}`}>Upload another file</ButtonLink>
        {isFailed && upload.hasColumns && (
          <TextLink to={`/uploads/${upload.id}/columns`} weight="bold">
            Look at its columns
          </TextLink>
        )}
        {isFailed && (
          <Form method="post">
            <Button variant="quiet" name="intent" value="again">
              Read it again
            </Button>
          </Form>
        )}
      </div>
      <Kept {...props} />
    </Page>
  );
}
