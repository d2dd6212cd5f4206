import { useState } from "react";
import { fallsInCount, settingsWithLimit } from "#app/domain/calibration/count-rate.ts";
import { readableReadings, type WorksheetCount } from "#app/domain/calibration/worksheet.ts";
import { readNumber } from "#app/domain/readings.ts";
import { listWords } from "#app/lib/words.ts";
import { type Editor, focusSoon, newReadingId, withRow } from "./editor.ts";
import type { RunningCount } from "./running-count.ts";
import { TurnPad } from "./turn-pad.tsx";
import { Figure, Problem, RowProblems, Say, YardKey } from "./yard-field.tsx";

type Props = { editor: Editor; running: RunningCount | null; onRun: (running: RunningCount | null) => void };

const usualSeconds = 60;

/** Turns as they are read: 12.25 is 12¼. */
function turnWords(text: string) {
  const read = readNumber(text);
  if (!read.ok) return text === "" ? "–" : text;
  const whole = Math.floor(read.value);
  const sign = { 0: "", 0.25: "¼", 0.5: "½", 0.75: "¾" }[read.value - whole];
  return sign === undefined ? text : `${whole === 0 && sign !== "" ? "" : whole}${sign}`;
}

function nextSetting(counts: readonly WorksheetCount[]) {
  const settings = counts.flatMap(({ setting }) => {
    const read = readNumber(setting);
    return read.ok && Number.isInteger(read.value) ? [read.value] : [];
  });
  return settings.length === 0 ? 1 : Math.max(...settings) + 1;
}

/** The settings that turn no faster, in a sentence; null when none is found yet. */
function limitWords(editor: Editor) {
  try {
    const { counts } = readableReadings(editor.sheet);
    if (fallsInCount(counts).length > 0) return null;
    const settings = settingsWithLimit(counts);
    const limited = settings.filter(({ isAtHydraulicLimit }) => isAtHydraulicLimit).map(({ setting }) => setting);
    const last = settings.filter(({ isAtHydraulicLimit }) => !isAtHydraulicLimit).at(-1);
    if (!last || limited.length === 0) return null;
    const subject =
      limited.length === 1 ? `Setting ${limited[0] ?? ""} turns` : `Settings ${listWords(limited.map(String))} turn`;
    return `${subject} no faster than setting ${last.setting}: the hydraulics give no more. Every later setting lays the same, so you need not count further.`;
  } catch {
    // A setting counted twice; its field says so.
    return null;
  }
}

/** Counts at each feed setting: by the clock, or typed. */
export function StepCounts({ editor, running, onRun }: Props) {
  const { sheet, truck, change, isFinished } = editor;
  const [rpm, setRpm] = useState(
    sheet.counts.at(-1)?.rpm ?? (truck.workingRpm === null ? "" : String(truck.workingRpm)),
  );
  const [hasSound, setSound] = useState(false);
  const [seconds, setSeconds] = useState(usualSeconds);
  const setting = running?.setting ?? String(nextSetting(sheet.counts));
  const limit = limitWords(editor);

  function add(count: Omit<WorksheetCount, "id">) {
    const again = sheet.counts.find((one) => one.setting.trim() === count.setting);
    const id = again?.id ?? newReadingId();
    change({ ...sheet, counts: again ? withRow(sheet.counts, id, count) : [...sheet.counts, { id, ...count }] });
    return id;
  }

  function start(atSetting: string) {
    onRun({ setting: atSetting, seconds, startedAtMs: Date.now(), turns: 0 });
  }

  if (running) {
    return (
      <>
        <Say>
          Setting {running.setting}{" "}
          <span className="font-normal text-gravel">{rpm === "" ? "" : `· engine at ${rpm} rpm`}</span>
        </Say>
        <TurnPad
          key={running.startedAtMs}
          running={running}
          hasSound={hasSound}
          onTurns={(turns) => onRun({ ...running, turns })}
          onStop={() => start(running.setting)}
          onTake={(counted) => {
            add({
              setting: running.setting,
              revolutions: String(counted.revolutions),
              seconds: String(counted.seconds),
              rpm,
            });
            onRun(null);
            focusSoon("step-heading");
          }}
        />
        <div className="mt-2 grid">
          <YardKey
            onClick={() => {
              onRun(null);
              focusSoon("step-heading");
            }}
          >
            Leave without this count
          </YardKey>
        </div>
        <Tally counts={sheet.counts} now={running} />
      </>
    );
  }
  return (
    <>
      <Say>
        {sheet.counts.length === 0
          ? "Count the shaft’s turns at each setting, engine at working speed."
          : (limit ??
            `${sheet.counts.length === 1 ? "One setting is" : `${sheet.counts.length} settings are`} counted. Next is setting ${setting}.`)}
      </Say>
      {sheet.countsFromCalibrationId !== null && (
        <p className="mt-2 leading-snug text-gravel">
          Taken over from the earlier calibration: a change of the gate leaves the counts good. Count again after work
          on hydraulics, feed or engine speed.
        </p>
      )}
      <Tally counts={sheet.counts} now={null} />
      {!isFinished && (
        <>
          <div className="mt-4 grid grid-cols-2 gap-3">
            <label className="block">
              <span className="mb-1 block font-semibold">Engine, rpm</span>
              <input
                inputMode="numeric"
                autoComplete="off"
                maxLength={6}
                value={rpm}
                onChange={(event) => setRpm(event.target.value)}
                className="block h-12.5 w-full rounded-field border-2 border-rule-field bg-snow px-3 text-l font-semibold tabular-nums focus:border-spruce"
              />
            </label>
            <label className="block">
              <span className="mb-1 block font-semibold">Count for</span>
              <select
                value={seconds}
                onChange={(event) => setSeconds(Number(event.target.value))}
                className="block h-12.5 w-full rounded-field border-2 border-rule-field bg-snow px-3 text-head font-semibold focus:border-spruce"
              >
                <option value={60}>one minute</option>
                <option value={30}>30 seconds</option>
                <option value={90}>90 seconds</option>
                <option value={120}>two minutes</option>
              </select>
            </label>
          </div>
          <p className="mt-1 text-table leading-snug text-gravel">
            Common practice: 1,500 to 2,000 rpm, to imitate the load, for a full minute.
          </p>
          <div className="mt-3 grid gap-2">
            <YardKey onClick={() => start(setting)}>Start the clock at setting {setting}</YardKey>
          </div>
          <label className="mt-1 flex min-h-12 cursor-pointer items-center gap-3">
            <input
              type="checkbox"
              checked={hasSound}
              onChange={(event) => setSound(event.target.checked)}
              className="size-6 flex-none accent-spruce"
            />
            Sound at the end; the phone shakes anyway
          </label>
        </>
      )}
      <CountRows editor={editor} rpm={rpm} setting={setting} onAdd={add} />
    </>
  );
}

