import { data, Form, redirect } from "react-router";
import { ErrorSummary } from "#app/components/forms/error-summary.tsx";
import { TextArea } from "#app/components/forms/text-area.tsx";
import { Answer, Heading, Method } from "#app/components/layout/answer.tsx";
import { Page } from "#app/components/layout/page.tsx";
import { FindingsList } from "#app/components/season/findings-list.tsx";
import { ReturnNotes } from "#app/components/season/return-notes.tsx";
import { SeasonPages } from "#app/components/season/season-pages.tsx";
import { SeasonRests } from "#app/components/season/season-rests.tsx";
import { SeasonSwitch } from "#app/components/season/season-switch.tsx";
import { SeasonTable } from "#app/components/season/season-table.tsx";
import { seasonSentence, seasonStateWords } from "#app/components/season/season-words.ts";
import { Button, ButtonLink } from "#app/components/ui/button.tsx";
import { EmptyState } from "#app/components/ui/empty-state.tsx";
import { Notice } from "#app/components/ui/notice.tsx";
import { WithMargin } from "#app/components/ui/side-by-side.tsx";
import { TextLink } from "#app/components/ui/text-link.tsx";
import { townActor } from "#app/context.ts";
import { seasonLabel } from "#app/domain/dates.ts";
import { now } from "#app/lib/clock.server.ts";
import { readForm } from "#app/lib/form.ts";
import { formatInstant } from "#app/lib/format.ts";
import { idParam, seasonParam } from "#app/lib/params.ts";
import { getSeason, sendSeason } from "#app/services/season-figures.server.ts";
import { fleetCoverage } from "#app/services/season-figures/fleet-coverage.server.ts";
import { figureHistory } from "#app/services/season-figures/history.server.ts";
import { answerQuestion } from "#app/services/season-figures/questions.server.ts";
import { getTownWinter } from "#app/services/weather.server.ts";
import type { Route } from "./+types/season";

export async function loader({ context, params }: Route.LoaderArgs) {
  const actor = townActor(context);
  const seasonStartYear = seasonParam(params.seasonStartYear);
  const [season, view, fleet] = await Promise.all([
    getSeason(actor, seasonStartYear),
    getTownWinter(actor, seasonStartYear),
    fleetCoverage(actor.townId, seasonStartYear),
  ]);
  const history = season.figure ? await figureHistory(season.figure.id) : null;
  return {
    season,
    history,
    fleet,
    winter:
      view.state === "known"
        ? { points: view.winter.severity.totalPoints, category: view.winter.category?.category ?? null }
        : null,
    isLate: season.figuresDueOn < now().toISOString().slice(0, 10),
    isDirector: actor.role === "director",
  };
}

const refusals = {
  "sent-before": "This season has been sent in already; it was sent once.",
  "changed-meanwhile": "The figures were changed since you opened this page. Look them over again, then send them.",
  "errors-stand": "A figure cannot stand as it is. Correct it first, then send the season in.",
} as const;

export async function action({ context, params, request }: Route.ActionArgs) {
  const actor = townActor(context);
  const seasonStartYear = seasonParam(params.seasonStartYear);
  const form = await readForm(request);
  const text = (name: string) => {
    const value = form.get(name);
    return typeof value === "string" ? value.trim() : "";
  };
  if (text("intent") === "answer") {
    const answer = text("answer");
    if (answer.length < 2 || answer.length > 2000) {
      return data({ refusal: null, error: "Write an answer: a word or more, at most 2,000 letters." }, { status: 400 });
    }
    const isFirst = await answerQuestion(actor, idParam(text("questionId"), "question"), answer);
    if (!isFirst) return data({ refusal: "Somebody of your town has answered already.", error: null }, { status: 409 });
    return redirect(`/season/${seasonStartYear}`);
  }
  const outcome = await sendSeason(actor, seasonStartYear, idParam(text("version"), "version of these figures"));
  if (!outcome.ok) return data({ refusal: refusals[outcome.reason], error: null }, { status: 409 });
  return redirect(`/season/${seasonStartYear}`);
}

export const meta: Route.MetaFunction = ({ params }) => [
  { title: `Season ${seasonLabel(Number(params.seasonStartYear))} · Commonweigh` },
];

