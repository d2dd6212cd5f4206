import type { ReactNode } from "react";

type Props = {
  children: ReactNode;
  /** Set on pages of signed-in people: leaves room for the bottom bar of a phone. */
  hasBottomBar?: boolean;
  className?: string;
};

/** One column of at most 72rem, the only one a page has. */
export function Page({ children, hasBottomBar = true, className = "" }: Props) {
  const bottom = hasBottomBar ? "pb-28 sm:pb-12" : "pb-12";
  return (
    <main
      id="main"
      tabIndex={-1}
      className={`mx-auto w-full max-w-column px-4 pt-6 sm:px-8 sm:pt-8 print:p-0 ${bottom} ${className}`}
    >
      {children}
    </main>
  );
}
