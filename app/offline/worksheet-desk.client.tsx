import { useMemo, useRef, useState } from "react";
import { newReadingId, type Editor } from "#app/components/worksheet/editor.ts";
import { SettleVersions } from "#app/components/worksheet/settle-versions.tsx";
import { FootButton, SheetFrame } from "#app/components/worksheet/sheet-frame.tsx";
import { StepCard } from "#app/components/worksheet/step-card.tsx";
import { StepCatches } from "#app/components/worksheet/step-catches.tsx";
import { StepCautions } from "#app/components/worksheet/step-cautions.tsx";
import { StepCounts } from "#app/components/worksheet/step-counts.tsx";
import { StepDecision } from "#app/components/worksheet/step-decision.tsx";
import { StepGate } from "#app/components/worksheet/step-gate.tsx";
import { NotYet, StepRates } from "#app/components/worksheet/step-rates.tsx";
import { StepTruck } from "#app/components/worksheet/step-truck.tsx";
import { StepWithoutRates } from "#app/components/worksheet/step-without-rates.tsx";
import { workedOut, type WorkedOut } from "#app/components/worksheet/worked-out.ts";
import { Say } from "#app/components/worksheet/yard-field.tsx";
import {
  emptyWorksheet,
  stepOfField,
  type Worksheet,
  worksheetAtNewGate,
  worksheetProblems,
  type WorksheetReadings,
  worksheetReadings,
  readableReadings,
  type WorksheetStep,
  worksheetSteps,
} from "#app/domain/calibration/worksheet.ts";
import type { YardKit } from "#app/domain/calibration/yard-kit.ts";
import { readNumber } from "#app/domain/readings.ts";
import { sheetDifferences, settledSheet } from "./compare-sheets.ts";
import type { Draft } from "./draft.ts";
import type { Snapshot, Yard } from "./session.client.ts";
import { standingWords } from "./standing-words.ts";
import { todayOnPhone, useYard } from "./use-yard.client.ts";
import { useStep } from "./use-step.client.ts";
import { YardMessage, SendNotice } from "./yard-message.client.tsx";

/** One worksheet, from the phone's own store. */
export function WorksheetDesk({ clientRef }: { clientRef: string }) {
  const { yard, snapshot } = useYard(clientRef);
  const { kit, draft } = snapshot;
  if (snapshot.phase === "broken" || snapshot.phase === "absent" || !kit || !draft) {
    return <YardMessage snapshot={snapshot} />;
  }
  const truck = kit.trucks.find(({ id }) => id === draft.sheet.truckId);
  const material = kit.materials.find(({ id }) => id === draft.sheet.materialId);
  if (!truck || !material) {
    return <YardMessage snapshot={{ ...snapshot, phase: "absent" }} />;
  }
  if (draft.conflict) return <Settle yard={yard} snapshot={snapshot} draft={draft} kit={kit} />;
  return <Desk yard={yard} snapshot={snapshot} draft={draft} kit={kit} truck={truck} material={material} />;
}

type DeskProps = {
  yard: Yard;
  snapshot: Snapshot;
  draft: Draft;
  kit: YardKit;
  truck: Editor["truck"];
  material: Editor["material"];
};

/** What is not typed yet counts as wrong, and is left unsaid until somebody wants to go on. */
const afterTapMs = 300;
const notYetCodes = ["blank", "not-ticked", "no-count", "no-catch"];

