import { directGalPerLaneMile, prewetGalPerTon, timedGalPerMin } from "#app/domain/calibration/liquids.ts";
import { verificationPoint, verifyGroundSpeed } from "#app/domain/calibration/verification.ts";
import {
  readableReadings,
  type WorksheetLiquid,
  type WorksheetVerification,
} from "#app/domain/calibration/worksheet.ts";
import { formatWhole } from "#app/lib/format.ts";
import { type Editor, newReadingId, withRow } from "./editor.ts";
import { Problem, YardField, YardKey } from "./yard-field.tsx";

/** What some trucks have measured besides: ground-speed control, and liquids. */
export function Extras({ editor }: { editor: Editor }) {
  const { sheet, truck, isFinished } = editor;
  const isGroundSpeed = truck.control === "ground-speed" || sheet.verification.length > 0;
  return (
    <>
      {isGroundSpeed && (
        <Section title="Ground speed: told and caught" isOpen>
          <Verification editor={editor} />
        </Section>
      )}
      {(!isFinished || sheet.liquids.length > 0) && (
        <Section title="Liquid" isOpen={sheet.liquids.length > 0 || truck.spreaderKind === "liquid-tanks"}>
          <Liquids editor={editor} />
        </Section>
      )}
    </>
  );
}

function Section({ title, isOpen, children }: { title: string; isOpen: boolean; children: React.ReactNode }) {
  return (
    <details open={isOpen} className="group mt-5 border-t-2 border-line pt-1">
      <summary className="flex min-h-12 list-none items-center justify-between gap-3">
        <h2 className="font-bold">{title}</h2>
        <svg
          viewBox="0 0 10 7"
          aria-hidden="true"
          className="h-2.5 w-3.5 fill-none stroke-spruce stroke-[1.6] group-open:rotate-180"
        >
          <path d="M1 1l4 4 4-4" />
        </svg>
      </summary>
      {children}
    </details>
  );
}

const verdictWords = {
  within: "within the tolerance",
  outside: "outside the tolerance",
  undecided: "too close to say",
};
const verificationFields = [
  { name: "speedMph", label: "Simulated speed", unit: "mph" },
  { name: "commandedLbPerLaneMile", label: "Told to lay", unit: "lb/lane mile" },
  { name: "seconds", label: "Caught for", unit: "s" },
  { name: "grossLb", label: "Gross", unit: "lb" },
  { name: "tareLb", label: "Empty", unit: "lb" },
] as const;

function Verification({ editor }: { editor: Editor }) {
  const { sheet, truck, change, tolerancePercent, isFinished } = editor;
  const read = readableReadings(sheet).verification;
  const points = read.map((reading) => ({ id: reading.id, ...verificationPoint(reading, truck.lanesPerPass) }));
  const judged = points.length === 0 ? null : verifyGroundSpeed({ points, tolerancePercent });
  const before = sheet.verification.at(-1);
  const set = (id: string, part: Partial<WorksheetVerification>) =>
    change({ ...sheet, verification: withRow(sheet.verification, id, part) });
  return (
    <>
      <p className="leading-snug text-gravel">
        Output over a mile should not change with speed. At several simulated speeds, catch and weigh what the
        controller lays. Tolerance {tolerancePercent} %: the network’s choice, there is no published number.
      </p>
      {judged && <p className="mt-2 font-semibold">Over all: {verdictWords[judged.verdict]}.</p>}
      {sheet.verification.map((one, place) => {
        const point = judged?.points.find(({ id }) => id === one.id);
        return (
          <fieldset key={one.id} className="mt-3 border-t border-rule pt-2">
            <legend className="float-left w-full font-semibold">
              Speed {place + 1}
              {point && (
                <span className="font-normal">
                  : caught {formatWhole(point.caughtLbPerLaneMile)} lb, {point.errorPercent >= 0 ? "+" : "−"}
                  {Math.abs(point.errorPercent).toFixed(1)} ± {point.plusMinusPercent.toFixed(1)} %,{" "}
                  {verdictWords[point.verdict]}
                </span>
              )}
            </legend>
            <div className="clear-both grid gap-2 pt-1">
              {verificationFields.map(({ name, label, unit }) => (
                <YardField
                  key={name}
                  editor={editor}
                  field={`verification.${one.id}.${name}`}
                  name={label}
                  label={label}
                  unit={unit}
                  value={one[name]}
                  onText={(text) => set(one.id, { [name]: text })}
                />
              ))}
            </div>
            <TakeOut
              isOff={isFinished}
              what={`speed ${place + 1}`}
              onClick={() => change({ ...sheet, verification: sheet.verification.filter(({ id }) => id !== one.id) })}
            />
          </fieldset>
        );
      })}
      <Problem editor={editor} field="verification" />
      {!isFinished && (
        <div className="mt-3 grid">
          <YardKey
            onClick={() =>
              change({
                ...sheet,
                verification: [
                  ...sheet.verification,
                  {
                    id: newReadingId(),
                    speedMph: "",
                    commandedLbPerLaneMile: before?.commandedLbPerLaneMile ?? "",
                    seconds: before?.seconds ?? "30",
                    grossLb: "",
                    tareLb: before?.tareLb ?? "",
                  },
                ],
              })
            }
          >
            Add a speed
          </YardKey>
        </div>
      )}
    </>
  );
}

