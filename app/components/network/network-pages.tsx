import { NavLink } from "react-router";

const pages = [
  { label: "Overview", to: "/network" },
  { label: "Review", to: "/network/review" },
  { label: "Editions", to: "/network/editions" },
  { label: "People", to: "/network/people" },
  { label: "Mail", to: "/network/mail" },
  { label: "Trail", to: "/network/audit" },
];

/** The coordinator's pages, under the page's answer. */
export function NetworkPages() {
  return (
    <nav aria-label="Network" className="mb-6 border-b border-rule print:hidden">
      <ul className="-mb-px flex flex-wrap justify-between gap-x-2 max-sm:text-note sm:justify-start sm:gap-x-6">
        {pages.map(({ label, to }) => (
          <li key={to}>
            <NavLink
              to={to}
              end={to === "/network"}
              className="relative flex min-h-target items-center text-gravel no-underline underline-offset-4 hover:underline aria-[current=page]:font-bold aria-[current=page]:text-asphalt aria-[current=page]:no-underline aria-[current=page]:after:absolute aria-[current=page]:after:inset-x-0 aria-[current=page]:after:-bottom-0.5 aria-[current=page]:after:h-1.25 aria-[current=page]:after:bg-spruce"
            >
              {label}
            </NavLink>
          </li>
        ))}
      </ul>
    </nav>
  );
}
