import { seasonLabel } from "#app/domain/dates.ts";
import type { SeasonAmounts, SeasonTotals } from "#app/domain/season/season-totals.ts";
import { formatDay, formatInstant, formatOneDecimal, formatWhole } from "#app/lib/format.ts";

type Season = {
  seasonStartYear: number;
  figuresDueOn: string;
  closesOn: string | null;
  figure: {
    state: "draft" | "sent" | "returned" | "accepted";
    amounts: SeasonAmounts;
    totals: SeasonTotals;
    sentAt: string | null;
    reviewedAt: string | null;
  } | null;
};

/** What the town used, in one sentence. */
export function seasonSentence({ seasonStartYear, figure }: Season): string {
  const label = seasonLabel(seasonStartYear);
  if (!figure) return `No figures of ${label} are in yet.`;
  const { saltTonsPerLaneMile, saltLbPerLaneMileEvent } = figure.totals;
  const perEvent =
    saltLbPerLaneMileEvent === null
      ? ""
      : `, ${formatWhole(saltLbPerLaneMileEvent)} lb in each of ${figure.amounts.eventCount} events`;
  return `In ${label} you used ${formatOneDecimal(saltTonsPerLaneMile)} tons of salt on each lane mile${perEvent}.`;
}

/** How far the season is, and what happens next. */
export function seasonStateWords({ figure, figuresDueOn, closesOn }: Season, isLate: boolean): string {
  const closes = closesOn === null ? "" : ` The season closes ${formatDay(closesOn)}.`;
  const due = `Figures ${isLate ? "were" : "are"} due ${formatDay(figuresDueOn)}.${closes}`;
  if (!figure) return due;
  switch (figure.state) {
    case "draft":
      return `Not sent in yet: only your town sees these figures. ${due}`;
    case "sent":
      return `Sent in ${figure.sentAt === null ? "" : formatInstant(figure.sentAt)}; the coordinator reviews it. Nothing changes until then.`;
    case "returned":
      return "Correct what needs it, or say in the note that it is right, and send the season in again.";
    case "accepted":
      return `Accepted ${figure.reviewedAt === null ? "" : formatInstant(figure.reviewedAt)}. It goes into the season’s next edition.`;
  }
}
