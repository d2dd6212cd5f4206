import type { Finding } from "../finding.ts";

/** How much each check weighs in the coordinator's queue. A choice of ours; what is not named weighs 1. */
const weights: Record<string, number> = {
  "unlike-earlier": 6,
  "unlike-all": 5,
  "pile-grew": 5,
  "much-salt": 4,
  "unlike-winter": 3,
  "cost-per-ton": 3,
  "lane-miles-changed": 2,
  "unlike-roads": 2,
  "unlike-log": 2,
  "stock-unexplained": 2,
};
const errorWeight = 10;

function weightOf({ severity, code }: Finding) {
  return severity === "error" ? errorWeight : (weights[code] ?? 1);
}

/** How doubtful a season is: the weights of what the checks found, together; 0 when they found nothing. */
export function doubtOf(findings: readonly Finding[]): number {
  return findings.reduce((sum, finding) => sum + weightOf(finding), 0);
}

/** The findings with the heaviest first; equal ones stay in their order. */
export function heaviestFirst(findings: readonly Finding[]): Finding[] {
  return findings.toSorted((a, b) => weightOf(b) - weightOf(a));
}
