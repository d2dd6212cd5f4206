import { type Letter, letter } from "./letter.ts";

type To = { toName: string; toAddress: string };
type Occasion = To & { townName: string; season: string; address: string };

/** To everybody of every town, when the coordinator opens a season. */
export function seasonOpenedLetter({
  season,
  dueOn,
  address,
  ...to
}: To & { season: string; dueOn: string; address: string }): Letter {
  return letter({
    ...to,
    subject: `${season} is open: figures are due ${dueOn}`,
    paragraphs: [
      `The network has opened ${season}. Write down roads, storms and stock as they come; the season’s figures follow from them.`,
      `Figures are due ${dueOn}.`,
    ],
    link: { label: "Open the season", address },
  });
}

/** To a town that has not sent its season in, some days before it is due. */
export function seasonReminderLetter({
  season,
  dueOn,
  dayCount,
  address,
  ...to
}: To & { season: string; dueOn: string; dayCount: number; address: string }): Letter {
  const left = dayCount === 0 ? "today" : dayCount === 1 ? "tomorrow" : `in ${dayCount} days`;
  return letter({
    ...to,
    subject: `The figures of ${season} are due ${left}`,
    paragraphs: [
      `Your town has not sent in its figures for ${season} yet. They are due ${dueOn}.`,
      "If something is missing, send what you have and say so: a figure can be corrected until it is accepted.",
    ],
    link: { label: "Open the season", address },
  });
}

/** To the coordinator, when a town has sent its season in. */
export function seasonSentLetter({ townName, season, address, ...to }: Occasion): Letter {
  return letter({
    ...to,
    subject: `${townName} has sent in ${season}`,
    paragraphs: [`${townName} has sent in its figures for ${season}. They wait for your review.`],
    link: { label: "Open the review", address },
  });
}

/** To the town, when its season is accepted. */
export function seasonAcceptedLetter({ townName, season, address, ...to }: Occasion): Letter {
  return letter({
    ...to,
    subject: `${season} of ${townName} is accepted`,
    paragraphs: [
      `The figures of ${townName} for ${season} are accepted. They go into the next edition, where no town can be told from another.`,
    ],
    link: { label: "Look at the season", address },
  });
}

/** To the town, when its season comes back with notes. */
export function seasonReturnedLetter({
  townName,
  season,
  address,
  notes,
  ...to
}: Occasion & { notes: readonly string[] }): Letter {
  return letter({
    ...to,
    subject: `${season} of ${townName} comes back with a question`,
    paragraphs: [
      `The coordinator has looked at the figures of ${townName} for ${season} and asks:`,
      ...notes,
      "Nothing is lost. Correct what needs it, and send the season in again.",
    ],
    link: { label: "Open the season", address },
  });
}

/** To the town, when the coordinator asks something without sending the season back. */
export function seasonQuestionLetter({ townName, season, address, question, ...to }: Occasion & { question: string }) {
  return letter({
    ...to,
    subject: `A question about ${season} of ${townName}`,
    paragraphs: [
      `The coordinator asks about the figures of ${townName} for ${season}:`,
      question,
      "The figures stay as they were sent. A sentence is enough of an answer.",
    ],
    link: { label: "Answer it", address },
  });
}

/** To the coordinator, when a town answers a question. */
export function seasonAnswerLetter({ townName, season, address, answer, ...to }: Occasion & { answer: string }) {
  return letter({
    ...to,
    subject: `${townName} answers about ${season}`,
    paragraphs: [`${townName} answers your question about ${season}:`, answer],
    link: { label: "Open the review", address },
  });
}

/** To every director, when an edition is out. */
export function editionLetter({
  season,
  number,
  address,
  ...to
}: To & { season: string; number: number; address: string }): Letter {
  return letter({
    ...to,
    subject: `See where you stand in ${season}, edition ${number}`,
    paragraphs: [
      `Edition ${number} of ${season} is published. It shows where your town stands among its peers, and no town by name.`,
    ],
    link: { label: "Open Peers", address },
  });
}
