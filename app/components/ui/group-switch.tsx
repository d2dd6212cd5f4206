import { Link } from "react-router";

export type GroupChoice = {
  key: string;
  label: string;
  to: string;
  /** How many towns, in words fit to show: "36", or "25 to 49". */
  townCountWords?: string;
  isCurrent?: boolean;
  /** Why the group cannot be shown; it is then words, not a link. */
  hiddenReason?: string;
};

/** Which peers to stand beside. Links, so that a choice has an address and works without script. */
export function GroupSwitch({ label, choices }: { label: string; choices: readonly GroupChoice[] }) {
  return (
    <nav aria-label={label} className="mt-6 border-b border-line print:hidden">
      <ul className="-mb-px flex flex-wrap gap-x-7">
        {choices.map((choice) => (
          <li key={choice.key} className="max-sm:w-full max-sm:border-b max-sm:border-rule max-sm:last:border-0">
            <Choice choice={choice} />
          </li>
        ))}
      </ul>
    </nav>
  );
}

function Choice({ choice }: { choice: GroupChoice }) {
  const count =
    choice.townCountWords === undefined ? null : <span className="font-normal"> {choice.townCountWords}</span>;
  if (choice.hiddenReason !== undefined) {
    return (
      <span className="flex min-h-target flex-wrap items-center gap-x-1.75 text-gravel">
        {choice.label} <span>hidden to protect members: {choice.hiddenReason}</span>
      </span>
    );
  }
  return (
    <Link
      to={choice.to}
      preventScrollReset
      aria-current={choice.isCurrent === true ? "true" : undefined}
      className="relative flex w-fit min-h-target items-center gap-1.75 text-gravel no-underline underline-offset-4 hover:underline aria-[current=true]:font-bold aria-[current=true]:text-asphalt aria-[current=true]:no-underline aria-[current=true]:after:absolute aria-[current=true]:after:inset-x-0 aria-[current=true]:after:-bottom-0.5 aria-[current=true]:after:h-1.25 aria-[current=true]:after:bg-spruce"
    >
      {choice.label}
      {count}
    </Link>
  );
}
