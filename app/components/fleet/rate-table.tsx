import { useEffect, useRef } from "react";
import { InBand, Over, Under } from "#app/components/ui/state-mark.tsx";
import type { RateCell, RateSheetRow } from "#app/domain/calibration/rate-sheet.ts";
import { formatOneDecimal, formatWhole } from "#app/lib/format.ts";
import { type RateView, rateUnitWords, shownRate, shownWeight, speedUnitWords, speedWords } from "./shown-units.ts";

type Props = {
  rows: readonly RateSheetRow[];
  view: RateView;
  workingSetting: number;
  workingSpeedMph: number;
  caption: string;
};

function Marked({ place, words }: { place: RateCell["place"]; words: string }) {
  if (place === "over") return <Over isWordHidden>{words}</Over>;
  if (place === "under") return <Under isWordHidden>{words}</Under>;
  if (place === "in") return <InBand isWordHidden>{words}</InBand>;
  return words;
}

/** The rate, its ± under it, and its place by shape; a cell in the band is framed besides. */
function Cell({ cell, view, lanes }: { cell: RateCell; view: RateView; lanes: number }) {
  const perLane = shownRate(cell.lbPerLaneMile, view.units);
  const factor = view.basis === "lane" ? 1 : lanes;
  const plusMinus = cell.plusMinus === null ? null : shownRate(cell.plusMinus, view.units) * factor;
  const frame =
    cell.place === "in" ? "border-2 border-beacon-ink bg-beacon-wash rounded-plate" : "border-2 border-transparent";
  return (
    <span className={`-my-1 inline-block px-1.5 py-0.5 leading-tight whitespace-nowrap ${frame}`}>
      <Marked place={cell.place} words={formatWhole(perLane * factor)} />
      {plusMinus !== null && <span className="block text-s text-gravel">± {formatWhole(plusMinus)}</span>}
    </span>
  );
}

/** Every setting at every speed. It scrolls sideways in its own frame; settings stay in view. */
export function RateTable({ rows, view, workingSetting, workingSpeedMph, caption }: Props) {
  const speeds = rows[0]?.cells.map(({ mph }) => mph) ?? [];
  const region = useRef<HTMLDivElement>(null);
  // Where there is no room for all speeds, the working speed is the one to see first.
  useEffect(() => {
    const frame = region.current;
    const column = frame?.querySelector<HTMLElement>("[data-working-speed]");
    if (frame && column) frame.scrollLeft = column.offsetLeft - frame.clientWidth / 2;
  }, []);
  const hasCounts = rows.some(({ revPerMin }) => revPerMin !== null);
  const weightUnit = view.units === "us" ? "lb" : "kg";
  return (
    <div ref={region} className="relative overflow-x-auto" tabIndex={0} role="region" aria-label={caption}>
      <table className="w-full border-collapse text-table">
        <caption className="sr-only">{caption}</caption>
        <thead>
          <tr className="align-bottom leading-tight">
            <th
              scope="col"
              className="sticky left-0 z-1 border-b-2 border-line bg-salt py-1.5 pr-3 text-left font-semibold"
            >
              setting
            </th>
            {hasCounts && (
              <th scope="col" className="border-b-2 border-line py-1.5 pr-3 text-right font-semibold max-sm:hidden">
                turns a minute
              </th>
            )}
            <th scope="col" className="border-b-2 border-line py-1.5 pr-3 text-right font-semibold max-sm:hidden">
              {weightUnit} a minute
            </th>
            {speeds.map((speedMph) => (
              <th
                key={speedMph}
                scope="col"
                data-working-speed={speedMph === workingSpeedMph ? "" : undefined}
                className={`border-b-2 border-line px-1.5 py-1.5 text-right font-semibold whitespace-nowrap ${speedMph === workingSpeedMph ? "bg-frost" : ""}`}
              >
                {speedWords(speedMph, view.units)} {speedUnitWords(view.units)}
              </th>
            ))}
          </tr>
        </thead>
        <tbody>
          {rows.map((row) => (
            <tr
              key={row.setting}
              className={`border-b border-rule last:border-line ${row.setting === workingSetting ? "bg-spruce-wash" : ""}`}
            >
              <th
                scope="row"
                className={`sticky left-0 z-1 py-2.5 pr-3 text-left font-bold ${row.setting === workingSetting ? "bg-spruce-wash" : "bg-salt"}`}
              >
                {row.setting}
                {row.isAtHydraulicLimit && <span className="block text-s font-normal text-gravel">at the limit</span>}
              </th>
              {hasCounts && (
                <td className="py-2.5 pr-3 text-right text-gravel max-sm:hidden">
                  {row.revPerMin === null ? "–" : formatOneDecimal(row.revPerMin)}
                </td>
              )}
              <td className="py-2.5 pr-3 text-right text-gravel max-sm:hidden">
                {formatOneDecimal(shownWeight(row.lbPerMin, view.units))}
              </td>
              {row.cells.map((cell) => (
                <td
                  key={cell.mph}
                  className={`py-2.5 text-right ${cell.mph === workingSpeedMph && row.setting !== workingSetting ? "bg-frost" : ""}`}
                >
                  <Cell cell={cell} view={view} lanes={cell.lbPerMile / cell.lbPerLaneMile} />
                </td>
              ))}
            </tr>
          ))}
        </tbody>
      </table>
      <p className="sr-only">Rates in {rateUnitWords(view)}.</p>
    </div>
  );
}
