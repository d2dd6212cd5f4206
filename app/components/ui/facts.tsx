import type { ReactNode } from "react";

export type Fact = { name: string; value: ReactNode };

/** Facts beside a picture: one a line, the figure in weight. */
export function Facts({ facts }: { facts: readonly Fact[] }) {
  return (
    <dl className="text-note max-md:flex max-md:flex-wrap max-md:gap-x-4">
      {facts.map((fact) => (
        <div key={fact.name}>
          <dt className="inline text-gravel">{fact.name}</dt> <dd className="inline font-semibold">{fact.value}</dd>
        </div>
      ))}
    </dl>
  );
}
