import { InBand, Over, Under } from "#app/components/ui/state-mark.tsx";
import type { RateSentence } from "#app/domain/calibration/rate-sheet.ts";

/** A sentence of the domain with its shapes: what is over, under or in the band carries its mark. */
export function BandSentenceWords({ sentence }: { sentence: RateSentence }) {
  return sentence.parts.map(({ words, tone }, position) => {
    const key = `${position} ${words}`;
    if (tone === "over") return <Over key={key}>{words}</Over>;
    if (tone === "under") return <Under key={key}>{words}</Under>;
    if (tone === "in") return <InBand key={key}>{words}</InBand>;
    return <span key={key}>{words}</span>;
  });
}
