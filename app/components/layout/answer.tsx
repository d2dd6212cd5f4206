import type { ReactNode } from "react";
import { WholeSeasons } from "./whole-seasons.tsx";

/** The sentence a page opens with: it answers the question one came with, in words computed from the data. */
export function Answer({ children }: { children: ReactNode }) {
  return (
    <h1 className="max-w-answer text-xl font-semibold tracking-[-0.012em] text-balance sm:text-2xl">
      <WholeSeasons>{children}</WholeSeasons>
    </h1>
  );
}

/** What stands behind the answer, said quietly: how it was got, from when, what it leaves out. */
export function Method({ children }: { children: ReactNode }) {
  return <p className="mt-3 max-w-method text-pretty text-gravel">{children}</p>;
}

/** A section head on its thick rule. */
export function Heading({ children, id }: { children: ReactNode; id?: string }) {
  return (
    <h2 id={id} className="mt-10 mb-3 border-t-2 border-line pt-2 text-l leading-snug font-bold">
      {children}
    </h2>
  );
}
