import { Answer } from "#app/components/layout/answer.tsx";
import { Page } from "#app/components/layout/page.tsx";
import { Agenda, type AgendaItem } from "#app/components/ui/agenda.tsx";
import { ButtonLink } from "#app/components/ui/button.tsx";
import { EmptyState } from "#app/components/ui/empty-state.tsx";
import { seasonLabel } from "#app/domain/dates.ts";
import { formatShortDay } from "#app/lib/format.ts";
import { countWords, missingWords, sentenceStart } from "#app/lib/words.ts";

type Props = {
  season: {
    seasonStartYear: number;
    doubtful: number;
    clean: number;
    accepted: number;
    missing: number;
    returned: number;
  } | null;
  edition: { id: number; seasonStartYear: number; number: number; publishedAt: string } | null;
};

type Step = Omit<AgendaItem, "action"> & { button: string };

function steps({ season, edition }: Props): Step[] {
  const found: Step[] = [];
  if (season) {
    const label = seasonLabel(season.seasonStartYear);
    if (season.doubtful > 0) {
      found.push({
        key: "doubtful",
        when: "Now",
        whenDetail: "5 minutes each",
        to: "/network/review",
        button: "Open the review",
        title: `Look at ${countWords(season.doubtful, "doubtful season", "doubtful seasons")} of ${label}`,
        children: "Most doubtful first, each with its reason and a question drafted.",
      });
    }
    if (season.clean > 0) {
      found.push({
        key: "clean",
        when: "Today",
        whenDetail: "1 minute",
        to: "/network/review",
        button: "Open the review",
        title: `Accept ${countWords(season.clean, "season that passed", "seasons that passed")} every check`,
      });
    }
    if (edition?.seasonStartYear !== season.seasonStartYear && season.accepted > 0) {
      found.push({
        key: "edition",
        when: "Next",
        to: "/network/editions",
        button: "Prepare the edition",
        title: `Publish edition 1 of ${label}`,
        children: `${sentenceStart(countWords(season.accepted, "town is", "towns are"))} accepted; ${missingWords(season.missing)}.`,
      });
    }
  }
  if (edition) {
    found.push({
      key: "workshop",
      when: "When you like",
      whenDetail: `since ${formatShortDay(edition.publishedAt.slice(0, 10))}`,
      to: "/workshops",
      button: "Prepare a workshop",
      title: `Prepare a workshop on ${seasonLabel(edition.seasonStartYear)}, edition ${edition.number}`,
    });
  }
  found.push({
    key: "people",
    when: "When you like",
    to: "/network/people",
    button: "Invite people",
    title: "Invite people of a town",
  });
  return found;
}

/** What waits for the coordinator. */
export function NetworkAgenda(props: Props) {
  const { season } = props;
  const waiting = season ? season.doubtful + season.clean : 0;
  const items = steps(props);
  return (
    <Page>
      <Answer>
        {season === null
          ? "The network has no season yet."
          : waiting === 0
            ? `No season of ${seasonLabel(season.seasonStartYear)} waits for you; ${countWords(season.accepted, "town is", "towns are")} accepted.`
            : `${sentenceStart(countWords(waiting, "town has", "towns have"))} sent in ${seasonLabel(season.seasonStartYear)} and ${waiting === 1 ? "waits" : "wait"} for you; ${countWords(season.accepted, "is", "are")} accepted.`}
      </Answer>
      <div className="mt-7 max-w-answer">
        {items.length === 0 ? (
          <EmptyState title="The road is clear">Figures that are sent in stand here.</EmptyState>
        ) : (
          <Agenda
            items={items.map(({ button, ...step }, position) => ({
              ...step,
              ...(position === 0 && step.to !== undefined
                ? { action: <ButtonLink to={step.to}>{button}</ButtonLink> }
                : {}),
            }))}
          />
        )}
      </div>
    </Page>
  );
}
