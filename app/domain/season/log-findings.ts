import type { Finding } from "../finding.ts";
import { lbToShortTons } from "../units.ts";
import type { SeasonDraft } from "./season-from-log.ts";
import type { SeasonAmounts } from "./season-totals.ts";

/** Differences that ask for a look. Choices of ours. */
const mostRoadShare = 0.05;
const mostWeightShare = 0.1;
const mostEvents = 2;

function oneDecimal(value: number) {
  return value.toLocaleString("en-US", { maximumFractionDigits: 1 });
}

/**
 * Whether the figures reported agree with what the town itself wrote down of roads, storms and piles.
 *
 * @param amounts - as reported
 * @param draft - as roads, storms and piles have it
 * @returns a check for each figure that differs; none where nothing was written down to compare with
 */
export function logFindings(amounts: SeasonAmounts, draft: SeasonDraft): Finding[] {
  const findings: Finding[] = [];
  const add = (code: string, field: string, message: string) =>
    findings.push({ code, severity: "check", field, message });
  const roads = draft.laneMiles;
  if (roads !== null && Math.abs(amounts.laneMiles - roads) > mostRoadShare * roads) {
    const message = `${oneDecimal(amounts.laneMiles)} lane miles are reported; the roads by class come to ${oneDecimal(roads)}.`;
    add("unlike-roads", "laneMiles", message);
  }
  if (draft.eventCount > 0 && Math.abs(amounts.eventCount - draft.eventCount) > mostEvents) {
    add(
      "unlike-log",
      "eventCount",
      `${amounts.eventCount} events are reported; the storm log has ${draft.eventCount}. Call-outs are not events.`,
    );
  }
  const hasBasis = draft.eventCount > 0 || draft.fromPiles.length > 0;
  const weights = [
    ["saltLb", "salt", amounts.saltLb, draft.saltLb],
    ["mixLb", "mix", amounts.mixLb, draft.mixLb],
    ["sandLb", "sand and grit", amounts.sandLb, draft.sandLb],
  ] as const;
  for (const [field, name, reported, written] of hasBasis ? weights : []) {
    const larger = Math.max(reported, written);
    if (larger === 0 || Math.abs(reported - written) <= mostWeightShare * larger) continue;
    const message = `${oneDecimal(lbToShortTons(reported))} tons of ${name} are reported; storms and stock come to ${oneDecimal(lbToShortTons(written))}.`;
    add("unlike-log", field, message);
  }
  return findings;
}
