import { Link } from "react-router";
import { type RateView, viewAddress } from "./shown-units.ts";

type Choice = { label: string; change: Partial<RateView> };

const switches: { name: string; choices: Choice[] }[] = [
  {
    name: "speeds every",
    choices: [
      { label: "5 mph", change: { stepMph: 5 } },
      { label: "10 mph", change: { stepMph: 10 } },
    ],
  },
  {
    name: "on a mile of",
    choices: [
      { label: "lane", change: { basis: "lane" } },
      { label: "travel", change: { basis: "mile" } },
    ],
  },
  {
    name: "in",
    choices: [
      { label: "US units", change: { units: "us" } },
      { label: "SI units", change: { units: "si" } },
    ],
  },
];

function isOn(view: RateView, change: Partial<RateView>) {
  return (
    (change.stepMph ?? view.stepMph) === view.stepMph &&
    (change.basis ?? view.basis) === view.basis &&
    (change.units ?? view.units) === view.units
  );
}

/** How the rates are shown. Links, so that each way has an address and works without script. */
export function ViewSwitch({ path, view }: { path: string; view: RateView }) {
  return (
    <nav aria-label="How the rates are shown" className="mb-3 flex flex-wrap gap-x-8 gap-y-1 text-note print:hidden">
      {switches.map(({ name, choices }) => (
        <p key={name} className="flex flex-wrap items-center gap-x-3">
          <span className="text-gravel">{name}</span>
          {choices.map(({ label, change }) => (
            <Link
              key={label}
              to={viewAddress(path, view, change)}
              preventScrollReset
              aria-current={isOn(view, change) ? "true" : undefined}
              className="inline-flex min-h-target items-center text-spruce underline decoration-1 underline-offset-3 hover:decoration-2 aria-[current=true]:font-bold aria-[current=true]:text-asphalt aria-[current=true]:no-underline"
            >
              {label}
            </Link>
          ))}
        </p>
      ))}
    </nav>
  );
}
