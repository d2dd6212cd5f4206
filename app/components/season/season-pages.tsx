import { NavLink } from "react-router";

const look =
  "relative flex min-h-target items-center text-gravel no-underline underline-offset-4 hover:underline aria-[current=page]:font-bold aria-[current=page]:text-asphalt aria-[current=page]:no-underline aria-[current=page]:after:absolute aria-[current=page]:after:inset-x-0 aria-[current=page]:after:-bottom-0.5 aria-[current=page]:after:h-1.25 aria-[current=page]:after:bg-spruce";

/** The pages of a season, under the page's answer. */
export function SeasonPages({ seasonStartYear }: { seasonStartYear: number }) {
  const season = `/season/${seasonStartYear}`;
  const pages = [
    { label: "Return", to: season },
    { label: "Figures", to: `${season}/figures` },
    { label: "Storms", to: `${season}/storms` },
    { label: "Stock", to: `${season}/stock` },
    { label: "Winter", to: `${season}/winter` },
    { label: "Roads", to: "/season/roads" },
    { label: "Materials", to: "/season/materials" },
    { label: "Uploads", to: "/uploads" },
  ];
  return (
    <nav aria-label="Season" className="mt-5 mb-6 border-b border-rule print:hidden">
      <ul className="-mb-px flex flex-wrap gap-x-6">
        {pages.map(({ label, to }) => (
          <li key={to}>
            <NavLink to={to} end className={look}>
              {label}
            </NavLink>
          </li>
        ))}
      </ul>
    </nav>
  );
}
