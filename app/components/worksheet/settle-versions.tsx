import { useState } from "react";
import { Say, YardKey } from "./yard-field.tsx";

type Choice = "mine" | "theirs" | "both";
type Difference = {
  key: string;
  label: string;
  mine: string | null;
  theirs: string | null;
  mayKeepBoth: boolean;
  proposed: Choice | null;
};

type Props = {
  differences: readonly Difference[];
  /** "Android", as the other device called itself. */
  otherDevice: string;
  /** Theirs is a calibration already: it can no longer be changed. */
  isTheirsFinished: boolean;
  onSettle: (choices: Record<string, Choice>) => void;
  onNewSheet: () => void;
};

/** Two versions of one worksheet met. Side by side, reading by reading; nothing is dropped unless somebody says so. */
export function SettleVersions({ differences, otherDevice, isTheirsFinished, onSettle, onNewSheet }: Props) {
  const [choices, setChoices] = useState<Record<string, Choice>>(() =>
    Object.fromEntries(differences.flatMap(({ key, proposed }) => (proposed === null ? [] : [[key, proposed]]))),
  );
  const open = differences.filter(({ key }) => choices[key] === undefined).length;
  if (isTheirsFinished) {
    return (
      <>
        <Say>
          This worksheet was finished on another phone{otherDevice === "" ? "" : ` (${otherDevice})`} meanwhile.
        </Say>
        <p className="mt-2 leading-snug">
          Its calibration stands and cannot be changed. What you have here differs in {differences.length}{" "}
          {differences.length === 1 ? "place" : "places"}; both are kept until you decide.
        </p>
        <Pairs differences={differences} choices={null} onChoose={() => undefined} />
        <div className="mt-4 grid gap-2">
          <YardKey onClick={onNewSheet}>Make a new worksheet of mine</YardKey>
          <YardKey onClick={() => onSettle(Object.fromEntries(differences.map(({ key }) => [key, "theirs"])))}>
            Keep theirs, leave mine out
          </YardKey>
        </div>
      </>
    );
  }
  return (
    <>
      <Say>This worksheet met another version{otherDevice === "" ? "" : ` (${otherDevice})`}. Both are kept.</Say>
      <p className="mt-2 leading-snug text-gravel">
        They differ in {differences.length} {differences.length === 1 ? "place" : "places"}. Where only one side changed
        something, it is chosen already.
      </p>
      <Pairs
        differences={differences}
        choices={choices}
        onChoose={(key, choice) => setChoices({ ...choices, [key]: choice })}
      />
      <p id="settle-open" role="status" className="mt-4 font-semibold">
        {open === 0 ? "All is decided." : `${open} still to decide.`}
      </p>
      <button
        type="button"
        aria-disabled={open > 0 || undefined}
        aria-describedby="settle-open"
        onClick={() => {
          if (open === 0) onSettle(choices);
        }}
        className="mt-2 min-h-target-yard w-full touch-manipulation rounded-field bg-spruce px-4 text-head font-semibold text-on-spruce active:bg-asphalt aria-disabled:bg-frost aria-disabled:text-gravel"
      >
        Go on with this
      </button>
    </>
  );
}

type PairsProps = {
  differences: readonly Difference[];
  choices: Record<string, Choice> | null;
  onChoose: (key: string, choice: Choice) => void;
};

function Pairs({ differences, choices, onChoose }: PairsProps) {
  return (
    <ul className="mt-3 grid gap-4 border-t-2 border-line pt-3">
      {differences.map(({ key, label, mine, theirs, mayKeepBoth }) => {
        const options: { choice: Choice; head: string; words: string }[] = [
          { choice: "mine", head: "Mine", words: mine ?? "not there: leave theirs out" },
          { choice: "theirs", head: "Theirs", words: theirs ?? "not there: leave mine out" },
          ...(mayKeepBoth ? [{ choice: "both" as const, head: "Both", words: "two readings" }] : []),
        ];
        return (
          <li key={key}>
            <fieldset>
              <legend className="font-bold">{label}</legend>
              <div className="mt-1 grid grid-cols-2 gap-2">
                {options.map(({ choice, head, words }) => (
                  <label
                    key={choice}
                    className="flex min-h-13 cursor-pointer items-start gap-2 rounded-field border-2 border-rule-field px-2.5 py-2 leading-snug has-checked:border-spruce has-checked:bg-spruce-wash has-focus-visible:outline-3 has-focus-visible:outline-offset-2 has-focus-visible:outline-asphalt"
                  >
                    {choices !== null && (
                      <input
                        type="radio"
                        name={key}
                        checked={choices[key] === choice}
                        onChange={() => onChoose(key, choice)}
                        className="mt-0.5 size-5 flex-none accent-spruce outline-none"
                      />
                    )}
                    <span className="min-w-0 text-table">
                      <b className="block text-head">{head}</b>
                      {words}
                    </span>
                  </label>
                ))}
              </div>
            </fieldset>
          </li>
        );
      })}
    </ul>
  );
}
