import type { ReactNode } from "react";

type Props = {
  /** What would happen, with counts. */
  summary: ReactNode;
  /** The one button, and at most one quiet way out. */
  children: ReactNode;
  /** The id a waiting button points to for its reason. */
  summaryId?: string;
  /** Names the landmark. */
  label?: string;
};

/** Stays at the foot of a long page with the counts and the one decision. Sits above the bottom bar of a phone. */
export function Dock({ summary, children, summaryId, label = "What is left, and the decision" }: Props) {
  return (
    <section
      aria-label={label}
      className="sticky bottom-[3.9rem] z-10 border-t border-line bg-salt pt-[3px] sm:bottom-0 print:static print:hidden"
    >
      <div className="border-t-4 border-line">
        <div className="mx-auto flex w-full max-w-column flex-wrap items-center gap-x-5 gap-y-1 px-4 py-2.5 max-sm:justify-between sm:px-8 sm:py-3.5">
          <p id={summaryId} className="mr-auto max-sm:w-full">
            {summary}
          </p>
          {children}
        </div>
      </div>
    </section>
  );
}
