import type { LaneStripSpec, ShownPeers } from "./lane-strip-spec.ts";
import { heapColumnWords, isOwnHeap } from "./lane-strip-words.ts";
import { townsInHeap } from "./lane-strip-spec.ts";

type Props = { spec: LaneStripSpec; peers: ShownPeers; title: string };

/** The figures the strip is drawn from. Laid along the lane where there is room, as rows on a phone. */
export function HeapTable({ spec, peers, title }: Props) {
  const towns = peers.heapKind === "bars" ? "towns, about" : "towns";
  const cells = peers.heaps.map((heap) => ({
    words: heapColumnWords(heap, spec),
    townCount: townsInHeap(peers, heap),
    isOurs: isOwnHeap(heap, spec.own),
  }));
  return (
    <div className="@container">
      <table className="hidden w-full border-collapse text-center text-note leading-tight @min-[52rem]:table">
        <caption className="sr-only">{`${title}: towns by range`}</caption>
        <thead>
          <tr className="border-b-2 border-line align-bottom">
            <th scope="col" className="py-1.5 pr-2 text-left font-semibold">
              {spec.unit}
            </th>
            {cells.map((cell) => (
              <th
                key={cell.words}
                scope="col"
                className={`${column} font-semibold ${cell.isOurs ? "bg-spruce-wash" : ""}`}
              >
                {cell.words}
              </th>
            ))}
          </tr>
        </thead>
        <tbody>
          <tr className="border-b border-line align-baseline">
            <th scope="row" className="py-1.5 pr-2 text-left font-semibold">
              {towns}
            </th>
            {cells.map((cell) => (
              <td key={cell.words} className={`${column} ${cell.isOurs ? "bg-spruce-wash font-bold" : ""}`}>
                {cell.townCount}
                {cell.isOurs && <span className="block font-semibold">with you</span>}
              </td>
            ))}
          </tr>
        </tbody>
      </table>
      <table className="w-full border-collapse text-table @min-[52rem]:hidden">
        <caption className="sr-only">{`${title}: towns by range`}</caption>
        <thead>
          <tr className="border-b-2 border-line">
            <th scope="col" className="py-1.5 text-left font-semibold">
              {spec.unit}
            </th>
            <th scope="col" className="py-1.5 text-right font-semibold">
              {towns}
            </th>
          </tr>
        </thead>
        <tbody>
          {cells.map((cell) => (
            <tr
              key={cell.words}
              className={`border-b border-rule last:border-line ${cell.isOurs ? "bg-spruce-wash font-bold" : ""}`}
            >
              <th scope="row" className="py-1.5 text-left font-normal">
                {cell.words}
                {cell.isOurs && <span className="font-semibold"> · with you</span>}
              </th>
              <td className="py-1.5 text-right">{cell.townCount}</td>
            </tr>
          ))}
        </tbody>
      </table>
    </div>
  );
}

const column = "border-l border-rule px-1 py-1.5";
