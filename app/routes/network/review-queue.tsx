import { Form, redirect } from "react-router";
import { Answer, Heading, Method } from "#app/components/layout/answer.tsx";
import { Page } from "#app/components/layout/page.tsx";
import { NetworkPages } from "#app/components/network/network-pages.tsx";
import { ReviewEvidence } from "#app/components/network/review-evidence.tsx";
import { draftedQuestion } from "#app/components/network/review-words.ts";
import { SeasonSwitch } from "#app/components/season/season-switch.tsx";
import { Button } from "#app/components/ui/button.tsx";
import { EmptyState } from "#app/components/ui/empty-state.tsx";
import { Queue } from "#app/components/ui/queue.tsx";
import { TextLink } from "#app/components/ui/text-link.tsx";
import { networkActor } from "#app/context.ts";
import { seasonLabel } from "#app/domain/dates.ts";
import { notFound } from "#app/lib/errors.ts";
import { readForm } from "#app/lib/form.ts";
import { formatDay, formatShortDay, formatWhole } from "#app/lib/format.ts";
import { seasonParam } from "#app/lib/params.ts";
import { countWords, listWords, missingWords, sentenceStart } from "#app/lib/words.ts";
import { getReviewQueue, type ReviewItem } from "#app/services/review.server.ts";
import { acceptCleanFigures } from "#app/services/review/verdicts.server.ts";
import { getSeasonYears, workingSeason } from "#app/services/season-figures.server.ts";
import type { Route } from "./+types/review-queue";

export const handle = { notForSharing: true };

export async function loader({ context, url }: Route.LoaderArgs) {
  const actor = networkActor(context);
  const asked = url.searchParams.get("season");
  const startYear = asked === null ? await workingSeason() : seasonParam(asked);
  if (startYear === null) throw notFound("season");
  const [queue, seasonStartYears] = await Promise.all([getReviewQueue(actor, startYear), getSeasonYears()]);
  return { queue, seasonStartYears };
}

export async function action({ context, request }: Route.ActionArgs) {
  const form = await readForm(request);
  const season = form.get("season");
  const startYear = seasonParam(typeof season === "string" ? season : "");
  await acceptCleanFigures(networkActor(context), startYear);
  return redirect(`/network/review?season=${startYear}`);
}

export const meta: Route.MetaFunction = () => [{ title: "Review · Commonweigh" }];

function queueItem({ figure, townName }: ReviewItem) {
  return {
    key: String(figure.id),
    name: townName,
    detail: `sent ${figure.sentAt === null ? "" : formatShortDay(figure.sentAt.slice(0, 10))}, ${formatWhole(figure.amounts.laneMiles)} lane miles`,
    why: figure.findings
      .slice(0, 2)
      .map(({ message }) => message)
      .join(" "),
    to: `/network/review/${figure.id}`,
  };
}

function items({ doubtful, firstSeasons }: Route.ComponentProps["loaderData"]["queue"]) {
  return doubtful.map((item, position) => {
    const row = queueItem(item);
    if (position > 0) return row;
    const { figure, townName } = item;
    const [heaviest, ...others] = figure.findings;
    return {
      ...row,
      why: heaviest?.message ?? "",
      open: (
        <ReviewEvidence
          figureId={figure.id}
          version={figure.version}
          townName={townName}
          seasons={firstSeasons}
          others={others.map(({ message }) => message)}
          draftedQuestion={draftedQuestion(figure.findings)}
        />
      ),
    };
  });
}

export default function ReviewQueuePage({ loaderData: { queue, seasonStartYears } }: Route.ComponentProps) {
  const { doubtful, clean, seasonStartYear, acceptedCount, missingTowns, returned, figuresDueOn } = queue;
  const label = seasonLabel(seasonStartYear);
  const waiting = doubtful.length + clean.length;
  return (
    <Page>
      <Answer>
        {waiting === 0
          ? `Nothing of ${label} waits for review.`
          : doubtful.length === 0
            ? `${sentenceStart(countWords(clean.length, "season", "seasons"))} of ${label} passed every check.`
            : `${sentenceStart(countWords(doubtful.length, "of", "of"))} ${countWords(waiting, "season", "seasons")} sent for ${label} ${doubtful.length === 1 ? "needs" : "need"} a look. ${doubtful[0]?.townName ?? ""} is the most doubtful.`}
      </Answer>
      <Method>
        {clean.length > 0 && doubtful.length > 0 && (
          <>
            {sentenceStart(countWords(clean.length, "passed", "passed"))} every check and can be accepted together:{" "}
            <TextLink to="#clean">look through them</TextLink>.{" "}
          </>
        )}
        {sentenceStart(countWords(acceptedCount, "town is", "towns are"))} accepted, {missingWords(missingTowns.length)}
        {missingTowns.length > 0 && missingTowns.length <= 8 && ` (${listWords(missingTowns)})`}. Figures were due{" "}
        {formatDay(figuresDueOn)}. {doubtful.length > 1 && "Most doubtful first."}
      </Method>
      <div className="mt-5">
        <NetworkPages />
      </div>
      {waiting === 0 && (
        <EmptyState title="Seasons that are sent in stand here">Those with something to look at come first.</EmptyState>
      )}
      {doubtful.length > 0 && <Queue items={items(queue)} />}
      {clean.length > 0 && (
        <section id="clean">
          <Heading>Passed every check</Heading>
          <p className="max-w-method">
            {clean.map(({ figure, townName }, position) => (
              <span key={figure.id}>
                {position > 0 && ", "}
                <TextLink to={`/network/review/${figure.id}`}>{townName}</TextLink>
              </span>
            ))}
          </p>
          <Form method="post" className="mt-4">
            <input type="hidden" name="season" value={seasonStartYear} />
            <Button variant={doubtful.length > 0 ? "quiet" : "primary"}>
              Accept {clean.length === 1 ? "it" : `these ${clean.length} together`}
            </Button>
          </Form>
        </section>
      )}
      {returned.length > 0 && (
        <section>
          <Heading>Sent back, not in again</Heading>
          <p className="max-w-method">
            {returned.map(({ figureId, townName }, position) => (
              <span key={figureId}>
                {position > 0 && ", "}
                <TextLink to={`/network/review/${figureId}`}>{townName}</TextLink>
              </span>
            ))}
          </p>
        </section>
      )}
      <SeasonSwitch
        seasonStartYears={seasonStartYears}
        current={seasonStartYear}
        toOf={(year) => `/network/review?season=${year}`}
      />
    </Page>
  );
}
