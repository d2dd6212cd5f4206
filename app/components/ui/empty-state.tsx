import type { ReactNode } from "react";

type Props = {
  /** What belongs here. */
  title: string;
  /** How to put it in. */
  children: ReactNode;
  action?: ReactNode;
};

/** An empty stretch of road: says what belongs here and how to put it in. */
export function EmptyState({ title, children, action }: Props) {
  return (
    <section className="mt-8 max-w-measure">
      <svg viewBox="0 0 544 26" aria-hidden="true" className="mb-4 block h-6.5 w-full" preserveAspectRatio="none">
        <rect width="544" height="26" className="fill-lane" />
        <path d="M0 2.75h544M0 23.25h544" className="stroke-lane-edge" strokeWidth="1.5" />
        <path d="M7 13h544" className="stroke-lane-paint" strokeWidth="2.5" strokeDasharray="18 14" />
      </svg>
      <h2 className="text-l font-semibold">{title}</h2>
      <div className="mt-1 text-pretty text-gravel">{children}</div>
      {action !== undefined && <div className="mt-4">{action}</div>}
    </section>
  );
}
