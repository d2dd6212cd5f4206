import type { ReactNode } from "react";
import { Link } from "react-router";

export type Kind = {
  key: string;
  count: number;
  label: string;
  detail?: ReactNode;
  /** Where this kind is dealt with. */
  to?: string;
  isCurrent?: boolean;
  isDone?: boolean;
};

/** How many of each kind: the summary beside a list of what is to be put right. */
export function Kinds({ label, kinds }: { label: string; kinds: readonly Kind[] }) {
  return (
    <ol
      aria-label={label}
      className="grid grid-cols-[minmax(2.2rem,auto)_minmax(0,1fr)] gap-x-4 border-t-2 border-line"
    >
      {kinds.map((kind) => (
        <li
          key={kind.key}
          aria-current={kind.isCurrent === true ? "true" : undefined}
          className={`relative col-span-2 grid grid-cols-subgrid border-b border-rule py-2.25 leading-[1.3] aria-[current=true]:before:absolute aria-[current=true]:before:inset-x-0 aria-[current=true]:before:-top-0.75 aria-[current=true]:before:h-1.25 aria-[current=true]:before:bg-spruce ${kind.isDone === true ? "text-gravel" : ""}`}
        >
          <b className="text-l leading-[1.15] tabular-nums">{kind.count.toLocaleString("en-US")}</b>
          <span className={kind.isCurrent === true ? "font-bold" : ""}>
            {kind.to === undefined ? (
              kind.label
            ) : (
              <Link to={kind.to} className="text-inherit no-underline underline-offset-4 hover:underline">
                {kind.label}
              </Link>
            )}
            {kind.detail !== undefined && (
              <span className="block text-note font-normal text-gravel">{kind.detail}</span>
            )}
          </span>
        </li>
      ))}
    </ol>
  );
}
