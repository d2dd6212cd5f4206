import { Heading } from "#app/components/layout/answer.tsx";
import { Timetable } from "#app/components/ui/timetable.tsx";
import type { GateAdvice } from "#app/domain/calibration/gate-advice.ts";
import type { Savings } from "#app/domain/calibration/savings.ts";
import { lbPerShortTon, milesToKm } from "#app/domain/units.ts";
import { formatInches, formatOneDecimal, formatWhole } from "#app/lib/format.ts";
import { listWords } from "#app/lib/words.ts";
import { GateDrawing } from "./gate-drawing.tsx";
import { WorkingRateWords } from "./rate-words.tsx";
import {
  rateUnitWords,
  shownRate,
  shownWeight,
  speedUnitWords,
  speedWords,
  type UnitChoice,
  weightUnitWords,
} from "./shown-units.ts";

type Place = "under" | "in" | "over" | null;
type Working = { lbPerLaneMile: number; plusMinusLbPerLaneMile: number | null; place: Place };

type DecisionView =
  | { kind: "leave" }
  | { kind: "none"; reason: "no-band" | "not-counted" | "timed" | "not-rising" | "gate-shut" }
  | { kind: "move"; advice: GateAdvice; expected: { lbPerLaneMile: number; place: Place }; savings: Savings };

type Props = {
  decision: DecisionView;
  gateOpeningIn: number;
  working: Working | null;
  truck: { workingSetting: number; workingSpeedMph: number; gateMaxIn: number | null };
  eventCount: number | null;
  /** Settings that lie in the band at the working speed with the gate as it is. */
  inBandSettings: readonly number[];
  units: UnitChoice;
};

const noAdvice = {
  "no-band": "There is no band for this material, so there is nothing to move the gate towards.",
  "not-counted": "The working setting was not measured, so no gate can be advised for it.",
  timed: "This was a timed catch without counts. A gate can be advised once the shaft’s turns are counted.",
  "not-rising":
    "The openings weighed this season do not rise together with what was caught. Weigh again at this gate first.",
  "gate-shut": "By the openings weighed, only a shut gate would reach the band. Another setting or speed is needed.",
};

/** What to do about the gate. A yardstick: the director decides. */
export function Decision(props: Props) {
  const { decision, gateOpeningIn, truck, units } = props;
  return (
    <section>
      <Heading id="gate">The gate</Heading>
      {decision.kind === "none" ? (
        <p className="max-w-measure">{noAdvice[decision.reason]}</p>
      ) : decision.kind === "leave" ? (
        <p className="max-w-measure">
          <b>Leave the gate at {formatInches(gateOpeningIn)} in.</b> Setting {truck.workingSetting} is in the band at{" "}
          {speedWords(truck.workingSpeedMph, units)} {speedUnitWords(units)}.
        </p>
      ) : (
        <Move {...props} decision={decision} />
      )}
    </section>
  );
}

function Move({
  decision: { advice, expected, savings },
  gateOpeningIn,
  working,
  truck,
  eventCount,
  inBandSettings,
  units,
}: Props & { decision: Extract<DecisionView, { kind: "move" }> }) {
  const to = advice.nearestSixteenthIn;
  const verb = to < gateOpeningIn ? "Close" : "Open";
  return (
    <div className="grid gap-x-10 gap-y-6 md:grid-cols-[17rem_minmax(0,1fr)]">
      <GateDrawing fromIn={gateOpeningIn} toIn={to} />
      <div>
        <h3 className="text-xl leading-snug font-bold">
          {to === gateOpeningIn
            ? "The gate is as near as a rule can set it"
            : `${verb} the gate to about ${formatInches(to)} in`}
        </h3>
        <p className="mt-1 max-w-measure text-pretty">
          Setting {truck.workingSetting} then lays about {formatWhole(shownRate(expected.lbPerLaneMile, units))}{" "}
          {rateUnitWords({ units, basis: "lane" })} at {speedWords(truck.workingSpeedMph, units)}{" "}
          {speedUnitWords(units)}. Stop everything first. The counts stay good: only the catch is weighed again.
        </p>
        <p className="mt-2 max-w-measure text-note text-pretty text-gravel">{howWords(advice)}</p>
        {inBandSettings.length > 0 && (
          <p className="mt-2 max-w-measure text-pretty">
            With the gate as it is, setting {listWords(inBandSettings.map(String))} lies in the band at that speed
            already.
          </p>
        )}
        {advice.isBeyondMax && (
          <p className="mt-2 max-w-measure font-semibold text-rust">
            That is wider than this truck’s gate opens ({formatInches(truck.gateMaxIn ?? 0)} in). Another setting or
            speed is needed.
          </p>
        )}
        <div className="mt-5">
          <BeforeAfter
            caption="Before and after"
            before={{ name: `now, ${formatInches(gateOpeningIn)} in`, working }}
            after={{
              name: `then, about ${formatInches(to)} in`,
              working: { ...expected, plusMinusLbPerLaneMile: null },
            }}
            savings={savings}
            units={units}
          />
          <SavingsWords savings={savings} eventCount={eventCount} units={units} isExpected />
        </div>
      </div>
    </div>
  );
}

