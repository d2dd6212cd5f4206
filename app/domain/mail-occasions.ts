/** What the network writes mail about, and to whom. */
export const mailOccasions = [
  "season-opened",
  "season-reminder",
  "season-returned",
  "season-question",
  "season-accepted",
  "season-sent",
  "edition-published",
] as const;
export type MailOccasion = (typeof mailOccasions)[number];

/** Each occasion as a person chooses it. */
export const mailOccasionWords: Record<MailOccasion, string> = {
  "season-opened": "a season is opened for figures",
  "season-reminder": "the figures of my town are due soon and not sent in",
  "season-returned": "the coordinator sends my town’s season back",
  "season-question": "the coordinator asks something about my town’s season, or a town answers",
  "season-accepted": "my town’s season is accepted",
  "season-sent": "a town sends its season in",
  "edition-published": "an edition is published",
};

const byRole = {
  recorder: ["season-opened", "season-reminder", "season-returned"],
  director: [
    "season-opened",
    "season-reminder",
    "season-returned",
    "season-question",
    "season-accepted",
    "edition-published",
  ],
  coordinator: ["season-sent", "season-question"],
  analyst: [],
} as const satisfies Record<string, readonly MailOccasion[]>;

/** The occasions on which people of a role are written to. */
export function occasionsOf(role: keyof typeof byRole): readonly MailOccasion[] {
  return byRole[role];
}
