import type { Finding } from "#app/domain/finding.ts";

/** The question to begin with, made from what the checks found; "" when they found nothing. */
export function draftedQuestion(findings: readonly Finding[]): string {
  const [first] = findings;
  if (first === undefined) return "";
  return `${first.message} Please correct it, or say that it is right, and send the season again.`;
}
