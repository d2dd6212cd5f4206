import type { RateSentencePart } from "#app/domain/calibration/rate-sheet.ts";
import { InBand, Over, Under } from "#app/components/ui/state-mark.tsx";

/** What the rates mean, with the place against the band marked. */
export function RateSentence({ parts }: { parts: readonly RateSentencePart[] }) {
  return parts.map(({ words, tone }) => {
    if (tone === "over") return <Over key={words}>{words}</Over>;
    if (tone === "under") return <Under key={words}>{words}</Under>;
    if (tone === "in") return <InBand key={words}>{words}</InBand>;
    return words;
  });
}
