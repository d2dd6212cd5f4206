import { readInches } from "#app/domain/readings.ts";
import { formatInches } from "#app/lib/format.ts";
import type { Editor } from "./editor.ts";
import { GateDrawing } from "./gate-drawing.tsx";
import { Say, YardField } from "./yard-field.tsx";

/** The opening is measured; what the gate's own scale says is noted beside it. */
export function StepGate({ editor, aimIn }: { editor: Editor; aimIn: number | null }) {
  const { sheet, truck, earlier, change } = editor;
  const { gate } = sheet;
  const read = readInches(gate.openingText);
  const openingIn = read.ok && read.value > 0 && read.value <= 24 ? read.value : null;
  const last = earlier.find(({ isInForce }) => isInForce) ?? earlier[0];
  return (
    <>
      <Say>How far is the gate open? Measure from the bed to the lower edge.</Say>
      <p className="mt-2 leading-snug text-gravel">
        With everything stopped. What you measure counts, not the mark on the gate.
        {aimIn !== null && ` You are aiming for about ${formatInches(aimIn)} in.`}
      </p>
      <div className="mt-4 grid grid-cols-[1fr_auto] items-start gap-x-4">
        <YardField
          editor={editor}
          field="gate.openingText"
          name="Measured opening"
          label="Measured opening"
          unit="in"
          value={gate.openingText}
          onText={(openingText) => change({ ...sheet, gate: { ...gate, openingText } })}
          mode="text"
          hint="As on the rule: 1 7/8, or 1.875"
        />
        <GateDrawing openingIn={openingIn} wasIn={last ? last.gateOpeningIn : null} />
      </div>
      <div className="mt-5">
        <YardField
          editor={editor}
          field="gate.scaleMark"
          name="Mark on the gate's scale"
          label={
            <>
              Mark on the gate’s own scale <span className="font-normal text-gravel">(may be left empty)</span>
            </>
          }
          value={gate.scaleMark}
          onText={(scaleMark) => change({ ...sheet, gate: { ...gate, scaleMark } })}
          mode="text"
        />
      </div>
      <dl className="mt-5 grid grid-cols-[auto_1fr] gap-x-4 gap-y-1.5 border-t border-rule pt-3">
        <dt className="text-gravel">Last time</dt>
        <dd>{last ? `${formatInches(last.gateOpeningIn)} in` : "not weighed before"}</dd>
        <dt className="text-gravel">This gate’s most</dt>
        <dd>{truck.gateMaxIn === null ? "not recorded" : `${formatInches(truck.gateMaxIn)} in`}</dd>
        <dt className="text-gravel">Common practice</dt>
        <dd>near 2 in for salt, a little more for mix</dd>
      </dl>
    </>
  );
}
