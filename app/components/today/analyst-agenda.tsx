import { Answer, Method } from "#app/components/layout/answer.tsx";
import { Page } from "#app/components/layout/page.tsx";
import { Agenda, type AgendaItem } from "#app/components/ui/agenda.tsx";
import { ButtonLink } from "#app/components/ui/button.tsx";
import { seasonLabel } from "#app/domain/dates.ts";
import { formatShortDay } from "#app/lib/format.ts";

type Props = {
  edition: { id: number; seasonStartYear: number; number: number; publishedAt: string } | null;
  hasTerms: boolean;
  tokenCount: number;
};

/** What waits for an analyst. */
export function AnalystAgenda({ edition, hasTerms, tokenCount }: Props) {
  const items: AgendaItem[] = [];
  if (edition) {
    items.push({
      key: "dataset",
      when: "Now",
      to: "/dataset",
      title: hasTerms ? "Download the edition" : "Accept the terms and download the edition",
      children:
        "One file of protected cells by indicator and group, one of protected rows, and a description a program can read.",
      action: <ButtonLink to="/dataset">Open the dataset</ButtonLink>,
    });
  }
  items.push({
    key: "tokens",
    when: "When you like",
    to: "/dataset/tokens",
    title: tokenCount === 0 ? "Make a token for a program" : "Look after your tokens",
    children: "A token fetches the same files from /api/v1.",
  });
  return (
    <Page>
      <Answer>
        {edition
          ? `The newest edition is ${seasonLabel(edition.seasonStartYear)}, edition ${edition.number}.`
          : "No edition is published yet."}
      </Answer>
      {edition && (
        <Method>
          Published {formatShortDay(edition.publishedAt.slice(0, 10))}. Figures are rounded and stand for many towns
          together.
        </Method>
      )}
      <div className="mt-7 max-w-answer">
        <Agenda items={items} />
      </div>
    </Page>
  );
}
