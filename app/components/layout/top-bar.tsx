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
        {/* On paper there is no bar: one line says whose page it is. */}
        <p className="mb-4 hidden justify-between border-b-2 border-line pb-1 text-note print:flex">
          <b>{place}</b>
          <span>Commonweigh</span>
        </p>
        <DoubleRule>
          <Link to="/today" className={brandClass}>
            <Mark />
          </Link>
          <nav aria-label="Areas" className="hidden items-stretch gap-3.5 text-table sm:flex md:gap-5 md:text-m">
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
          <div className="ml-auto flex min-w-0 flex-col justify-center py-1 text-right text-note leading-tight lg:flex-row lg:items-center lg:justify-end lg:gap-4.5 lg:text-m">
            <p>
              <span className="max-sm:block">{place}</span>
              <span className="max-sm:hidden"> · </span>
              <b className="font-semibold max-sm:block">{period}</b>
            </p>
            <Link
              to="/account"
              className="hidden text-asphalt no-underline underline-offset-4 hover:underline sm:block lg:flex lg:min-h-target lg:items-center"
            >
              {person}
            </Link>
          </div>
        </DoubleRule>
      </header>
      <BottomBar areas={areas} person={person} />
    </>
  );
}
