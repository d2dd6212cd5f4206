import { Form, redirect } from "react-router";
import { NetworkPages } from "#app/components/network/network-pages.tsx";
import { Answer, Heading, Method } from "#app/components/layout/answer.tsx";
import { Page } from "#app/components/layout/page.tsx";
import { Button } from "#app/components/ui/button.tsx";
import { EmptyState } from "#app/components/ui/empty-state.tsx";
import { Queue } from "#app/components/ui/queue.tsx";
import { TextLink } from "#app/components/ui/text-link.tsx";
import { networkActor } from "#app/context.ts";
import { seasonLabel } from "#app/domain/dates.ts";
import { notFound } from "#app/lib/errors.ts";
import { readForm } from "#app/lib/form.ts";
import { formatShortDay, formatWhole } from "#app/lib/format.ts";
import { seasonParam } from "#app/lib/params.ts";
import { countWords, missingWords, sentenceStart } from "#app/lib/words.ts";
import { acceptCleanFigures, getReviewQueue, type ReviewItem } from "#app/services/review.server.ts";
import { workingSeason } from "#app/services/season-figures.server.ts";
import type { Route } from "./+types/review-queue";

export const handle = { notForSharing: true };

export async function loader({ context, url }: Route.LoaderArgs) {
  const asked = url.searchParams.get("season");
  const startYear = asked === null ? await workingSeason() : seasonParam(asked);
  if (startYear === null) throw notFound("season");
  return { queue: await getReviewQueue(networkActor(context), startYear) };
}

export async function action({ context, request }: Route.ActionArgs) {
  const form = await readForm(request);
  const season = form.get("season");
  const startYear = seasonParam(typeof season === "string" ? season : "");
  // Each is named with the version that was on the page: what changed since is not accepted unseen.
  const seen = form.getAll("figure").flatMap((text) => {
    const match = typeof text === "string" ? /^([1-9]\d{0,9})\|([1-9]\d{0,9})$/.exec(text) : null;
    return match ? [{ figureId: Number(match[1]), version: Number(match[2]) }] : [];
  });
  await acceptCleanFigures(networkActor(context), startYear, seen);
  return redirect(`/network/review?season=${startYear}`);
}

export const meta: Route.MetaFunction = () => [{ title: "Review · Commonweigh" }];

function queueItem({ figure, townName }: ReviewItem) {
  return {
    key: String(figure.id),
    name: townName,
    detail: `sent ${figure.sentAt === null ? "" : formatShortDay(figure.sentAt.slice(0, 10))}, ${formatWhole(figure.amounts.laneMiles)} lane miles`,
    why: figure.findings.map(({ message }) => message).join(" ") || "Passed every check.",
    to: `/network/review/${figure.id}`,
  };
}

export default function ReviewQueuePage({ loaderData: { queue } }: Route.ComponentProps) {
  const { doubtful, clean, seasonStartYear, acceptedCount, missingTowns } = queue;
  const label = seasonLabel(seasonStartYear);
  const waiting = doubtful.length + clean.length;
  return (
    <Page>
      <Answer>
        {waiting === 0
          ? `Nothing of ${label} waits for review.`
          : doubtful.length === 0
            ? `${sentenceStart(countWords(clean.length, "season", "seasons"))} of ${label} passed every check.`
            : doubtful.length === 1
              ? `One season of ${label} needs a look: ${doubtful[0]?.townName ?? ""}.`
              : `${sentenceStart(countWords(doubtful.length, "season", "seasons"))} of ${label} need a look. ${doubtful[0]?.townName ?? ""} is the most doubtful.`}
      </Answer>
      <Method>
        {sentenceStart(countWords(acceptedCount, "town is", "towns are"))} accepted, {missingWords(missingTowns.length)}
        .{doubtful.length > 1 && " Most doubtful first."}
      </Method>
      <div className="mt-5">
        <NetworkPages />
      </div>
      {waiting === 0 && (
        <EmptyState title="Seasons that are sent in stand here">Those with something to look at come first.</EmptyState>
      )}
      {doubtful.length > 0 && <Queue items={doubtful.map(queueItem)} />}
      {clean.length > 0 && (
        <section>
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
            {clean.map(({ figure }) => (
              <input key={figure.id} type="hidden" name="figure" value={`${figure.id}|${figure.version}`} />
            ))}
            <Button variant={doubtful.length > 0 ? "quiet" : "primary"}>
              Accept {clean.length === 1 ? "it" : `these ${clean.length} together`}
            </Button>
          </Form>
        </section>
      )}
    </Page>
  );
}
