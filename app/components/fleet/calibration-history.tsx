import { DriftChart } from "#app/components/charts/drift-chart.tsx";
import type { DriftSpec } from "#app/components/charts/drift-spec.ts";
import { Heading } from "#app/components/layout/answer.tsx";
import { TextLink } from "#app/components/ui/text-link.tsx";
import { Timetable } from "#app/components/ui/timetable.tsx";
import { formatOneDecimal, formatShortDay } from "#app/lib/format.ts";
import { gateInWords, gateWords } from "./fleet-words.ts";
import { LaysWords } from "./liquid-words.tsx";
import { rateUnitWords, type UnitChoice } from "./shown-units.ts";

type Line = {
  id: number;
  testedOn: string;
  gateOpeningIn: number | null;
  state: "ready" | "approved";
  driftPercent: number | null;
  isDriftClear: boolean | null;
} & NonNullable<Parameters<typeof LaysWords>[0]["line"]>;

type Props = {
  /** Oldest first. */
  lines: readonly Line[];
  ownId: number;
  inForceId: number | null;
  chart: { spec: DriftSpec; svg: { desk: string; phone: string } } | null;
  workingWords: string;
  units: UnitChoice;
};

function signed(percent: number) {
  return `${percent > 0 ? "+" : percent < 0 ? "−" : ""}${formatOneDecimal(Math.abs(percent))} %`;
}

function driftWords({ driftPercent, isDriftClear }: Line) {
  if (driftPercent === null) return "–";
  if (isDriftClear === null) return signed(driftPercent);
  return (
    <span>
      {isDriftClear ? <b>{signed(driftPercent)}</b> : signed(driftPercent)}
      <span className="block text-note font-normal text-gravel">
        {isDriftClear ? "more than the ± explains" : "within the ±"}
      </span>
    </span>
  );
}

function stateWords({ id, state }: Line, inForceId: number | null) {
  if (state === "ready") return <b>waits for approval</b>;
  return id === inForceId ? "in force" : <span className="text-gravel">history</span>;
}

function sentence(lines: readonly Line[], ownId: number) {
  const place = lines.findIndex(({ id }) => id === ownId);
  const own = lines[place];
  const before = lines.slice(0, Math.max(0, place)).findLast(({ state }) => state === "approved");
  if (!own || !before || own.driftPercent === null) return "There is no earlier calibration to compare this one with.";
  const moved = `Against the calibration before, it lays ${signed(own.driftPercent)}.`;
  if (before.gateOpeningIn !== own.gateOpeningIn) {
    return `${moved} The gate was moved between them, from ${gateInWords(before.gateOpeningIn)} to ${gateInWords(own.gateOpeningIn)}.`;
  }
  if (own.isDriftClear === null) return moved;
  return own.isDriftClear
    ? `${moved} That is more than the two measurements can be wrong: the truck has drifted.`
    : `${moved} That is no more than the two measurements can be wrong.`;
}

/** Earlier calibrations of the same truck and material, with how far each moved. */
export function CalibrationHistory({ lines, ownId, inForceId, chart, workingWords, units }: Props) {
  return (
    <section>
      <Heading>Over the years</Heading>
      <p className="mb-4 max-w-measure">{sentence(lines, ownId)}</p>
      {chart && <DriftChart spec={chart.spec} svg={chart.svg} title={`Rates at ${workingWords} over the years`} />}
      <div className="mt-4">
        <Timetable
          caption={`Every calibration with this material, newest first, at ${workingWords}`}
          columns={[
            { key: "day", label: "weighed" },
            { key: "gate", label: "gate", unit: "in", isNumeric: true },
            { key: "lays", label: "lays", unit: rateUnitWords({ units, basis: "lane" }), isNumeric: true },
            { key: "drift", label: "drift", isNumeric: true },
            { key: "state", label: "state" },
          ]}
          rows={[...lines].reverse().map((line) => ({
            key: String(line.id),
            isOurs: line.id === ownId,
            cells: {
              day:
                line.id === ownId ? (
                  formatShortDay(line.testedOn)
                ) : (
                  <TextLink to={`/fleet/calibrations/${line.id}`}>{formatShortDay(line.testedOn)}</TextLink>
                ),
              gate: gateWords(line.gateOpeningIn),
              lays: <LaysWords line={line} units={units} />,
              drift: driftWords(line),
              state: stateWords(line, inForceId),
            },
          }))}
        />
      </div>
    </section>
  );
}
