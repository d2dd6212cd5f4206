import { data, Form, redirect } from "react-router";
import { OwnSeasons } from "#app/components/season/own-seasons.tsx";
import { ErrorSummary } from "#app/components/forms/error-summary.tsx";
import { Answer, Heading, Method } from "#app/components/layout/answer.tsx";
import { Page } from "#app/components/layout/page.tsx";
import { FieldNotes } from "#app/components/network/field-notes.tsx";
import { NetworkPages } from "#app/components/network/network-pages.tsx";
import { ReviewHistory } from "#app/components/network/review-history.tsx";
import { draftedQuestion } from "#app/components/network/review-words.ts";
import { readVerdict } from "#app/components/network/verdict-form.ts";
import { KeptForm } from "#app/components/forms/kept-form.tsx";
import { TextArea } from "#app/components/forms/text-area.tsx";
import { FindingsList } from "#app/components/season/findings-list.tsx";
import { SeasonRests } from "#app/components/season/season-rests.tsx";
import { SeasonTable } from "#app/components/season/season-table.tsx";
import { Button } from "#app/components/ui/button.tsx";
import { Notice } from "#app/components/ui/notice.tsx";
import { WithMargin } from "#app/components/ui/side-by-side.tsx";
import { networkActor } from "#app/context.ts";
import { seasonLabel } from "#app/domain/dates.ts";
import { readForm } from "#app/lib/form.ts";
import { formTexts } from "#app/lib/form-texts.ts";
import { formatInstant } from "#app/lib/format.ts";
import { idParam } from "#app/lib/params.ts";
import { countWords } from "#app/lib/words.ts";
import { getFigureReview } from "#app/services/review.server.ts";
import { acceptFigure, askAboutFigure, returnFigure } from "#app/services/review/verdicts.server.ts";
import { workingSeason } from "#app/services/season-figures.server.ts";
import type { Route } from "./+types/review-figure";

export const handle = { notForSharing: true };

export async function loader({ context, params }: Route.LoaderArgs) {
  const actor = networkActor(context);
  return { ...(await getFigureReview(actor, idParam(params.figureId, "sent season"))), userId: actor.userId };
}

