import { type ReactNode, useId, useState } from "react";
import { Facts } from "#app/components/ui/facts.tsx";
import { SideBySide } from "#app/components/ui/side-by-side.tsx";
import { TextLink } from "#app/components/ui/text-link.tsx";
import { HeapTable } from "./heap-table.tsx";
import { LaneReadout } from "./lane-readout.tsx";
import type { LaneStripSpec } from "./lane-strip-spec.ts";
import { figureWords, heapWords, markWords } from "./lane-strip-words.ts";
import { StaticStrip } from "./static-strip.tsx";
import { useLiveStrip } from "./use-live-strip.ts";

type Props = {
  spec: LaneStripSpec;
  title: string;
  /** Said above the strip, where a page has more than one answer. */
  sentence?: ReactNode;
  /** Further facts beside the strip, after those of the peers. */
  facts?: readonly { name: string; value: ReactNode }[];
  /** Said under the table: tenths, rounding, how the figures are protected. */
  tableNote?: ReactNode;
  downloadTo?: string;
  isTableOpen?: boolean;
};

/** One row of a comparison: what it is on the left, the strip on the right, the table that proves it behind a toggle. */
export function LaneStrip(props: Props) {
  const { spec, title, sentence, facts = [] } = props;
  const headingId = useId();
  const side = (
    <>
      <h2 id={headingId} className="text-head leading-tight font-bold">
        {title}
      </h2>
      <p className="mb-1 text-note text-gravel">{spec.unit}</p>
      <Facts facts={[...peerFacts(spec), ...facts]} />
    </>
  );
  return (
    <SideBySide side={side} hasRule>
      {sentence !== undefined && <p className="mb-2 max-w-measure text-pretty">{sentence}</p>}
      <figure aria-labelledby={headingId}>
        <StripPicture spec={spec} title={title} />
      </figure>
      <StripTable {...props} />
    </SideBySide>
  );
}

/** The strip alone, for pages that say the rest in their own words. Static first, alive once the page is. */
function StripPicture({ spec, title }: Pick<Props, "spec" | "title">) {
  const { frame, layout } = useLiveStrip(spec);
  const [at, setAt] = useState<number | null>(null);
  const peers = spec.peers.state === "shown" ? spec.peers : null;
  const heap = at === null ? undefined : peers?.heaps[at];
  const quiet = markWords(spec);

  return (
    <div className="@container">
      <div className="relative">
        {layout === null && (
          <>
            <StaticStrip spec={spec} size="phone" className="max-w-120 @min-[45rem]:hidden" />
            <StaticStrip spec={spec} size="desk" className="hidden @min-[45rem]:block" />
          </>
        )}
        <div ref={frame} />
        {layout !== null && peers !== null && peers.heaps.length > 0 && (
          <LaneReadout spec={spec} peers={peers} layout={layout} title={title} at={at} onMove={setAt} />
        )}
      </div>
      {quiet !== null && (
        <p className="mt-2 flex min-h-target items-start pr-28 text-note text-gravel print:min-h-0">
          {heap === undefined || peers === null ? (
            quiet
          ) : (
            <b className="font-semibold text-asphalt">{heapWords(heap, peers, spec)}</b>
          )}
        </p>
      )}
    </div>
  );
}

/** The toggle stands at the end of the line under the strip. Without heaps there is no table, and the facts say it all. */
function StripTable({ spec, title, tableNote, downloadTo, isTableOpen = false }: Props) {
  const peers = spec.peers.state === "shown" && spec.peers.heaps.length > 0 ? spec.peers : null;
  const footnote =
    tableNote === undefined && downloadTo === undefined ? null : (
      <p className="mt-2 mb-1 text-note text-gravel">
        {tableNote}{" "}
        {downloadTo !== undefined && (
          <TextLink to={downloadTo} isDocument className="print:hidden">
            Download these figures (CSV)
          </TextLink>
        )}
      </p>
    );
  if (peers === null) return footnote;
  return (
    <details open={isTableOpen} className="open-on-paper group -mt-11 print:mt-0">
      <summary className="relative -top-2.5 ml-auto flex min-h-target w-fit list-none items-center text-note font-semibold text-spruce underline decoration-1 underline-offset-3 hover:decoration-2 print:hidden">
        <span className="group-open:hidden">Table</span>
        <span className="hidden group-open:inline">Hide the table</span>
        <span className="sr-only">: {title}</span>
      </summary>
      <HeapTable spec={spec} peers={peers} title={title} />
      {footnote}
    </details>
  );
}

function peerFacts(spec: LaneStripSpec) {
  if (spec.peers.state === "withheld")
    return [{ name: "peers", value: `hidden to protect members: ${spec.peers.reason}` }];
  const { median, interval, middleHalf } = spec.peers;
  const words = (value: number) => figureWords(value, spec);
  const range = ({ low, high }: { low: number; high: number }) => `${words(low)}–${words(high)}`;
  return [
    { name: "median", value: words(median) },
    ...(interval === null ? [] : [{ name: "likely", value: range(interval) }]),
    ...(middleHalf === null ? [] : [{ name: "middle half", value: range(middleHalf) }]),
    { name: "from", value: spec.townCountWords },
  ];
}