export default function SeasonPage({ loaderData, actionData }: Route.ComponentProps) {
  const { season, history, fleet, winter, isLate, isDirector } = loaderData;
  const { figure, otherSeasons, seasonStartYear, basis } = season;
  const label = seasonLabel(seasonStartYear);
  const isOpen = figure === null || figure.state === "draft" || figure.state === "returned";
  const returnedVersion = history?.notes.at(-1)?.version ?? history?.versions.at(-1)?.version;
  return (
    <Page>
      <Answer>{seasonSentence(season)}</Answer>
      <Method>{seasonStateWords(season, isLate)}</Method>
      <SeasonPages seasonStartYear={seasonStartYear} />
      {actionData?.refusal != null && (
        <Notice tone="problem" title={actionData.refusal}>
          Nothing was changed by this click.
        </Notice>
      )}
      {actionData?.error != null && (
        <ErrorSummary key={actionData.error} errors={[{ fieldId: "answer", message: actionData.error }]} />
      )}
      {figure?.state === "returned" && (
        <ReturnNotes
          question={figure.reviewNote}
          notes={history?.notes.filter(({ version }) => version === returnedVersion) ?? []}
          sent={history?.versions.findLast(({ version }) => version === returnedVersion)?.content ?? null}
          now={{ ...figure.amounts, wettedSaltLb: figure.extras.wettedSaltLb }}
        />
      )}
      {figure?.state === "accepted" && figure.reviewNote !== null && (
        <Notice tone="good" title="Accepted as it is.">
          {figure.reviewNote}
        </Notice>
      )}
      <Questions questions={history?.questions ?? []} isDirector={isDirector} error={actionData?.error ?? null} />
      {figure === null ? (
        <EmptyState
          title={`The figures of ${label} belong here`}
          action={
            basis.draft.eventCount > 0 ? (
              <ButtonLink to={`/season/${seasonStartYear}/figures?take=log`}>Fill from storms and stock</ButtonLink>
            ) : (
              <ButtonLink to={`/season/${seasonStartYear}/figures`}>Type the figures</ButtonLink>
            )
          }
        >
          Lane miles, events, tons of each material, and what it cost. They follow from storms and stock, or can be
          typed or <TextLink to="/uploads?kind=season-figures">uploaded</TextLink>.
        </EmptyState>
      ) : (
        <WithMargin
          margin={<SeasonRests seasonStartYear={seasonStartYear} basis={basis} fleet={fleet} winter={winter} />}
        >
          {isOpen && (
            <div className="mb-6 flex flex-wrap items-center gap-x-5 gap-y-2 print:hidden">
              {isDirector ? (
                <Form method="post">
                  <input type="hidden" name="version" value={figure.version} />
                  <Button>Send {label} in</Button>
                </Form>
              ) : (
                <p>The director looks these over and sends them in.</p>
              )}
              <TextLink to={`/season/${seasonStartYear}/figures`} weight="bold">
                Correct the figures
              </TextLink>
            </div>
          )}
          <h2 className="border-t-2 border-line pt-2 text-l font-bold">
            {figure.findings.length === 0 ? "The checks found nothing" : "What the checks found"}
          </h2>
          {figure.findings.length > 0 && <FindingsList findings={figure.findings} />}
          {figure.findings.length === 0 && (
            <p className="mt-2 max-w-method text-gravel">
              Held against last year, plausible limits, the piles and the winter’s severity.
            </p>
          )}
          <Heading>The figures, beside your earlier seasons</Heading>
          <SeasonTable
            seasons={[figure, ...otherSeasons.filter((other) => other.seasonStartYear < seasonStartYear).slice(0, 3)]}
            caption="As reported, and worked out from it"
          />
          {history !== null && history.versions.length > 0 && (
            <>
              <Heading>Sent so far</Heading>
              <ul>
                {history.versions.map(({ version, sentAt }) => (
                  <li key={version} className="border-b border-rule py-1.5">
                    Version {version}, sent {formatInstant(sentAt)}
                  </li>
                ))}
              </ul>
            </>
          )}
        </WithMargin>
      )}
      <SeasonSwitch
        seasonStartYears={season.seasonStartYears}
        current={seasonStartYear}
        toOf={(year) => `/season/${year}`}
      />
    </Page>
  );
}

type QuestionsProps = {
  questions: readonly { id: number; question: string; askedAt: string; answer: string | null }[];
  isDirector: boolean;
  error: string | null;
};

function Questions({ questions, isDirector, error }: QuestionsProps) {
  const open = questions.find(({ answer }) => answer === null);
  return questions.map(({ id, question, askedAt, answer }) => (
    <Notice key={id} title="The coordinator asks">
      <p>{question}</p>
      <p className="text-note text-gravel">Asked {formatInstant(askedAt)}. The figures stay as they were sent.</p>
      {answer !== null && (
        <p className="mt-2">
          <b>Your answer:</b> {answer}
        </p>
      )}
      {open?.id === id && isDirector && (
        <Form method="post" className="mt-3 grid gap-3">
          <input type="hidden" name="questionId" value={id} />
          <TextArea name="answer" label="Answer" error={error} maxLength={2000} rows={2} />
          <div>
            <Button variant="quiet" name="intent" value="answer">
              Send the answer
            </Button>
          </div>
        </Form>
      )}
    </Notice>
  ));
}