function useEditor({ yard, draft, kit, truck, material }: DeskProps) {
  const { sheet } = draft;
  const [focused, setFocused] = useState<string | null>(null);
  const leaving = useRef<ReturnType<typeof setTimeout>>(undefined);
  const [attempted, setAttempted] = useState<readonly WorksheetStep[]>([]);
  const problems = useMemo(() => worksheetProblems(sheet, truck), [sheet, truck]);
  const earlier = useMemo(
    () =>
      kit.calibrations.filter(
        ({ id, truckId, materialId }) =>
          truckId === truck.id && materialId === material.id && id !== draft.calibrationId,
      ),
    [kit, truck, material, draft.calibrationId],
  );
  const byField = useMemo(() => {
    const shown = problems.filter(
      ({ field, code }) => attempted.includes(stepOfField(field)) || (!notYetCodes.includes(code) && field !== focused),
    );
    return new Map(shown.toReversed().map((problem) => [problem.field, problem]));
  }, [problems, attempted, focused]);
  const editor: Editor = {
    sheet,
    truck,
    material,
    band: kit.bands[material.kind],
    tolerancePercent: kit.tolerancePercent,
    earlier,
    change: yard.change,
    isFinished: draft.calibrationId !== null,
    problemOf: (field) => byField.get(field) ?? null,
  };
  function enter(target: EventTarget) {
    if (!(target instanceof HTMLInputElement)) return;
    clearTimeout(leaving.current);
    setFocused(target.name);
  }
  /** A little later, or the sentence that appears would push the key away from under the finger that is on it. */
  function leave() {
    clearTimeout(leaving.current);
    leaving.current = setTimeout(() => setFocused(null), afterTapMs);
  }
  return { editor, problems, enter, leave, attempt: (step: WorksheetStep) => setAttempted([...attempted, step]) };
}

const groups: { group: string; steps: readonly WorksheetStep[] }[] = [
  { group: "Before", steps: ["truck", "cautions", "gate"] },
  { group: "Count", steps: ["counts"] },
  { group: "Catch", steps: ["catches"] },
  { group: "Rates", steps: ["rates", "decision"] },
  { group: "Card", steps: ["card"] },
];
const wayOn: Record<WorksheetStep, string> = {
  truck: "Go on to the cautions",
  cautions: "Go on to the gate",
  gate: "Count the turns",
  counts: "Catch and weigh",
  catches: "See the rates",
  rates: "Decide on the gate",
  decision: "See the card",
  card: "Finish the sheet",
};

function Desk(props: DeskProps) {
  const { yard, snapshot, draft, truck, material } = props;
  const { sheet, running, calibrationId } = draft;
  const { step, go } = useStep(draft, truck);
  const { editor, problems, enter, leave, attempt } = useEditor(props);
  const needsWork = step === "rates" || step === "decision" || step === "card";
  const worked = useMemo(
    () => (needsWork ? workedOut({ sheet, truck, band: editor.band, earlier: editor.earlier }) : null),
    [needsWork, sheet, truck, editor.band, editor.earlier],
  );
  const readings = useMemo(() => (needsWork ? worksheetReadings(sheet) : null), [needsWork, sheet]);
  const isWaiting = draft.wantsFinish && draft.isDirty;
  const isTimed = sheet.method === "timed-catch";
  const order = worksheetSteps.filter((one) => !(isTimed && one === "counts"));

  function goOn() {
    const wrong = problems.find((one) => one.severity === "error" && stepOfField(one.field) === step);
    if (wrong) {
      attempt(step);
      requestAnimationFrame(() => document.getElementById(wrong.field)?.focus());
    } else if (step === "card") yard.finish();
    else go(order[order.indexOf(step) + 1] ?? "card");
  }

  async function weighAtNewGate(aimIn: number) {
    if (calibrationId === null) yard.finish();
    const clientRef = crypto.randomUUID();
    const head = { clientRef, truckId: truck.id, materialId: material.id, testedOn: todayOnPhone() };
    const counts = readableReadings(sheet).counts;
    const next: Worksheet =
      calibrationId === null
        ? { ...emptyWorksheet(head), counts: sheet.counts.map((count) => ({ ...count, id: newReadingId() })) }
        : worksheetAtNewGate(head, { calibrationId, counts });
    await yard.begin(next);
    window.location.assign(`/fleet/worksheets/${clientRef}?aim=${aimIn}#cautions`);
  }

  const isCounting = step === "counts" && running !== null;
  const isAtEnd = step === "card" && (calibrationId !== null || isWaiting || readings === null);
  const unfinished = new Set(
    problems.flatMap(({ severity, field }) => (severity === "error" ? [stepOfField(field)] : [])),
  );
  const steps = groups
    .filter(({ group }) => !(isTimed && group === "Count"))
    .map(({ group, steps: own }) => ({
      group,
      to: own.find((one) => unfinished.has(one)) ?? own[0] ?? "truck",
      isDone: group === "Rates" || group === "Card" ? calibrationId !== null : !own.some((one) => unfinished.has(one)),
      isCurrent: own.includes(step),
    }));
  return (
    <SheetFrame
      title={`Truck ${truck.unitNumber}, ${material.name.toLowerCase()}`}
      standing={standingWords(draft, snapshot.connection)}
      steps={steps}
      onStep={(to) => go(worksheetSteps.find((one) => one === to) ?? step)}
      foot={
        isCounting || isAtEnd ? undefined : (
          <FootButton onClick={goOn}>{wayOn[step === "gate" && isTimed ? "counts" : step]}</FootButton>
        )
      }
    >
      <SendNotice snapshot={snapshot} draft={draft} />
      <div onFocus={({ target }) => enter(target)} onBlur={leave}>
        <Step
          {...props}
          step={step}
          editor={editor}
          worked={worked}
          readings={readings}
          isWaiting={isWaiting}
          onNewGate={(aimIn) => void weighAtNewGate(aimIn)}
        />
      </div>
    </SheetFrame>
  );
}

