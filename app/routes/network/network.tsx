import { NetworkPages } from "#app/components/network/network-pages.tsx";
import { Answer, Method } from "#app/components/layout/answer.tsx";
import { Page } from "#app/components/layout/page.tsx";
import { ButtonLink } from "#app/components/ui/button.tsx";
import { EmptyState } from "#app/components/ui/empty-state.tsx";
import { Kinds } from "#app/components/ui/kinds.tsx";
import { networkActor } from "#app/context.ts";
import { seasonLabel } from "#app/domain/dates.ts";
import { formatDay } from "#app/lib/format.ts";
import { countWords, sentenceStart } from "#app/lib/words.ts";
import { getReviewQueue } from "#app/services/review.server.ts";
import { workingSeason } from "#app/services/season-figures.server.ts";
import type { Route } from "./+types/network";

export const handle = { notForSharing: true };

export async function loader({ context }: Route.LoaderArgs) {
  const actor = networkActor(context);
  const startYear = await workingSeason();
  return { queue: startYear === null ? null : await getReviewQueue(actor, startYear) };
}

export const meta: Route.MetaFunction = () => [{ title: "Network · Commonweigh" }];

export default function Network({ loaderData: { queue } }: Route.ComponentProps) {
  if (!queue) {
    return (
      <Page>
        <Answer>The network has no season yet.</Answer>
        <NetworkPages />
        <EmptyState
          title="Seasons, towns and people belong here"
          action={<ButtonLink to="/network/people">Invite the first people</ButtonLink>}
        >
          Once a season is opened, towns put their figures in and send them to you.
        </EmptyState>
      </Page>
    );
  }
  const waiting = queue.doubtful.length + queue.clean.length;
  const label = seasonLabel(queue.seasonStartYear);
  return (
    <Page>
      <Answer>
        {sentenceStart(countWords(queue.acceptedCount, "town is", "towns are"))} accepted for {label};{" "}
        {waiting === 0 ? "nothing waits for you" : `${countWords(waiting, "waits", "wait")} for you`}.
      </Answer>
      <Method>Figures were due {formatDay(queue.figuresDueOn)}.</Method>
      <div className="mt-5">
        <NetworkPages />
      </div>
      <div className="max-w-measure">
        <Kinds
          label="Towns by state"
          kinds={[
            {
              key: "doubtful",
              count: queue.doubtful.length,
              label: "sent, with something to look at",
              to: "/network/review",
            },
            { key: "clean", count: queue.clean.length, label: "sent, passed every check", to: "/network/review" },
            {
              key: "returned",
              count: queue.returned.length,
              label: "sent back, not in again",
              detail: queue.returned.map(({ townName }) => townName).join(", "),
            },
            {
              key: "missing",
              count: queue.missingTowns.length,
              label: "not sent",
              detail: queue.missingTowns.join(", "),
            },
            { key: "accepted", count: queue.acceptedCount, label: "accepted", isDone: true },
          ]}
        />
      </div>
      <p className="mt-6">
        <ButtonLink to={waiting > 0 ? "/network/review" : "/network/editions"}>
          {waiting > 0 ? "Open the review" : "Prepare the edition"}
        </ButtonLink>
      </p>
    </Page>
  );
}
