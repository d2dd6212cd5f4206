import { Link } from "react-router";
import { SelectField } from "#app/components/forms/select-field.tsx";
import { Button } from "./button.tsx";

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

type Props = {
  label: string;
  choices: readonly GroupChoice[];
  /** Where a phone's menu asks for a group: the name of the group in the address, and what else stands in it. */
  menu: { action: string; name: string; fields: Record<string, string> };
};

/**
 * Which peers to stand beside. Links, so that a choice has an address and works without script. On a phone it is one
 * menu, so that the strips stay in sight.
 */
export function GroupSwitch({ label, choices, menu }: Props) {
  const current = choices.find(({ isCurrent }) => isCurrent === true);
  return (
    <>
      <p className="mt-3 hidden print:block">
        Compared with: <b>{current?.label}</b>
        {current?.townCountWords !== undefined && `, ${current.townCountWords} towns`}
      </p>
      <nav aria-label={label} className="mt-5 border-b border-line max-sm:pb-4 print:hidden">
        <form method="get" action={menu.action} className="flex items-end gap-3 sm:hidden">
          {Object.entries(menu.fields).map(([name, value]) => (
            <input key={name} type="hidden" name={name} value={value} />
          ))}
          <div className="min-w-0 flex-1">
            <SelectField
              key={current?.key}
              name={menu.name}
              label={label}
              defaultValue={current?.key}
              choices={choices.map((choice) => ({
                value: choice.key,
                label: menuWords(choice),
                isDisabled: choice.hiddenReason !== undefined,
              }))}
            />
          </div>
          <Button variant="quiet">Show</Button>
        </form>
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

function menuWords({ label, townCountWords, hiddenReason }: GroupChoice) {
  if (hiddenReason !== undefined) return `${label}: hidden, ${hiddenReason}`;
  return townCountWords === undefined ? label : `${label}, ${townCountWords} towns`;
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
