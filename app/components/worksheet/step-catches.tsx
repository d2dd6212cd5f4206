import { catchVariationPercent, lbPerRevolution, weightPerRevolution } from "#app/domain/calibration/catch-weight.ts";
import { mostVariationPercent } from "#app/domain/calibration/findings.ts";
import { repeatUncertainty } from "#app/domain/calibration/uncertainty.ts";
import { readableReadings, type WorksheetCatch } from "#app/domain/calibration/worksheet.ts";
import { formatInches } from "#app/lib/format.ts";
import { countWords, sentenceStart } from "#app/lib/words.ts";
import { CatchSpread } from "./catch-spread.tsx";
import { type Editor, focusSoon, newReadingId, withRow } from "./editor.ts";
import { Extras } from "./extras.tsx";
import { Figure, Problem, RowProblems, Say, YardKey } from "./yard-field.tsx";
import { TimedCatches } from "./timed-catches.tsx";

const advisedCount = 3;
const grid = "grid grid-cols-[1.2rem_3.4rem_1fr_1fr_3.2rem] items-center gap-x-1.5";

/** What was caught and weighed, with the spread as it comes. */
export function StepCatches({ editor }: { editor: Editor }) {
  const { sheet, change, isFinished } = editor;
  const isCounted = sheet.method === "counts";
  return (
    <>
      {isCounted ? <Catches editor={editor} /> : <TimedCatches editor={editor} />}
      <Extras editor={editor} />
      {!isFinished && (
        <div className="mt-6 grid border-t border-rule pt-3">
          <YardKey onClick={() => change({ ...sheet, method: isCounted ? "timed-catch" : "counts" })} isSmall>
            {isCounted ? "Catch by time instead, without counting" : "Count turns and weigh catches instead"}
          </YardKey>
          <p className="mt-1 text-table leading-snug text-gravel">What is typed for the other way is kept.</p>
        </div>
      )}
    </>
  );
}

function Catches({ editor }: { editor: Editor }) {
  const { sheet, change, isFinished, earlier } = editor;
  const read = readableReadings(sheet).catches;
  const set = (id: string, part: Partial<WorksheetCatch>) =>
    change({ ...sheet, catches: withRow(sheet.catches, id, part) });
  const before = sheet.catches.at(-1);
  function add() {
    const id = newReadingId();
    // Turns and pail are mostly the same again; the weight never is.
    const caught = { id, revolutions: before?.revolutions ?? "1", grossLb: "", tareLb: before?.tareLb ?? "" };
    change({ ...sheet, catches: [...sheet.catches, caught] });
    focusSoon(`catches.${id}.grossLb`);
  }
  return (
    <>
      <Say>{catchWords(read)}</Say>
      {sheet.catches.length > 0 && (
        <div aria-hidden="true" className={`mt-3 ${grid} text-right text-note leading-tight text-gravel`}>
          <span />
          <span className="pr-2">turns</span>
          <span className="pr-2">gross, lb</span>
          <span className="pr-2">pail, lb</span>
          <span>lb a turn</span>
        </div>
      )}
      <ul className="mt-1 grid gap-1.5">
        {sheet.catches.map((caught, place) => {
          const weighed = read.find(({ id }) => id === caught.id);
          const field = `catches.${caught.id}`;
          return (
            <li key={caught.id}>
              <div className={grid}>
                <b>{place + 1}</b>
                <Figure
                  editor={editor}
                  field={`${field}.revolutions`}
                  name={`Catch ${place + 1}, turns`}
                  value={caught.revolutions}
                  onText={(revolutions) => set(caught.id, { revolutions })}
                />
                <Figure
                  editor={editor}
                  field={`${field}.grossLb`}
                  name={`Catch ${place + 1}, gross weight in lb`}
                  value={caught.grossLb}
                  onText={(grossLb) => set(caught.id, { grossLb })}
                />
                <Figure
                  editor={editor}
                  field={`${field}.tareLb`}
                  name={`Catch ${place + 1}, empty pail in lb`}
                  value={caught.tareLb}
                  onText={(tareLb) => set(caught.id, { tareLb })}
                />
                <b className="text-right text-l tabular-nums">
                  {weighed ? weightPerRevolution(weighed).toFixed(1) : "–"}
                </b>
              </div>
              <RowProblems editor={editor} fields={[`${field}.revolutions`, `${field}.grossLb`, `${field}.tareLb`]} />
            </li>
          );
        })}
      </ul>
      <Problem editor={editor} field="catches" />
      {!isFinished && (
        <div className={`mt-3 grid gap-2 ${sheet.catches.length > 0 ? "grid-cols-2" : ""}`}>
          <YardKey onClick={add}>
            {sheet.catches.length < advisedCount ? `Weigh catch ${sheet.catches.length + 1}` : "Weigh one more"}
          </YardKey>
          {sheet.catches.length > 0 && (
            <YardKey onClick={() => change({ ...sheet, catches: sheet.catches.slice(0, -1) })}>
              Take the last out
            </YardKey>
          )}
        </div>
      )}
      <Spread read={read} />
      <p className="mt-2 text-table leading-snug text-gravel">
        Leave the pail empty when the scale was zeroed with everything on it.
      </p>
      <LastTime editor={editor} earlier={earlier} read={read} />
    </>
  );
}

