import type { ReactNode } from "react";
import { SkipLink } from "#app/components/layout/skip-link.tsx";

export type StandingWords = { words: string; isOnPhoneOnly: boolean };
type StepLink = { group: string; to: string; isDone: boolean; isCurrent: boolean };

type Props = {
  title: string;
  standing: StandingWords | null;
  steps: readonly StepLink[];
  onStep?: (to: string) => void;
  children: ReactNode;
  foot?: ReactNode;
};

/** The worksheet's own frame: what is weighed, where it is kept, how far one is. The application's bar would take the room. */
export function SheetFrame({ title, standing, steps, onStep, children, foot }: Props) {
  return (
    <div className="mx-auto flex min-h-dvh w-full max-w-[34rem] flex-col text-head leading-normal">
      <SkipLink />
      <header>
        <div className="flex items-center gap-1 border-b-[3px] border-line pr-4 pl-1">
          <a
            href="/fleet/worksheets"
            aria-label="All worksheets"
            className="grid size-12 flex-none place-items-center text-asphalt"
          >
            <svg viewBox="0 0 10 16" aria-hidden="true" className="h-4 w-2.5 fill-none stroke-current stroke-2">
              <path d="M8.5 1.5 2 8l6.5 6.5" />
            </svg>
          </a>
          <p className="font-bold whitespace-nowrap">{title}</p>
          {standing && (
            <p
              role="status"
              className="ml-auto flex items-center gap-1.5 text-right text-note leading-tight text-gravel"
            >
              <svg viewBox="0 0 10 10" aria-hidden="true" className="size-2.5 flex-none">
                <circle
                  cx="5"
                  cy="5"
                  r="4"
                  className={
                    standing.isOnPhoneOnly ? "fill-none stroke-gravel stroke-2" : "fill-spruce stroke-spruce stroke-2"
                  }
                />
              </svg>
              {standing.words}
            </p>
          )}
        </div>
        {steps.length > 0 && (
          <nav aria-label="Steps" className="border-b border-rule">
            <ol className="flex justify-between px-4 text-note">
              {steps.map(({ group, to, isDone, isCurrent }) => (
                <li key={group}>
                  <a
                    href={`#${to}`}
                    onClick={(event) => {
                      if (!onStep || event.metaKey || event.ctrlKey) return;
                      event.preventDefault();
                      onStep(to);
                    }}
                    aria-current={isCurrent ? "step" : undefined}
                    className={`flex min-h-11 items-center gap-1 no-underline ${isCurrent ? "font-bold text-asphalt" : isDone ? "text-spruce" : "text-gravel"}`}
                  >
                    {isDone && (
                      <svg
                        viewBox="0 0 12 10"
                        aria-hidden="true"
                        className="h-2.5 w-3 fill-none stroke-current stroke-2"
                      >
                        <path d="M1 5l3.5 3.5L11 1" />
                      </svg>
                    )}
                    {group}
                    {isDone && <span className="sr-only">, done</span>}
                  </a>
                </li>
              ))}
            </ol>
          </nav>
        )}
      </header>
      <main id="main" tabIndex={-1} className="flex-1 px-4 pt-3.5 pb-6">
        {children}
      </main>
      {foot !== undefined && (
        <footer className="sticky bottom-0 border-t border-rule bg-salt px-4 pt-2.5 pb-[max(0.75rem,env(safe-area-inset-bottom))]">
          {foot}
        </footer>
      )}
    </div>
  );
}

/** The one way on. */
export function FootButton({ children, onClick }: { children: ReactNode; onClick: () => void }) {
  return (
    <button
      type="button"
      onClick={onClick}
      className="min-h-13.5 w-full touch-manipulation rounded-field bg-spruce px-4 text-[1.125rem] leading-tight font-semibold text-on-spruce hover:bg-spruce-deep active:bg-asphalt active:text-salt"
    >
      {children}
    </button>
  );
}