function TakeOut({ what, isOff, onClick }: { what: string; isOff: boolean; onClick: () => void }) {
  if (isOff) return null;
  return (
    <button
      type="button"
      onClick={onClick}
      className="mt-1 min-h-12 font-semibold text-spruce underline underline-offset-3"
    >
      Take {what} out
    </button>
  );
}

function liquidFields(kind: WorksheetLiquid["kind"]) {
  const common = [
    { name: "gallons", label: "Caught", unit: "gal" },
    { name: "seconds", label: "Caught for", unit: "s" },
  ] as const;
  return kind === "prewet"
    ? ([...common, { name: "dryLbPerMin", label: "Dry material with it", unit: "lb/min" }] as const)
    : ([
        ...common,
        { name: "speedMph", label: "At a speed of", unit: "mph" },
        { name: "lanes", label: "Lanes in a pass", unit: "" },
      ] as const);
}

function Liquids({ editor }: { editor: Editor }) {
  const { sheet, truck, change, isFinished } = editor;
  const read = readableReadings(sheet).liquids;
  const set = (id: string, part: Partial<WorksheetLiquid>) =>
    change({ ...sheet, liquids: withRow(sheet.liquids, id, part) });
  const add = (kind: WorksheetLiquid["kind"]) =>
    change({
      ...sheet,
      liquids: [
        ...sheet.liquids,
        {
          id: newReadingId(),
          kind,
          gallons: "",
          seconds: "60",
          speedMph: kind === "direct" ? String(truck.workingSpeedMph) : "",
          lanes: kind === "direct" ? String(truck.lanesPerPass) : "",
          dryLbPerMin: "",
        },
      ],
    });
  return (
    <>
      <Problem editor={editor} field="liquids" />
      <p className="leading-snug text-gravel">
        Run pump or nozzles into a container for a stretch of time, and measure the gallons.
      </p>
      {sheet.liquids.map((one, place) => {
        const reading = read.find(({ id }) => id === one.id);
        return (
          <fieldset key={one.id} className="mt-3 border-t border-rule pt-2">
            <legend className="float-left w-full font-semibold">
              {one.kind === "prewet" ? "Wetting the dry material" : "Liquid alone on the road"}
              {reading && <span className="font-normal">: {liquidWords(reading)}</span>}
            </legend>
            <div className="clear-both grid gap-2 pt-1">
              {liquidFields(one.kind).map(({ name, label, unit }) => (
                <YardField
                  key={name}
                  editor={editor}
                  field={`liquids.${one.id}.${name}`}
                  name={label}
                  label={label}
                  unit={unit}
                  value={one[name]}
                  onText={(text) => set(one.id, { [name]: text })}
                />
              ))}
            </div>
            <TakeOut
              isOff={isFinished}
              what={`liquid ${place + 1}`}
              onClick={() => change({ ...sheet, liquids: sheet.liquids.filter(({ id }) => id !== one.id) })}
            />
          </fieldset>
        );
      })}
      {!isFinished && (
        <div className="mt-3 grid grid-cols-2 gap-2">
          <YardKey onClick={() => add("prewet")}>Add wetting</YardKey>
          <YardKey onClick={() => add("direct")}>Add liquid alone</YardKey>
        </div>
      )}
    </>
  );
}

function liquidWords(reading: ReturnType<typeof readableReadings>["liquids"][number]) {
  const galPerMin = timedGalPerMin(reading);
  if (reading.kind === "prewet") {
    return `${prewetGalPerTon({ galPerMin, dryLbPerMin: reading.dryLbPerMin }).toFixed(1)} gal a ton of dry material`;
  }
  return `${directGalPerLaneMile({ galPerMin, speedMph: reading.speedMph, lanes: reading.lanes }).toFixed(1)} gal per lane mile`;
}
