import { useEffect } from "react";
import { Form, useRevalidator } from "react-router";
import { Answer, Method } from "#app/components/layout/answer.tsx";
import { Page } from "#app/components/layout/page.tsx";
import { Button } from "#app/components/ui/button.tsx";
import { TextLink } from "#app/components/ui/text-link.tsx";
import { progressAnswer, type UploadSummary } from "./upload-words.ts";

const pauseMs = 1000;

type Props = { upload: { id: number; fileName: string; state: string; counts: UploadSummary["counts"] } };

/** A road that is cleared as the rows are read. */
function Road({ read, total }: { read: number; total: number | null }) {
  const share = total === null || total === 0 ? null : Math.min(1, read / total);
  return (
    <div
      role="progressbar"
      aria-label="Rows read"
      aria-valuemin={0}
      {...(share === null ? {} : { "aria-valuenow": read, "aria-valuemax": Math.max(read, total ?? 0) })}
      className="mt-6"
    >
      <svg viewBox="0 0 1000 40" preserveAspectRatio="none" aria-hidden="true" className="block h-10 w-full">
        <rect width="1000" height="40" className="fill-frost" />
        <rect width={Math.round((share ?? 0) * 1000)} height="40" className="fill-lane" />
        <path
          d={`M0 20h${Math.round((share ?? 0) * 1000)}`}
          className="stroke-lane-paint"
          strokeWidth="2.5"
          strokeDasharray="18 14"
        />
        <path d="M0 1.5h1000M0 38.5h1000" className="stroke-line" strokeWidth="1.5" />
      </svg>
    </div>
  );
}

/** While a file is read, checked or taken in: the count, and a way to stop. One may leave; the work goes on. */
export function UploadProgress({ upload }: Props) {
  const { revalidate, state } = useRevalidator();
  useEffect(() => {
    if (state !== "idle") return;
    const timer = setTimeout(() => void revalidate(), pauseMs);
    return () => clearTimeout(timer);
  }, [revalidate, state, upload]);
  const { counts } = upload;
  const isAccepting = upload.state === "accepting";
  const ready = counts.ok + counts.check;
  return (
    <Page>
      <div role="status" aria-live="polite" aria-atomic="true">
        <Answer>{progressAnswer(upload.state, counts, ready)}</Answer>
      </div>
      <Method>
        <b className="text-asphalt">{upload.fileName}</b>.{" "}
        {isAccepting
          ? "You can leave this page: it is finished without you."
          : "You can leave this page and come back: the work goes on, also after the program was stopped and started."}
      </Method>
      {!isAccepting && <Road read={counts.read} total={counts.total} />}
      {!isAccepting && counts.read > 0 && (
        <p className="mt-3 text-gravel">
          So far {counts.ok.toLocaleString("en-US")} ready, {counts.check.toLocaleString("en-US")} to look at,{" "}
          {counts.error.toLocaleString("en-US")} to put right.
        </p>
      )}
      <div className="mt-6 flex flex-wrap items-center gap-x-5 gap-y-2">
        {!isAccepting && (
          <Form method="post">
            <Button variant="quiet" name="intent" value="cancel">
              Stop and take it back
            </Button>
          </Form>
        )}
        <TextLink to={`/uploads/${upload.id}`} weight="bold" isDocument>
          Look again
        </TextLink>
        <TextLink to="/uploads">All uploads</TextLink>
      </div>
    </Page>
  );
}
