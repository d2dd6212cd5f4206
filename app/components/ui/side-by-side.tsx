import type { ReactNode } from "react";

type Props = { side: ReactNode; children: ReactNode; hasRule?: boolean };

/** A side-head and what it heads. Stacks where there is no room for both. */
export function SideBySide({ side, children, hasRule = false }: Props) {
  return (
    <div
      className={`grid gap-x-7 gap-y-3 md:grid-cols-[var(--spacing-side)_minmax(0,1fr)] ${hasRule ? "border-b border-rule pt-4.5 pb-3" : "mt-6"}`}
    >
      <div className="min-w-0">{side}</div>
      <div className="min-w-0">{children}</div>
    </div>
  );
}

/** The work on the left, what one wants to glance at on the right. */
export function WithMargin({ margin, children }: { margin: ReactNode; children: ReactNode }) {
  return (
    <div className="mt-7 grid gap-x-14 gap-y-8 lg:grid-cols-[minmax(0,1fr)_19.5rem]">
      <div className="min-w-0">{children}</div>
      <aside className="min-w-0 text-table">{margin}</aside>
    </div>
  );
}

/** One section of the margin, under its own rule. */
export function MarginSection({ title, children }: { title: string; children: ReactNode }) {
  return (
    <section className="mb-7">
      <h2 className="border-t-2 border-line pt-1.5 text-table font-bold">{title}</h2>
      {children}
    </section>
  );
}
