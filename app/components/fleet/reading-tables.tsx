import { Heading } from "#app/components/layout/answer.tsx";
import { Over, Under } from "#app/components/ui/state-mark.tsx";
import { Timetable } from "#app/components/ui/timetable.tsx";
import { weightPerRevolution } from "#app/domain/calibration/catch-weight.ts";
import { verificationPoint, verifyGroundSpeed } from "#app/domain/calibration/verification.ts";
import { formatOneDecimal, formatWhole } from "#app/lib/format.ts";
import { exact, lanesWords, type Liquid, liquidRate } from "./liquid-words.tsx";

type Readings = {
  counts: readonly { setting: number; revolutions: number; seconds: number }[];
  catches: readonly { revolutions: number; grossLb: number; tareLb: number }[];
  timedCatches: readonly { setting: number; seconds: number; grossLb: number; tareLb: number }[];
};

/** The readings as they were taken, behind a toggle: whoever doubts a rate finds its roots here. */
export function RawReadings({ counts, catches, timedCatches }: Readings) {
  if (counts.length + catches.length + timedCatches.length === 0) return null;
  return (
    <details className="mt-10 border-t-2 border-line">
      <summary className="flex min-h-target list-none items-center text-l font-bold text-spruce underline decoration-1 underline-offset-4 hover:decoration-2">
        The readings as they were taken
      </summary>
      <div className="grid gap-x-12 gap-y-6 md:grid-cols-2">
        {counts.length > 0 && (
          <Timetable
            caption="Counts"
            onPhone="keep"
            columns={[
              { key: "setting", label: "setting" },
              { key: "revolutions", label: "turns", isNumeric: true },
              { key: "seconds", label: "counted", unit: "s", isNumeric: true },
            ]}
            rows={counts.map((count) => ({
              key: String(count.setting),
              cells: { setting: count.setting, revolutions: exact(count.revolutions), seconds: exact(count.seconds) },
            }))}
          />
        )}
        {catches.length > 0 && (
          <Timetable
            caption="Catches"
            onPhone="keep"
            columns={[
              { key: "number", label: "catch" },
              { key: "revolutions", label: "turns", isNumeric: true },
              { key: "gross", label: "gross", unit: "lb", isNumeric: true },
              { key: "tare", label: "tare", unit: "lb", isNumeric: true },
              { key: "each", label: "a turn", unit: "lb", isNumeric: true },
            ]}
            rows={catches.map((one, position) => ({
              key: String(position),
              cells: {
                number: position + 1,
                revolutions: exact(one.revolutions),
                gross: exact(one.grossLb),
                tare: exact(one.tareLb),
                each: weightPerRevolution(one).toFixed(2),
              },
            }))}
          />
        )}
        {timedCatches.length > 0 && (
          <Timetable
            caption="Timed catches"
            onPhone="keep"
            columns={[
              { key: "setting", label: "setting" },
              { key: "seconds", label: "caught over", unit: "s", isNumeric: true },
              { key: "gross", label: "gross", unit: "lb", isNumeric: true },
              { key: "tare", label: "tare", unit: "lb", isNumeric: true },
            ]}
            rows={timedCatches.map((one, position) => ({
              key: String(position),
              cells: {
                setting: one.setting,
                seconds: exact(one.seconds),
                gross: exact(one.grossLb),
                tare: exact(one.tareLb),
              },
            }))}
          />
        )}
      </div>
    </details>
  );
}

type VerificationProps = {
  readings: readonly {
    speedMph: number;
    commandedLbPerLaneMile: number;
    seconds: number;
    grossLb: number;
    tareLb: number;
  }[];
  lanesPerPass: number;
  tolerancePercent: number;
};

const verdictWords = {
  within: "within the tolerance",
  outside: "outside the tolerance",
  undecided: "too near the edge to say",
};

const overall = {
  within: "The controller lays what it is told to.",
  outside: "The controller does not lay what it is told to.",
  undecided:
    "Weighed this finely, it cannot be said whether the controller is within the tolerance. Catch over a longer time.",
};

function errorWords(percent: number, verdict: keyof typeof verdictWords) {
  const words = `${percent > 0 ? "+" : percent < 0 ? "−" : ""}${formatOneDecimal(Math.abs(percent))}`;
  if (verdict !== "outside") return words;
  return percent > 0 ? <Over isWordHidden>{words}</Over> : <Under isWordHidden>{words}</Under>;
}

/** Ground-speed control at simulated speeds: what it was told, and what was caught. */
export function VerificationSection({ readings, lanesPerPass, tolerancePercent }: VerificationProps) {
  if (readings.length === 0) return null;
  const points = readings.map((reading) => verificationPoint(reading, lanesPerPass));
  const { points: judged, verdict } = verifyGroundSpeed({ points, tolerancePercent });
  return (
    <section>
      <Heading>Ground-speed control</Heading>
      <p className="mb-3 max-w-measure">
        {overall[verdict]} The network’s tolerance is {formatOneDecimal(tolerancePercent)} %.
      </p>
      <Timetable
        caption="Told against caught, at simulated speeds"
        isCaptionHidden
        columns={[
          { key: "speed", label: "speed", unit: "mph" },
          { key: "commanded", label: "told", unit: "lb per lane mile", isNumeric: true },
          { key: "caught", label: "caught", unit: "lb per lane mile", isNumeric: true },
          { key: "error", label: "off by", unit: "%", isNumeric: true },
          { key: "plusMinus", label: "±", unit: "%", isNumeric: true },
          { key: "verdict", label: "verdict" },
        ]}
        rows={judged.map((point, position) => ({
          key: String(position),
          cells: {
            speed: exact(point.speedMph),
            commanded: formatWhole(point.commandedLbPerLaneMile),
            caught: formatWhole(point.caughtLbPerLaneMile),
            error: errorWords(point.errorPercent, point.verdict),
            plusMinus: formatOneDecimal(point.plusMinusPercent),
            verdict: verdictWords[point.verdict],
          },
        }))}
      />
    </section>
  );
}

/** Liquids: wetting at the spreader, or laid by themselves. */
export function LiquidSection({ readings }: { readings: readonly Liquid[] }) {
  if (readings.length === 0) return null;
  return (
    <section>
      <Heading>Liquids</Heading>
      <Timetable
        caption="Timed catches of liquid"
        isCaptionHidden
        columns={[
          { key: "kind", label: "liquid" },
          { key: "caught", label: "caught", unit: "gal", isNumeric: true },
          { key: "seconds", label: "over", unit: "s", isNumeric: true },
          { key: "at", label: "against" },
          { key: "rate", label: "gives", isNumeric: true },
        ]}
        rows={readings.map((reading, position) => ({
          key: String(position),
          cells: {
            kind: reading.kind === "prewet" ? "prewetting" : "direct liquid",
            caught: exact(reading.gallons),
            seconds: exact(reading.seconds),
            at:
              reading.kind === "prewet"
                ? `${reading.dryLbPerMin === null ? "–" : formatWhole(reading.dryLbPerMin)} lb of dry material a minute`
                : `${reading.speedMph === null ? "–" : exact(reading.speedMph)} mph, ${lanesWords(reading.lanes ?? 1)}`,
            rate: <b>{liquidRate(reading)}</b>,
          },
        }))}
      />
    </section>
  );
}
