import type { LaneStripSpec, ShownPeers } from "./lane-strip-spec.ts";
import { heapColumnWords, isOwnHeap } from "./lane-strip-words.ts";
import { townsInHeap } from "./lane-strip-spec.ts";

type Props = { spec: LaneStripSpec; peers: ShownPeers; title: string };

/** The figures the strip is drawn from. Laid along the lane where there is room, as rows on a phone. */
export function HeapTable({ spec, peers, title }: Props) {
  return (
    <div className="@container">
      <table className="heap-table">
        <caption className="sr-only">{`${title}: towns by range`}</caption>
        <thead>
          <tr>
            <th scope="col">{spec.unit}</th>
            <th scope="col">{peers.heapKind === "bars" ? "towns, about" : "towns"}</th>
          </tr>
        </thead>
        <tbody>
          {peers.heaps.map((heap) => {
            const words = heapColumnWords(heap, spec);
            const isOurs = isOwnHeap(heap, spec.own);
            return (
              <tr key={words} className={isOurs ? "heap-table-ours" : undefined}>
                <th scope="row">{words}</th>
                <td>
                  {townsInHeap(peers, heap)}
                  {isOurs && <span> with you</span>}
                </td>
              </tr>
            );
          })}
        </tbody>
      </table>
    </div>
  );
}
