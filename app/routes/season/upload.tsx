import { data, redirect } from "react-router";
import { CheckPage } from "#app/components/season/check-page.tsx";
import { UploadOutcome } from "#app/components/season/upload-outcome.tsx";
import { UploadProgress } from "#app/components/season/upload-progress.tsx";
import { townActor } from "#app/context.ts";
import { badRequest } from "#app/lib/errors.ts";
import { readForm } from "#app/lib/form.ts";
import { idParam } from "#app/lib/params.ts";
import { answerUpload } from "#app/services/uploads/answers.server.ts";
import { acceptUpload, cancelUpload, startAgain } from "#app/services/uploads/decide.server.ts";
import { readAnswer } from "#app/services/uploads/answer-form.server.ts";
import { getUpload } from "#app/services/uploads/read.server.ts";
import type { Route } from "./+types/upload";

export async function loader({ context, params, url }: Route.LoaderArgs) {
  const shownKey = url.searchParams.get("show");
  const upload = await getUpload(townActor(context), idParam(params.uploadId, "upload"), shownKey);
  if (upload.state === "matching") throw redirect(`/uploads/${upload.id}/columns`);
  return { upload, shownKey, isKnown: url.searchParams.has("known") };
}

const refusals = {
  "errors-stand": "Errors stand in this file. Put them right here or in your spreadsheet, or leave those rows out.",
  "accepted-before": "This file has been accepted already; it counts once.",
  "nothing-ready": "No row of this file is ready, so there is nothing to take in.",
  "not-checked": "This file is still being read. Its rows can be accepted once all of them have been checked.",
} as const;

export async function action({ context, params, request }: Route.ActionArgs) {
  const actor = townActor(context);
  const uploadId = idParam(params.uploadId, "upload");
  const form = await readForm(request);
  const intent = form.get("intent");
  const here = `/uploads/${uploadId}`;
  switch (intent) {
    case "cancel":
      await cancelUpload(actor, uploadId);
      return redirect(here);
    case "again":
      await startAgain(actor, uploadId);
      return redirect(here);
    case null:
    case "accept":
    case "accept-without": {
      const choice = { leaveOut: intent === "accept-without", isReplacing: form.get("isReplacing") !== "0" };
      const outcome = await acceptUpload(actor, uploadId, choice);
      if (outcome.ok) return redirect(here);
      const refusal = outcome.reason === "not-now" ? outcome.message : refusals[outcome.reason];
      return data({ refusal }, { status: 409 });
    }
    default: {
      const answer = readAnswer(form);
      if (!answer) throw badRequest("This answer could not be read, so nothing was changed. Go back and try again.");
      await answerUpload(actor, uploadId, answer);
      return redirect(here);
    }
  }
}

export const meta: Route.MetaFunction = () => [{ title: "Check an upload · Commonweigh" }];

export default function UploadPage({ loaderData, actionData }: Route.ComponentProps) {
  const { upload, shownKey, isKnown } = loaderData;
  switch (upload.state) {
    case "received":
    case "matching":
    case "checking":
    case "accepting":
      return <UploadProgress upload={upload} />;
    case "checked":
      return <CheckPage upload={upload} shownKey={shownKey} isKnown={isKnown} refusal={actionData?.refusal ?? null} />;
    case "accepted":
    case "cancelled":
    case "failed":
      return <UploadOutcome upload={upload} isKnown={isKnown} />;
  }
}