type StepProps = DeskProps & {
  step: WorksheetStep;
  editor: Editor;
  worked: WorkedOut | null;
  readings: WorksheetReadings | null;
  isWaiting: boolean;
  onNewGate: (aimIn: number) => void;
};

function Step({ step, editor, worked, readings, isWaiting, onNewGate, yard, draft, truck }: StepProps) {
  switch (step) {
    case "truck":
      return <StepTruck editor={editor} />;
    case "cautions":
      return <StepCautions editor={editor} />;
    case "gate": {
      const aim = readNumber(new URLSearchParams(window.location.search).get("aim") ?? "");
      return <StepGate editor={editor} aimIn={aim.ok && aim.value > 0 && aim.value <= 24 ? aim.value : null} />;
    }
    case "counts":
      return <StepCounts editor={editor} running={draft.running} onRun={yard.run} />;
    case "catches":
      return <StepCatches editor={editor} />;
    case "card":
      if (readings || draft.calibrationId !== null) {
        return (
          <StepCard
            editor={editor}
            worked={worked}
            calibrationId={draft.calibrationId}
            isWaiting={isWaiting}
            serverProblems={draft.problems}
          />
        );
      }
      return <Missing editor={editor} truck={truck} />;
    default:
      if (!readings) return <Missing editor={editor} truck={truck} />;
      if (!worked) return <StepWithoutRates step={step} readings={readings} />;
      return step === "rates" ? (
        <StepRates editor={editor} worked={worked} />
      ) : (
        <StepDecision editor={editor} worked={worked} onNewGate={onNewGate} />
      );
  }
}

function Missing({ editor, truck }: { editor: Editor; truck: Editor["truck"] }) {
  const errors = worksheetProblems(editor.sheet, truck).filter(({ severity }) => severity === "error");
  return <NotYet missing={errors.map(({ field, message }) => ({ step: stepOfField(field), words: message }))} />;
}

function Settle({ yard, snapshot, draft, kit }: Omit<DeskProps, "truck" | "material">) {
  const { conflict, sheet, baseSheet } = draft;
  if (!conflict) return <Say>The two versions are settled.</Say>;
  const { theirs, device, calibrationId } = conflict;
  const truck = kit.trucks.find(({ id }) => id === theirs.truckId);

  async function asNewSheet() {
    const clientRef = crypto.randomUUID();
    await yard.begin({ ...sheet, clientRef });
    await yard.settle(theirs);
    window.location.assign(`/fleet/worksheets/${clientRef}`);
  }
  return (
    <SheetFrame
      title={`Truck ${truck?.unitNumber ?? ""}`}
      standing={standingWords(draft, snapshot.connection)}
      steps={[]}
    >
      <SettleVersions
        differences={sheetDifferences(sheet, theirs, baseSheet)}
        otherDevice={device}
        isTheirsFinished={calibrationId !== null}
        onSettle={(choices) =>
          void yard.settle(calibrationId === null ? settledSheet(sheet, theirs, choices, newReadingId) : theirs)
        }
        onNewSheet={() => void asNewSheet()}
      />
    </SheetFrame>
  );
}