function Tally({ counts, now }: { counts: readonly WorksheetCount[]; now: RunningCount | null }) {
  const isRecount = now !== null && counts.some(({ setting }) => setting.trim() === now.setting);
  if (counts.length === 0 && now === null) return null;
  return (
    <ul
      aria-label="Counts so far"
      className="mt-3 grid auto-cols-[minmax(2.6rem,1fr)] grid-flow-col overflow-x-auto border-t border-rule pt-2 text-table leading-tight"
      tabIndex={0}
    >
      {counts.map((count) => (
        <li key={count.id} className="border-l border-rule pl-1.5 first:border-0 first:pl-0">
          <span className="block text-s text-gravel">
            <span className="sr-only">setting </span>
            {count.setting || "?"}
          </span>
          <b className={now?.setting === count.setting.trim() ? "font-bold text-spruce" : "font-semibold"}>
            {now?.setting === count.setting.trim() ? `${now.turns} +` : turnWords(count.revolutions)}
          </b>
        </li>
      ))}
      {now !== null && !isRecount && (
        <li className="border-l border-rule pl-1.5 first:border-0 first:pl-0">
          <span className="block text-s text-gravel">{now.setting}</span>
          <b className="font-bold text-spruce">{now.turns} +</b>
        </li>
      )}
    </ul>
  );
}

type RowsProps = {
  editor: Editor;
  rpm: string;
  setting: string;
  /** @returns the id of the count that holds it */
  onAdd: (count: Omit<WorksheetCount, "id">) => string;
};

/** The counts as figures: to type them, and to put them right. */
function CountRows({ editor, rpm, setting, onAdd }: RowsProps) {
  const { sheet, change, isFinished } = editor;
  const set = (id: string, part: Partial<WorksheetCount>) =>
    change({ ...sheet, counts: withRow(sheet.counts, id, part) });
  function type() {
    focusSoon(`counts.${onAdd({ setting, revolutions: "", seconds: String(usualSeconds), rpm })}.revolutions`);
  }
  const fields = ["setting", "revolutions", "seconds", "rpm"] as const;
  const heads = { setting: "setting", revolutions: "turns", seconds: "seconds", rpm: "rpm" } as const;
  return (
    <section className="mt-4 border-t-2 border-line pt-2.5" aria-labelledby="typed-counts">
      <h2 id="typed-counts" className="font-bold">
        Or type them
      </h2>
      {sheet.counts.length > 0 && (
        <div
          aria-hidden="true"
          className="mt-1.5 grid grid-cols-[2.75rem_4.5rem_1fr_4.5rem_3rem] gap-x-1.5 text-right text-note text-gravel"
        >
          {fields.map((name) => (
            <span key={name} className="pr-2">
              {heads[name]}
            </span>
          ))}
        </div>
      )}
      <ul className="grid gap-2">
        {sheet.counts.map((count, place) => (
          <li key={count.id}>
            <div className="grid grid-cols-[2.75rem_4.5rem_1fr_4.5rem_3rem] gap-x-1.5">
              {fields.map((name) => (
                <Figure
                  key={name}
                  editor={editor}
                  field={`counts.${count.id}.${name}`}
                  name={`Count ${place + 1}, ${heads[name]}`}
                  value={count[name]}
                  mode={name === "revolutions" || name === "seconds" ? "decimal" : "numeric"}
                  onText={(text) => set(count.id, { [name]: text })}
                />
              ))}
              {!isFinished && (
                <button
                  type="button"
                  aria-label={`Take count ${place + 1} out`}
                  onClick={() => change({ ...sheet, counts: sheet.counts.filter(({ id }) => id !== count.id) })}
                  className="grid min-h-12 place-items-center rounded-field text-gravel"
                >
                  <svg viewBox="0 0 12 12" aria-hidden="true" className="size-3.5 stroke-current stroke-2">
                    <path d="M1 1l10 10M11 1 1 11" />
                  </svg>
                </button>
              )}
            </div>
            <RowProblems editor={editor} fields={fields.map((name) => `counts.${count.id}.${name}`)} />
          </li>
        ))}
      </ul>
      <Problem editor={editor} field="counts" />
      {!isFinished && (
        <div className="mt-2 grid">
          <YardKey onClick={type}>Type setting {setting}</YardKey>
        </div>
      )}
    </section>
  );
}
