import { NavLink, useLocation } from "react-router";

type Props = { areas: readonly { label: string; to: string }[]; person: string };

const onBarCount = 4;
const item =
  "relative flex min-h-14 w-full items-center justify-center px-2 text-note font-semibold text-asphalt no-underline";
const here =
  "aria-[current=page]:text-spruce aria-[current=page]:after:absolute aria-[current=page]:after:inset-x-2 aria-[current=page]:after:-top-1 aria-[current=page]:after:h-1 aria-[current=page]:after:bg-spruce aria-[current=page]:after:shadow-[-6px_0_var(--color-salt),6px_0_var(--color-salt)]";

/** The areas on a phone, under the thumb. More is a plain disclosure, so it opens without script too. */
export function BottomBar({ areas, person }: Props) {
  const { pathname } = useLocation();
  const rest = [...areas.slice(onBarCount), { label: person, to: "/account" }];
  const isInRest = rest.some((area) => pathname === area.to || pathname.startsWith(`${area.to}/`));

  return (
    <nav
      aria-label="Areas, at the thumb"
      className="fixed inset-x-0 bottom-0 z-20 border-t border-line bg-salt pt-[3px] sm:hidden print:hidden"
    >
      <ul className="flex justify-between border-t-4 border-line px-1 pb-[env(safe-area-inset-bottom)]">
        {areas.slice(0, onBarCount).map((area) => (
          <li key={area.to} className="flex-auto">
            <NavLink to={area.to} className={`${item} ${here}`}>
              {area.label}
            </NavLink>
          </li>
        ))}
        <li className="flex-auto">
          {/* The key closes it again when the page changes. */}
          <details key={pathname} className="group">
            <summary
              aria-current={isInRest ? "page" : undefined}
              className={`${item} ${here} list-none group-open:underline`}
            >
              More
            </summary>
            <ul className="absolute right-0 bottom-full left-0 border-t border-line bg-salt px-4 py-2 shadow-float">
              {rest.map((area) => (
                <li key={area.to} className="border-b border-rule last:border-0">
                  <NavLink
                    to={area.to}
                    className="flex min-h-13 items-center text-head text-asphalt no-underline aria-[current=page]:font-bold aria-[current=page]:text-spruce"
                  >
                    {area.label}
                  </NavLink>
                </li>
              ))}
            </ul>
          </details>
        </li>
      </ul>
    </nav>
  );
}
