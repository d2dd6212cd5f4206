import { type KeyboardEvent, type PointerEvent } from "react";
import type { StripLayout } from "./lane-strip-layout.ts";
import type { Heap, LaneStripSpec, ShownPeers } from "./lane-strip-spec.ts";
import { heapWords } from "./lane-strip-words.ts";

type Props = {
  spec: LaneStripSpec;
  peers: ShownPeers;
  layout: StripLayout;
  title: string;
  /** Position of the heap under the pointer, or null. */
  at: number | null;
  onMove: (at: number | null) => void;
};

/** Lies over the lane and is a slider of its heaps: a finger, a pointer or the arrow keys read one after the other. */
export function LaneReadout({ spec, peers, layout, title, at, onMove }: Props) {
  const { heaps } = peers;
  const last = heaps.length - 1;
  const heap = at === null ? undefined : heaps[at];

  function readPointer(event: PointerEvent<HTMLDivElement>) {
    const box = event.currentTarget.getBoundingClientRect();
    const share = (event.clientX - box.left) / Math.max(1, box.width);
    const value = spec.axis.from + share * (spec.axis.to - spec.axis.from);
    const found = heaps.findIndex((each) => each.to === null || value < each.to);
    onMove(found === -1 ? last : found);
  }

  function readKey(event: KeyboardEvent<HTMLDivElement>) {
    const to = keyTarget(event.key, at, last);
    if (to === undefined) return;
    event.preventDefault();
    onMove(to);
  }

  return (
    <div
      role="slider"
      tabIndex={0}
      aria-label={`${title}: read the lane heap by heap`}
      aria-orientation="horizontal"
      aria-valuemin={1}
      aria-valuemax={heaps.length}
      aria-valuenow={(at ?? 0) + 1}
      aria-valuetext={heap === undefined ? "nothing read yet" : heapWords(heap, peers, spec)}
      onPointerMove={readPointer}
      onPointerDown={readPointer}
      onPointerLeave={() => onMove(null)}
      onKeyDown={readKey}
      onBlur={() => onMove(null)}
      className="absolute inset-0 cursor-crosshair touch-pan-y print:hidden"
    >
      {heap !== undefined && <Highlight heap={heap} layout={layout} />}
    </div>
  );
}

function Highlight({ heap, layout }: { heap: Heap; layout: StripLayout }) {
  const left = heap.from === null ? 0 : layout.x(heap.from);
  const right = heap.to === null ? layout.width : layout.x(heap.to);
  return (
    <svg viewBox={`0 0 ${layout.width} ${layout.height}`} aria-hidden="true" className="block w-full">
      <rect
        x={left + 1}
        y={layout.centreY + 1}
        width={Math.max(0, right - left - 2)}
        height={layout.laneBottom - layout.centreY - 2}
        rx="2"
        className="fill-lane-paint/15 stroke-lane-paint"
        strokeWidth="2"
      />
    </svg>
  );
}

/** Where a key leads; undefined leaves the key to the page. */
function keyTarget(key: string, at: number | null, last: number) {
  if (key === "ArrowRight" || key === "ArrowUp") return at === null ? 0 : Math.min(last, at + 1);
  if (key === "ArrowLeft" || key === "ArrowDown") return at === null ? last : Math.max(0, at - 1);
  if (key === "Home") return 0;
  if (key === "End") return last;
  if (key === "Escape") return null;
  return undefined;
}
