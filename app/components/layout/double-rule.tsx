import type { ReactNode } from "react";

/** The head of every page: one line of words on a thick rule over a thin one, as over a timetable. */
export function DoubleRule({ children }: { children: ReactNode }) {
  return (
    <div className="border-b border-line pb-[3px] print:hidden">
      <div className="border-b-4 border-line">
        <div className="mx-auto flex min-h-13 w-full max-w-column items-stretch gap-7 px-4 sm:px-8">{children}</div>
      </div>
    </div>
  );
}

export const brandClass =
  "flex min-h-target items-center gap-2 self-center text-l font-bold tracking-[-0.01em] text-asphalt no-underline md:mr-2";
