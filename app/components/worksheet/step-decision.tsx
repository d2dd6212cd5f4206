import { Over, Under } from "#app/components/ui/state-mark.tsx";
import { formatInches, formatWhole } from "#app/lib/format.ts";
import { beforeAfter } from "#app/domain/calibration/savings.ts";
import type { Editor } from "./editor.ts";
import { GateDrawing } from "./gate-drawing.tsx";
import type { WorkedOut } from "./worked-out.ts";
import { Say, YardKey } from "./yard-field.tsx";

type Props = { editor: Editor; worked: WorkedOut; onNewGate: (aimIn: number) => void };

/** Whether the gate stays: advice from what was weighed, never an order. */
export function StepDecision({ editor, worked, onNewGate }: Props) {
  const { truck, band } = editor;
  const { working, advice, gateOpeningIn } = worked;
  if (!band) {
    return (
      <>
        <Say>There is no band for this material, so there is nothing to hold the gate against.</Say>
        <p className="mt-2 text-gravel">Finish the sheet; the director decides whether it becomes the one in force.</p>
      </>
    );
  }
  if (!working) {
    return (
      <>
        <Say>Setting {truck.workingSetting}, the working one, is not measured, so the gate cannot be judged.</Say>
        <p className="mt-2 text-gravel">Measure it, or finish the sheet as it stands.</p>
      </>
    );
  }
  const at = `Setting ${truck.workingSetting} at ${truck.workingSpeedMph} mph`;
  if (working.place === "in") {
    return (
      <>
        <Say>
          {at} lands in the band. The gate can stay at {formatInches(gateOpeningIn)} in.
        </Say>
        <Facts editor={editor} worked={worked} />
      </>
    );
  }
  const off = `${formatWhole(Math.max(1, Math.abs(working.distance)))} lb ${working.distance > 0 ? "above" : "below"} the band`;
  return (
    <>
      <Say>
        {at} lies{" "}
        <span className="whitespace-nowrap">{working.distance > 0 ? <Over>{off}</Over> : <Under>{off}</Under>}.</span>
      </Say>
      <Facts editor={editor} worked={worked} />
      <Advice editor={editor} worked={worked} advice={advice} onNewGate={onNewGate} />
    </>
  );
}

function Facts({ editor: { truck, band }, worked: { working, gateOpeningIn } }: Pick<Props, "editor" | "worked">) {
  return (
    <dl className="mt-3 grid grid-cols-[auto_1fr] gap-x-4 gap-y-1 border-t border-rule pt-2.5">
      <dt className="text-gravel">Lays</dt>
      <dd>
        <b>
          {formatWhole(working?.lbPerLaneMile ?? null)}
          {working?.plusMinus == null ? "" : ` ± ${formatWhole(working.plusMinus)}`} lb
        </b>{" "}
        per lane mile, {truck.lanesPerPass === 1 ? "one lane" : `${truck.lanesPerPass} lanes`} in a pass
      </dd>
      <dt className="text-gravel">Band</dt>
      <dd>
        {band?.lowLbPerLaneMile} to {band?.highLbPerLaneMile} lb
      </dd>
      <dt className="text-gravel">Gate</dt>
      <dd>{formatInches(gateOpeningIn)} in</dd>
    </dl>
  );
}

function Advice({ editor, worked, advice, onNewGate }: Props & { advice: WorkedOut["advice"] }) {
  const { truck, band, isFinished } = editor;
  if (!advice || !band || !worked.working) {
    return (
      <p className="mt-4 leading-snug">
        After catches by time, close or open the gate by hand, measure it, and catch again.
      </p>
    );
  }
  const { openingIn, nearestSixteenthIn, reach, isBeyondMax, isBeyondReach, isFitRefused } = advice;
  const middle = (band.lowLbPerLaneMile + band.highLbPerLaneMile) / 2;
  const { savedPercent } = beforeAfter({
    beforeLbPerLaneMile: worked.working.lbPerLaneMile,
    afterLbPerLaneMile: middle,
    laneMiles: null,
    eventCount: null,
    priceCentsPerTon: null,
  });
  const verb = openingIn < worked.gateOpeningIn ? "Close" : "Open";
  return (
    <section className="mt-4 border-t-2 border-line pt-3" aria-labelledby="advice">
      <div className="grid grid-cols-[auto_1fr] gap-x-3.5">
        <GateDrawing openingIn={nearestSixteenthIn} wasIn={worked.gateOpeningIn} />
        <div className="leading-snug">
          <h2 id="advice" className="text-l leading-tight font-bold">
            {verb} the gate to about <span className="whitespace-nowrap">{formatInches(nearestSixteenthIn)} in</span>
          </h2>
          <p className="mt-1">
            Setting {truck.workingSetting} should then lay about {formatWhole(middle)} at {truck.workingSpeedMph} mph,{" "}
            {Math.abs(savedPercent).toFixed(0)} % {savedPercent >= 0 ? "less" : "more"}.
          </p>
        </div>
      </div>
      <p className="mt-2 leading-snug text-gravel">
        {reach === null
          ? "In proportion to the one opening weighed: a starting point."
          : `From a line through ${advice.openingCount} openings, ${formatInches(reach.fromIn)} to ${formatInches(reach.toIn)} in${isBeyondReach ? ". This one lies outside them: only a guess." : "."}`}{" "}
        {isFitRefused &&
          "Earlier openings of this season do not fit it: a wider gate laid no more. Look for the cause. "}
        {isBeyondMax && "It is more than the most recorded for this gate. "}
        Stop everything before the gate is moved. The counts stay good; the catch does not: weigh one revolution at the
        new gate.
      </p>
      {!isFinished && (
        <p className="mt-2 leading-snug text-gravel">
          This sheet is finished as it is, as the record of the gate before.
        </p>
      )}
      <div className="mt-3 grid">
        <YardKey onClick={() => onNewGate(nearestSixteenthIn)}>Weigh one revolution at the new gate</YardKey>
      </div>
    </section>
  );
}
