import { NavLink } from "react-router";

export type SubPage = { label: string; to: string; isOwnAddressOnly?: boolean };

/** The pages of one area, under the page's answer. The one that is open is underlined and in weight. */
export function SubPages({ label, pages }: { label: string; pages: readonly SubPage[] }) {
  return (
    <nav aria-label={label} className="mb-6 border-b border-rule print:hidden">
      <ul className="-mb-px flex flex-wrap justify-between gap-x-2 max-sm:text-note sm:justify-start sm:gap-x-6">
        {pages.map((page) => (
          <li key={page.to}>
            <NavLink
              to={page.to}
              end={page.isOwnAddressOnly === true}
              className="relative flex min-h-target items-center text-gravel no-underline underline-offset-4 hover:underline aria-[current=page]:font-bold aria-[current=page]:text-asphalt aria-[current=page]:no-underline aria-[current=page]:after:absolute aria-[current=page]:after:inset-x-0 aria-[current=page]:after:-bottom-0.5 aria-[current=page]:after:h-1.25 aria-[current=page]:after:bg-spruce"
            >
              {page.label}
            </NavLink>
          </li>
        ))}
      </ul>
    </nav>
  );
}
