import { data, Form, redirect } from "react-router";
import { FindingsList } from "#app/components/season/findings-list.tsx";
import { OwnSeasons } from "#app/components/season/own-seasons.tsx";
import { SeasonTable } from "#app/components/season/season-table.tsx";
import { ErrorSummary } from "#app/components/forms/error-summary.tsx";
import { KeptForm } from "#app/components/forms/kept-form.tsx";
import { TextArea } from "#app/components/forms/text-area.tsx";
import { NetworkPages } from "#app/components/network/network-pages.tsx";
import { Answer, Heading, Method } from "#app/components/layout/answer.tsx";
import { Page } from "#app/components/layout/page.tsx";
import { Button } from "#app/components/ui/button.tsx";
import { Notice } from "#app/components/ui/notice.tsx";
import { networkActor } from "#app/context.ts";
import { seasonLabel } from "#app/domain/dates.ts";
import { badRequest } from "#app/lib/errors.ts";
import { readForm } from "#app/lib/form.ts";
import { formatInstant } from "#app/lib/format.ts";
import { idParam } from "#app/lib/params.ts";
import { countWords } from "#app/lib/words.ts";
import { acceptFigure, getFigureReview, returnFigure } from "#app/services/review.server.ts";
import type { Route } from "./+types/review-figure";

export const handle = { notForSharing: true };

export async function loader({ context, params }: Route.LoaderArgs) {
  const actor = networkActor(context);
  return { ...(await getFigureReview(actor, idParam(params.figureId, "sent season"))), userId: actor.userId };
}

export async function action({ context, params, request }: Route.ActionArgs) {
  const actor = networkActor(context);
  const figureId = idParam(params.figureId, "sent season");
  const form = await readForm(request);
  const versionText = form.get("version");
  const version = idParam(typeof versionText === "string" ? versionText : "", "version of these figures");
  const noteText = form.get("note");
  const note = typeof noteText === "string" ? noteText.trim() : "";
  const verdict = form.get("verdict");
  // Never by default: a form that lost a field must not accept a town's figures.
  if (verdict !== "accept" && verdict !== "return") throw badRequest("Choose: accept the season, or send it back.");
  const isReturn = verdict === "return";
  if (isReturn && (note.length < 8 || note.length > 2000)) {
    return data(
      { error: "Write the question that goes back with it: a sentence, at most 2,000 letters.", refusal: null },
      { status: 400 },
    );
  }
  const outcome = isReturn
    ? await returnFigure(actor, figureId, version, note)
    : await acceptFigure(actor, figureId, version);
  if (outcome.ok) return redirect("/network/review");
  return data(
    { error: null, refusal: "This season was settled or changed since you opened it. Nothing was done by this click." },
    { status: 409 },
  );
}

export const meta: Route.MetaFunction = ({ loaderData }) => [
  { title: `Review ${loaderData?.townName ?? ""} · Commonweigh` },
];

function checkWords(findingCount: number) {
  if (findingCount === 0) return "; it passed every check.";
  return `: ${countWords(findingCount, "thing", "things")} to look at.`;
}

const stateWords = {
  draft: "",
  sent: "waits for your review",
  returned: "was sent back",
  accepted: "is accepted",
} as const;

export default function ReviewFigure({
  loaderData: { figure, townName, earlier, userId },
  actionData,
}: Route.ComponentProps) {
  const label = seasonLabel(figure.seasonStartYear);
  const [first] = figure.findings;
  const seasons = [figure, ...[...earlier].reverse().slice(0, 3)];
  const question =
    first === undefined
      ? ""
      : `${first.message} Please correct it, or say that it is right, and send the season again.`;
  return (
    <Page>
      <Answer>
        {`${townName}’s ${label} ${stateWords[figure.state]}${figure.state === "sent" ? checkWords(figure.findings.length) : "."}`}
      </Answer>
      <Method>
        Sent {figure.sentAt === null ? "" : formatInstant(figure.sentAt)}. Beside it, the town’s own earlier seasons.
      </Method>
      <div className="mt-5">
        <NetworkPages />
      </div>
      {actionData?.refusal && <Notice tone="problem" title={actionData.refusal} />}
      {actionData?.error && (
        <ErrorSummary key={actionData.error} errors={[{ fieldId: "note", message: actionData.error }]} />
      )}
      {figure.findings.length > 0 && <FindingsList findings={figure.findings} />}
      {figure.reviewNote !== null && <Notice title="You asked">{figure.reviewNote}</Notice>}
      {figure.state === "sent" && (
        <section>
          <Heading>Your decision</Heading>
          <div className="grid gap-x-14 gap-y-6 md:grid-cols-2">
            <OwnSeasons
              title="Its own seasons, tons of salt per lane mile"
              seasons={seasons}
              isDoubtful={first !== undefined}
            />
            <div className="grid gap-4">
              <KeptForm formKey="return" ownerId={userId} method="post" className="grid gap-4">
                <input type="hidden" name="version" value={figure.version} />
                <input type="hidden" name="verdict" value="return" />
                <TextArea
                  name="note"
                  label="Question that goes back with it"
                  defaultValue={question}
                  error={actionData?.error}
                  maxLength={2000}
                />
                <div>
                  <Button variant={first === undefined ? "quiet" : "primary"}>Send it back</Button>
                </div>
              </KeptForm>
              <Form method="post">
                <input type="hidden" name="version" value={figure.version} />
                <input type="hidden" name="verdict" value="accept" />
                <Button variant={first === undefined ? "primary" : "quiet"}>Accept it as it is</Button>
              </Form>
            </div>
          </div>
        </section>
      )}
      <Heading>The figures, beside its earlier seasons</Heading>
      <SeasonTable seasons={seasons} caption="As reported, and worked out from it" />
    </Page>
  );
}
