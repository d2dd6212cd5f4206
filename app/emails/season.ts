import { type Letter, letter } from "./letter.ts";

type To = { toName: string; toAddress: string };
type Occasion = To & { townName: string; season: string; address: string };

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

/** To the town, when its season comes back with a note. */
export function seasonReturnedLetter({ townName, season, address, note, ...to }: Occasion & { note: string }): Letter {
  return letter({
    ...to,
    subject: `${season} of ${townName} comes back with a question`,
    paragraphs: [
      `The coordinator has looked at the figures of ${townName} for ${season} and asks:`,
      note,
      "Nothing is lost. Correct what needs it, and send the season in again.",
    ],
    link: { label: "Open the season", address },
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
