import type { DueReason, DueReasonCode } from "#app/domain/calibration/due.ts";
import { formatShortDay } from "#app/lib/format.ts";

export type DueStateOfLine = DueReason["state"];

export const dueWords: Record<DueStateOfLine, string> = {
  "in-date": "in date",
  due: "due",
  overdue: "overdue",
  never: "never weighed",
};

const reasons: Record<DueReasonCode, (since: string) => string> = {
  "never-calibrated": () => "",
  "work-done": (since) => `worked on ${since}`,
  "new-material": (since) => `new material since ${since}`,
  "new-season": () => "last weighed in an earlier season",
};

/** Why it is due, in a few words; "" when the state says it all. */
export function dueReasonWords({ reason, dueSince }: DueReason): string {
  return reason === null ? "" : reasons[reason](dueSince === null ? "" : formatShortDay(dueSince));
}

const urgency: Record<DueStateOfLine, number> = { overdue: 3, due: 2, never: 1, "in-date": 0 };

/** The most urgent of several, or null of none. */
export function mostUrgent(dues: readonly DueReason[]): DueReason | null {
  return [...dues].sort((a, b) => urgency[b.state] - urgency[a.state])[0] ?? null;
}

/** For sorting: the larger the sooner. */
export function urgencyOf(due: DueReason | null): number {
  return due === null ? -1 : urgency[due.state];
}
