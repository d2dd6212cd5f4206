import { timedDischarge } from "#app/domain/calibration/timed-catch.ts";
import { readableReadings, type WorksheetTimedCatch } from "#app/domain/calibration/worksheet.ts";
import { type Editor, newReadingId, withRow } from "./editor.ts";
import { Figure, Problem, RowProblems, Say, YardKey } from "./yard-field.tsx";

const grid = "grid grid-cols-[3rem_3.6rem_1fr_1fr_3.2rem] items-center gap-x-1.5";
const fields = ["setting", "seconds", "grossLb", "tareLb"] as const;
const words = {
  setting: "feed setting",
  seconds: "seconds",
  grossLb: "gross weight in lb",
  tareLb: "empty container in lb",
} as const;

/** Catches over a stretch of time, in place of counts: the discharge comes straight out. */
export function TimedCatches({ editor }: { editor: Editor }) {
  const { sheet, change, isFinished, truck } = editor;
  const read = readableReadings(sheet).timedCatches;
  const before = sheet.timedCatches.at(-1);
  const add = () =>
    change({
      ...sheet,
      timedCatches: [
        ...sheet.timedCatches,
        {
          id: newReadingId(),
          setting: before?.setting ?? String(truck.workingSetting),
          seconds: before?.seconds ?? "30",
          grossLb: "",
          tareLb: before?.tareLb ?? "",
        },
      ],
    });
  const set = (id: string, part: Partial<WorksheetTimedCatch>) =>
    change({ ...sheet, timedCatches: withRow(sheet.timedCatches, id, part) });
  return (
    <>
      <Say>Run each setting for half a minute, catch all of it, and weigh. Three catches a setting are advised.</Say>
      {sheet.timedCatches.length > 0 && (
        <div aria-hidden="true" className={`mt-3 ${grid} text-right text-note leading-tight text-gravel`}>
          <span className="pr-1">setting</span>
          <span className="pr-2">seconds</span>
          <span className="pr-2">gross, lb</span>
          <span className="pr-2">empty, lb</span>
          <span>lb a minute</span>
        </div>
      )}
      <ul className="mt-1 grid gap-1.5">
        {sheet.timedCatches.map((caught, place) => {
          const weighed = read.find(({ id }) => id === caught.id);
          return (
            <li key={caught.id}>
              <div className={grid}>
                {fields.map((name) => (
                  <Figure
                    key={name}
                    editor={editor}
                    field={`timedCatches.${caught.id}.${name}`}
                    name={`Timed catch ${place + 1}, ${words[name]}`}
                    value={caught[name]}
                    onText={(text) => set(caught.id, { [name]: text })}
                  />
                ))}
                <b className="text-right tabular-nums">{weighed ? timedDischarge(weighed).toFixed(0) : "–"}</b>
              </div>
              <RowProblems editor={editor} fields={fields.map((name) => `timedCatches.${caught.id}.${name}`)} />
            </li>
          );
        })}
      </ul>
      <Problem editor={editor} field="timedCatches" />
      {!isFinished && (
        <div className={`mt-3 grid gap-2 ${sheet.timedCatches.length > 0 ? "grid-cols-2" : ""}`}>
          <YardKey onClick={add}>Weigh catch {sheet.timedCatches.length + 1}</YardKey>
          {sheet.timedCatches.length > 0 && (
            <YardKey onClick={() => change({ ...sheet, timedCatches: sheet.timedCatches.slice(0, -1) })}>
              Take the last out
            </YardKey>
          )}
        </div>
      )}
    </>
  );
}