type Read = ReturnType<typeof readableReadings>["catches"];

function catchWords(read: Read) {
  const repeat = repeatUncertainty(read);
  if (read.length === 0) return "Catch what one or more turns let fall, and weigh it. Three catches are advised.";
  if (!repeat) {
    const left = countWords(advisedCount - read.length, "more", "more");
    return `${lbPerRevolution(read).toFixed(1)} lb a turn, from one catch. Nothing shows yet how far it repeats: weigh ${left}.`;
  }
  const agree = (catchVariationPercent(read) ?? 0) <= mostVariationPercent;
  const half = repeat.highLbPerRev - repeat.meanLbPerRev;
  const count = sentenceStart(countWords(read.length, "catch", "catches"));
  return `${repeat.meanLbPerRev.toFixed(1)} lb a turn, give or take ${half.toFixed(1)}. ${count} ${agree ? "agree" : "are too far apart"}.`;
}

function Spread({ read }: { read: Read }) {
  const repeat = repeatUncertainty(read);
  const variation = catchVariationPercent(read);
  if (!repeat || variation === null) return null;
  return (
    <>
      <CatchSpread
        weightsLbPerRev={read.map(weightPerRevolution)}
        meanLbPerRev={repeat.meanLbPerRev}
        lowLbPerRev={repeat.lowLbPerRev}
        highLbPerRev={repeat.highLbPerRev}
      />
      <p className="mt-1.5 text-table leading-snug text-gravel">
        Spread between catches {variation.toFixed(1)} %. Above {mostVariationPercent} % weigh two more: that limit is
        the network’s own.
      </p>
    </>
  );
}

function LastTime({ editor, earlier, read }: { editor: Editor; earlier: Editor["earlier"]; read: Read }) {
  const last = earlier.find(({ isInForce }) => isInForce) ?? earlier[0];
  if (!last || last.catches.length === 0) return null;
  const [was, now] = [lbPerRevolution(last.catches), read.length > 0 ? lbPerRevolution(read) : null];
  return (
    <dl className="mt-3 grid grid-cols-[auto_1fr] gap-x-4 gap-y-1 border-t border-rule pt-2.5">
      <dt className="text-gravel">Gate, measured</dt>
      <dd>
        <b>{editor.sheet.gate.openingText || "–"} in</b>, bed to lower edge
      </dd>
      <dt className="text-gravel">Last time</dt>
      <dd>
        {was.toFixed(1)} lb a turn at {formatInches(last.gateOpeningIn)} in
        {now === null ? "" : `, now ${now >= was ? "+" : "−"}${Math.abs((100 * (now - was)) / was).toFixed(0)} %`}
      </dd>
    </dl>
  );
}
