import { useId } from "react";
import type { StripParts } from "./lane-strip-spec.ts";

type Props = {
  /** From `stripParts`, so that the key names only what is drawn. */
  parts: Pick<StripParts, "hasPlate" | "hasInterval" | "hasMiddleHalf" | "heaps" | "hasFlag" | "townsPerMark">;
  hasBand: boolean;
};

/** How to read a strip, once a page. */
export function StripKey({ parts, hasBand }: Props) {
  const hatchId = useId();
  return (
    <ul
      aria-label="How to read a strip"
      className="mt-3.5 mb-1 flex flex-wrap items-center gap-x-6 gap-y-1 text-note text-gravel"
    >
      {hasBand && (
        <Item words="rule-of-thumb band">
          <defs>
            <pattern id={hatchId} width="7" height="7" patternUnits="userSpaceOnUse" patternTransform="rotate(45)">
              <rect width="2.4" height="7" className="fill-lane-hatch" />
            </pattern>
          </defs>
          <rect width="30" height="16" fill={`url(#${hatchId})`} />
        </Item>
      )}
      {parts.hasPlate && (
        <Item words="median, in the break of the centre line">
          <path d="M0 8h8M22 8h8" className="stroke-lane-paint" strokeWidth="2" />
          <rect x="10" y="3" width="10" height="10" rx="1" className="fill-none stroke-lane-paint" strokeWidth="1.4" />
        </Item>
      )}
      {parts.hasInterval && (
        <Item words="where the median likely lies">
          <path d="M4 8h22M4 3.5v9M26 3.5v9" className="fill-none stroke-lane-paint" strokeWidth="2" />
        </Item>
      )}
      {parts.hasMiddleHalf && (
        <Item words="middle half of the towns">
          <path d="M3 2.5h24v4H3zM3 9.5h24v4H3z" className="fill-lane-track" />
          <path d="M3 2v5M27 2v5M3 9v5M27 9v5" className="stroke-lane-edge" strokeWidth="1.5" />
        </Item>
      )}
      {parts.heaps === "grains" && (
        <Item words="one town each, never fewer than three together">
          {[8, 15, 22].map((x) => (
            <circle key={x} cx={x} cy="8" r="2.8" className="fill-lane-paint" />
          ))}
        </Item>
      )}
      {parts.heaps === "bars" && (
        <Item words={`about ${parts.townsPerMark} towns each`}>
          <rect x="6" y="5" width="18" height="6" rx="3" className="fill-lane-paint" />
        </Item>
      )}
      {parts.hasFlag && (
        <li className="flex items-center gap-1.75">
          <svg width="22" height="16" aria-hidden="true" className="block flex-none">
            <path d="M2 0v16" className="stroke-spruce" strokeWidth="2.5" />
            <path d="M2 1h18l-4 4.5 4 4.5H2z" className="fill-spruce" />
          </svg>
          you
        </li>
      )}
    </ul>
  );
}

function Item({ words, children }: { words: string; children: React.ReactNode }) {
  return (
    <li className="flex items-center gap-1.75">
      <svg width="30" height="16" aria-hidden="true" className="block flex-none">
        <rect width="30" height="16" className="fill-lane" />
        {children}
      </svg>
      {words}
    </li>
  );
}