export async function action({ context, params, request }: Route.ActionArgs) {
  const actor = networkActor(context);
  const figureId = idParam(params.figureId, "sent season");
  const values = formTexts(await readForm(request));
  const version = idParam(values.version, "version of these figures");
  const { figure } = await getFigureReview(actor, figureId);
  const reading = readVerdict(values, figure.findings.length > 0);
  if (!reading.ok) return data({ errors: reading.errors, refusal: null, values }, { status: 400 });
  const { verdict } = reading;
  const outcome =
    verdict.verdict === "accept"
      ? await acceptFigure(actor, figureId, version, verdict.reason)
      : verdict.verdict === "ask"
        ? await askAboutFigure(actor, figureId, version, verdict.question)
        : await returnFigure(actor, figureId, version, verdict);
  if (outcome.ok) {
    if (verdict.verdict === "ask") return redirect(`/network/review/${figureId}`);
    const isWorking = figure.seasonStartYear === (await workingSeason());
    return redirect(isWorking ? "/network/review" : `/network/review?season=${figure.seasonStartYear}`);
  }
  const refusal = "This season was settled or changed since you opened it. Nothing was done by this click.";
  return data({ errors: {}, refusal, values }, { status: 409 });
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

export default function ReviewFigure({ loaderData, actionData }: Route.ComponentProps) {
  const { figure, townName, earlier, basis, fleet, history } = loaderData;
  const label = seasonLabel(figure.seasonStartYear);
  const errors: Record<string, string> = actionData?.errors ?? {};
  const winter = figure.awssiPoints === null ? null : { points: figure.awssiPoints, category: null };
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
      {actionData?.refusal != null && <Notice tone="problem" title={actionData.refusal} />}
      <ErrorSummary
        key={JSON.stringify(errors)}
        errors={Object.entries(errors).map(([fieldId, message]) => ({ fieldId, message }))}
      />
      {figure.state === "returned" && figure.reviewNote !== null && (
        <Notice title="You asked">{figure.reviewNote}</Notice>
      )}
      {figure.state === "accepted" && figure.reviewNote !== null && (
        <Notice title="Accepted with the reason">{figure.reviewNote}</Notice>
      )}
      <WithMargin
        margin={
          <>
            <SeasonRests
              seasonStartYear={figure.seasonStartYear}
              basis={basis}
              fleet={fleet}
              winter={winter}
              hasLinks={false}
            />
          </>
        }
      >
        {figure.findings.length > 0 && (
          <section>
            <h2 className="border-t-2 border-line pt-2 text-l font-bold">What the checks found</h2>
            <FindingsList findings={figure.findings} />
          </section>
        )}
        <div className="mt-6">
          <OwnSeasons
            title={`${townName}’s own seasons, tons of salt per lane mile`}
            seasons={[...earlier, figure].map(({ seasonStartYear, totals }) => ({
              seasonStartYear,
              tonsPerLaneMile: totals.saltTonsPerLaneMile,
            }))}
            isDoubtful={figure.findings.some(({ field }) => field === "saltLb")}
          />
        </div>
        <div className="mt-6">
          <SeasonTable
            seasons={[figure, ...[...earlier].reverse().slice(0, 3)]}
            caption={`${townName}, as reported and worked out from it`}
          />
        </div>
        <ReviewHistory history={history} />
        {figure.state === "sent" && <Decision loaderData={loaderData} actionData={actionData} />}
      </WithMargin>
    </Page>
  );
}

function Decision({ loaderData, actionData }: Pick<Route.ComponentProps, "loaderData" | "actionData">) {
  const { figure, userId } = loaderData;
  const isDoubtful = figure.findings.length > 0;
  const errors: Record<string, string> = actionData?.errors ?? {};
  const values: Record<string, string> = actionData?.values ?? {};
  const version = <input type="hidden" name="version" value={figure.version} />;
  return (
    <section>
      <Heading>Your decision</Heading>
      <KeptForm formKey="return" ownerId={userId} method="post" className="grid gap-4">
        {version}
        <TextArea
          name="note"
          label="Question that goes back with it"
          defaultValue={values.note ?? draftedQuestion(figure.findings)}
          error={errors.note}
          maxLength={2000}
        />
        <FieldNotes findings={figure.findings} values={values} errors={errors} />
        <div>
          <Button name="verdict" value="return" variant={isDoubtful ? "primary" : "quiet"}>
            Send it back
          </Button>
        </div>
      </KeptForm>
      <div className="mt-8 grid gap-x-10 gap-y-8 md:grid-cols-2">
        <Form method="post" className="grid content-start gap-4">
          {version}
          {isDoubtful && (
            <TextArea
              name="reason"
              label="Why it stands"
              hint="The town reads it, and the trail keeps it."
              defaultValue={values.reason ?? ""}
              error={errors.reason}
              maxLength={2000}
              rows={2}
            />
          )}
          <div>
            <Button name="verdict" value="accept" variant={isDoubtful ? "quiet" : "primary"}>
              {isDoubtful ? "Accept it as it is, with the reason" : "Accept it as it is"}
            </Button>
          </div>
        </Form>
        <Form method="post" className="grid content-start gap-4">
          {version}
          <TextArea
            name="ask"
            label="Ask without sending it back"
            hint="The figures stay sent; the director answers in a sentence."
            defaultValue={values.ask ?? ""}
            error={errors.ask}
            maxLength={2000}
            rows={2}
          />
          <div>
            <Button name="verdict" value="ask" variant="quiet">
              Ask
            </Button>
          </div>
        </Form>
      </div>
    </section>
  );
}