function howWords({ method, reach, isBeyondReach }: GateAdvice) {
  if (method === "proportional" || reach === null) {
    return "Worked out in proportion from one opening, which is a starting point only: discharge follows the gate roughly.";
  }
  const range = `from ${formatInches(reach.fromIn)} to ${formatInches(reach.toIn)} in`;
  return isBeyondReach
    ? `By a line through the openings weighed this season, ${range}. This one lies outside them, so it is a guess.`
    : `By a line through the openings weighed this season, ${range}. This one lies between them.`;
}

/** What falls on a lane mile, on a lane kilometre when those are shown. */
function perShownLength(onEachMile: number, units: UnitChoice) {
  return units === "us" ? onEachMile : onEachMile / milesToKm(1);
}

type Side = { name: string; working: Working | null };

/** Two openings side by side, at the working setting and speed. */
export function BeforeAfter({
  caption,
  before,
  after,
  savings,
  units,
}: {
  caption: string;
  before: Side;
  after: Side;
  savings: Savings;
  units: UnitChoice;
}) {
  const money = (cents: number | null) => (cents === null ? "–" : `$${(cents / 100).toFixed(2)}`);
  return (
    <Timetable
      caption={caption}
      isCaptionHidden
      onPhone="keep"
      columns={[
        { key: "what", label: units === "us" ? "on each lane mile" : "on each lane km" },
        { key: "before", label: before.name, isNumeric: true },
        { key: "after", label: after.name, isNumeric: true },
        { key: "saved", label: "saved", isNumeric: true },
      ]}
      rows={[
        {
          key: "material",
          cells: {
            what: `material, ${weightUnitWords(units)}`,
            before: <WorkingRateWords working={before.working} units={units} />,
            after: <WorkingRateWords working={after.working} units={units} />,
            saved: (
              <span className="whitespace-nowrap">
                {formatWhole(shownRate(savings.savedLbPerLaneMile, units))} ({formatWhole(savings.savedPercent)} %)
              </span>
            ),
          },
        },
        {
          key: "money",
          cells: {
            what: "money",
            before: "",
            after: "",
            saved: money(
              savings.savedCentsPerLaneMile === null ? null : perShownLength(savings.savedCentsPerLaneMile, units),
            ),
          },
        },
      ]}
    />
  );
}

export function SavingsWords({
  savings: { season, savedLbPerLaneMile },
  eventCount,
  units,
  isExpected = false,
}: {
  savings: Savings;
  eventCount: number | null;
  units: UnitChoice;
  isExpected?: boolean;
}) {
  if (season === null || eventCount === null) return null;
  const savedLb = perShownLength(Math.abs(season.savedTons) * lbPerShortTon, units);
  const tons =
    units === "us"
      ? `${formatOneDecimal(savedLb / lbPerShortTon)} tons`
      : `${formatOneDecimal(shownWeight(savedLb, units) / 1000)} tonnes`;
  const dollars =
    season.savedCents === null ? "" : `, $${formatWhole(perShownLength(Math.abs(season.savedCents), units) / 100)}`;
  const word = savedLbPerLaneMile < 0 ? "more" : "less";
  return (
    <p className="mt-2 max-w-measure text-note text-gravel">
      Over a season of {formatWhole(eventCount)} events, one pass each: {tons} {word}
      {dollars}, on every lane {units === "us" ? "mile" : "km"} this truck does.
      {isExpected && " Expected, not measured."}
    </p>
  );
}
