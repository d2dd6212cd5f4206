import { Link, NavLink } from "react-router";
import { BottomBar } from "./bottom-bar.tsx";
import { brandClass, DoubleRule } from "./double-rule.tsx";
import { Mark } from "./mark.tsx";
import { NotForSharing } from "./not-for-sharing.tsx";
import { SkipLink } from "./skip-link.tsx";

export type Area = { label: string; to: string };

type Props = {
  /** In the order they are worked in; the first four stand in the bottom bar of a phone. */
  areas: readonly Area[];
  place: string;
  period: string;
  person: string;
  notForSharing?: boolean;
};

/** The areas as words on a double rule; the area one is in is the spruce break in the thick line. */
export function TopBar({ areas, place, period, person, notForSharing = false }: Props) {
  return (
    <>
      <SkipLink />
      <header>
        {notForSharing && <NotForSharing />}
        <DoubleRule>
          <Link to="/today" className={brandClass}>
            <Mark />
          </Link>
          <nav aria-label="Areas" className="hidden items-stretch gap-4 sm:flex md:gap-5.5">
            {areas.map((area) => (
              <NavLink
                key={area.to}
                to={area.to}
                className="relative flex items-center text-asphalt no-underline underline-offset-4 hover:underline aria-[current=page]:font-bold aria-[current=page]:no-underline aria-[current=page]:after:absolute aria-[current=page]:after:inset-x-0 aria-[current=page]:after:-bottom-1 aria-[current=page]:after:h-1 aria-[current=page]:after:bg-spruce aria-[current=page]:after:shadow-[-6px_0_var(--color-salt),6px_0_var(--color-salt)]"
              >
                {area.label}
              </NavLink>
            ))}
          </nav>
          <div className="ml-auto flex min-w-0 flex-wrap items-center justify-end gap-x-4.5 py-1 text-right text-note leading-tight sm:hidden lg:flex lg:text-m">
            <p className="min-w-0">
              <span className="block lg:inline">{place}</span>
              <span className="hidden lg:inline"> · </span>
              <b className="block font-semibold lg:inline">{period}</b>
            </p>
            <PersonLink person={person} className="hidden lg:flex" />
          </div>
          <PersonLink person={person} className="ml-auto hidden sm:flex lg:hidden" />
        </DoubleRule>
      </header>
      <BottomBar areas={areas} person={person} />
    </>
  );
}

function PersonLink({ person, className }: { person: string; className: string }) {
  return (
    <Link
      to="/account"
      className={`${className} min-h-target items-center text-asphalt no-underline underline-offset-4 hover:underline`}
    >
      {person}
    </Link>
  );
}
