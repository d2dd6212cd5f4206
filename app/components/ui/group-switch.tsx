import { Link } from "react-router";

export type GroupChoice = {
  key: string;
  label: string;
  to: string;
  /** What the groups of one row have in common: "by size". */
  part?: string;
  /** How many towns, in words fit to show: "36", or "25 to 49". */
  townCountWords?: string;
  isCurrent?: boolean;
  /** Why the group cannot be shown; it is then words, not a link. */
  hiddenReason?: string;
};

type Props = { label: string; choices: readonly GroupChoice[] };

/**
 * Which peers to stand beside. Links, so that a choice has an address and works without script. On a phone the choice
 * is one line that opens, so that the strips stay in sight.
 */
export function GroupSwitch({ label, choices }: Props) {
  const current = choices.find(({ isCurrent }) => isCurrent === true);
  return (
    <>
      <p className="mt-3 hidden print:block">
        Compared with: <b>{current?.label}</b>
        {current?.townCountWords !== undefined && `, ${current.townCountWords} towns`}
      </p>
      <nav aria-label={label} className="mt-5 border-b border-line print:hidden">
        <details key={current?.key} className="group sm:hidden">
          <summary className="flex min-h-target list-none items-center justify-between gap-4">
            <span className="py-1.5">
              <span className="block text-note text-gravel">{label}</span>
              <b>{current?.label}</b> {current?.townCountWords}
            </span>
            <span className="font-semibold text-spruce underline underline-offset-3">
              <span className="group-open:hidden">Change</span>
              <span className="hidden group-open:inline">Close</span>
            </span>
          </summary>
          <ul>
            {choices.map((choice) => (
              <li key={choice.key} className="border-t border-rule">
                <Choice choice={choice} />
              </li>
            ))}
          </ul>
        </details>
        <div className="max-sm:hidden">
          {parts(choices).map(([part, own]) => (
            <div key={part} className="flex gap-x-6">
              {part !== "" && <p className="w-27 flex-none py-2.5 text-gravel">{part}</p>}
              <ul className="flex flex-wrap gap-x-7">
                {own.map((choice) => (
                  <li key={choice.key}>
                    <Choice choice={choice} />
                  </li>
                ))}
              </ul>
            </div>
          ))}
        </div>
      </nav>
    </>
  );
}

/** The choices by row, in the order they come. */
function parts(choices: readonly GroupChoice[]) {
  const names = [...new Set(choices.map(({ part = "" }) => part))];
  return names.map((name) => [name, choices.filter(({ part = "" }) => part === name)] as const);
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
      className="relative flex w-fit min-h-target items-center gap-1.75 text-gravel no-underline underline-offset-4 hover:underline aria-[current=true]:font-bold aria-[current=true]:text-asphalt aria-[current=true]:no-underline aria-[current=true]:after:absolute aria-[current=true]:after:inset-x-0 aria-[current=true]:after:bottom-0.5 aria-[current=true]:after:h-1 aria-[current=true]:after:bg-spruce"
    >
      {choice.label}
      {count}
    </Link>
  );
}
