import { InBand, Over, Under } from "#app/components/ui/state-mark.tsx";
import type { Sentence } from "#app/domain/peers/sentence.ts";

/** A sentence whose place against the band carries its shape and colour. */
export function ToneWords({ sentence }: { sentence: Sentence }) {
  return sentence.parts.map(({ words, tone }) => {
    if (tone === "over") return <Over key={words}>{words}</Over>;
    if (tone === "under") return <Under key={words}>{words}</Under>;
    if (tone === "in") return <InBand key={words}>{words}</InBand>;
    return words;
  });
}
