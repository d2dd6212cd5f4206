import { data, Form, redirect } from "react-router";
import { FindingsList } from "#app/components/season/findings-list.tsx";
import { SeasonTable } from "#app/components/season/season-table.tsx";
import { Answer, Heading, Method } from "#app/components/layout/answer.tsx";
import { Page } from "#app/components/layout/page.tsx";
import { Button, ButtonLink } from "#app/components/ui/button.tsx";
import { EmptyState } from "#app/components/ui/empty-state.tsx";
import { Notice } from "#app/components/ui/notice.tsx";
import { TextLink } from "#app/components/ui/text-link.tsx";
import { townActor } from "#app/context.ts";
import { seasonLabel } from "#app/domain/dates.ts";
import { now } from "#app/lib/clock.server.ts";
import { readForm } from "#app/lib/form.ts";
import { formatDay, formatInstant, formatOneDecimal, formatWhole } from "#app/lib/format.ts";
import { idParam, seasonParam } from "#app/lib/params.ts";
import { getSeason, sendSeason } from "#app/services/season-figures.server.ts";
import type { Route } from "./+types/season";

export async function loader({ context, params }: Route.LoaderArgs) {
  const actor = townActor(context);
  const season = await getSeason(actor, seasonParam(params.seasonStartYear));
  const isLate = season.figuresDueOn < now().toISOString().slice(0, 10);
  return { season, isLate, isDirector: actor.role === "director" };
}

const refusals = {
  "sent-before": "This season has been sent in already; it was sent once.",
  "changed-meanwhile": "The figures were changed since you opened this page. Look them over again, then send them.",
  "errors-stand": "A figure cannot stand as it is. Correct it in the file and upload it again.",
} as const;

export async function action({ context, params, request }: Route.ActionArgs) {
  const form = await readForm(request);
  const version = form.get("version");
  const outcome = await sendSeason(
    townActor(context),
    seasonParam(params.seasonStartYear),
    idParam(typeof version === "string" ? version : "", "version of these figures"),
  );
  if (!outcome.ok) return data({ refusal: refusals[outcome.reason] }, { status: 409 });
  return redirect(`/season/${params.seasonStartYear}`);
}

export const meta: Route.MetaFunction = ({ params }) => [
  { title: `Season ${seasonLabel(Number(params.seasonStartYear))} · Commonweigh` },
];

type Season = Route.ComponentProps["loaderData"]["season"];

function sentence(season: Season) {
  const label = seasonLabel(season.seasonStartYear);
  const { figure } = season;
  if (!figure) return `No figures of ${label} are in yet.`;
  const { saltTonsPerLaneMile, saltLbPerLaneMileEvent } = figure.totals;
  const perEvent =
    saltLbPerLaneMileEvent === null
      ? ""
      : `, ${formatWhole(saltLbPerLaneMileEvent)} lb in each of ${figure.amounts.eventCount} events`;
  return `In ${label} you used ${formatOneDecimal(saltTonsPerLaneMile)} tons of salt on each lane mile${perEvent}.`;
}

function stateWords(season: Season, isLate: boolean) {
  const { figure } = season;
  const due = `Figures ${isLate ? "were" : "are"} due ${formatDay(season.figuresDueOn)}.`;
  if (!figure) return due;
  switch (figure.state) {
    case "draft":
      return `Not sent in yet: only your town sees these figures. ${due}`;
    case "sent":
      return `Sent in ${figure.sentAt === null ? "" : formatInstant(figure.sentAt)}; the coordinator reviews it. Nothing changes until then.`;
    case "returned":
      return "The coordinator sent it back. Correct what needs it and send it in again.";
    case "accepted":
      return `Accepted ${figure.reviewedAt === null ? "" : formatInstant(figure.reviewedAt)}. It goes into the season’s next edition.`;
  }
}

export default function SeasonPage({ loaderData: { season, isLate, isDirector }, actionData }: Route.ComponentProps) {
  const { figure, otherSeasons, seasonStartYear } = season;
  const label = seasonLabel(seasonStartYear);
  const isOpen = figure === null || figure.state === "draft" || figure.state === "returned";
  const others = season.seasonStartYears.filter((year) => year !== seasonStartYear);
  return (
    <Page>
      <Answer>{sentence(season)}</Answer>
      <Method>{stateWords(season, isLate)}</Method>
      {actionData && (
        <Notice tone="problem" title={actionData.refusal}>
          Nothing was changed by this click.
        </Notice>
      )}
      {figure?.state === "returned" && figure.reviewNote !== null && (
        <Notice title="The coordinator asks">{figure.reviewNote}</Notice>
      )}
      {figure === null ? (
        <EmptyState
          title={`The figures of ${label} belong here`}
          action={<ButtonLink to="/uploads?kind=season-figures">Upload the figures</ButtonLink>}
        >
          Lane miles, events, tons of each material, and what it cost: one row of a spreadsheet.
        </EmptyState>
      ) : (
        <>
          {isOpen && (
            <div className="mt-5 flex flex-wrap items-center gap-x-5 gap-y-2 print:hidden">
              {isDirector ? (
                <Form method="post">
                  <input type="hidden" name="version" value={figure.version} />
                  <Button>Send {label} in</Button>
                </Form>
              ) : (
                <p>The director looks these over and sends them in.</p>
              )}
              <TextLink to="/uploads?kind=season-figures" weight="bold">
                Replace them by another file
              </TextLink>
            </div>
          )}
          {figure.findings.length > 0 && (
            <section>
              <Heading>What the checks found</Heading>
              <FindingsList findings={figure.findings} />
            </section>
          )}
          <Heading>The figures, beside your earlier seasons</Heading>
          <SeasonTable
            seasons={[figure, ...otherSeasons.filter((other) => other.seasonStartYear < seasonStartYear).slice(0, 3)]}
            caption="As reported, and worked out from it"
          />
        </>
      )}
      {others.length > 0 && (
        <p className="mt-6 text-gravel print:hidden">
          Other seasons:{" "}
          {others.map((year, position) => (
            <span key={year}>
              {position > 0 && ", "}
              <TextLink to={`/season/${year}`} className="whitespace-nowrap">
                {seasonLabel(year)}
              </TextLink>
            </span>
          ))}
        </p>
      )}
    </Page>
  );
}
