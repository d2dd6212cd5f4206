import type { DriftSpec } from "#app/components/charts/drift-spec.ts";
import type { RateFanSpec } from "#app/components/charts/rate-fan-spec.ts";
import { daysBetween } from "#app/domain/dates.ts";
import type { RateSheetRow } from "#app/domain/calibration/rate-sheet.ts";
import { type RateView, rateUnitWords, shownRate, shownSpeed, speedUnitWords } from "./shown-units.ts";

type Band = { lowLbPerLaneMile: number; highLbPerLaneMile: number } | null;
type Point = { workingSetting: number; workingSpeedMph: number; lanesPerPass: number };

function shownBand(band: Band, { units, basis }: RateView, lanes: number) {
  if (band === null) return null;
  const factor = basis === "lane" ? 1 : lanes;
  return {
    low: shownRate(band.lowLbPerLaneMile, units) * factor,
    high: shownRate(band.highLbPerLaneMile, units) * factor,
  };
}

/** What the rate fan draws of a rate sheet, in the units and on the basis chosen. */
export function fanSpec(rows: readonly RateSheetRow[], truck: Point, band: Band, view: RateView): RateFanSpec {
  const { units, basis, stepMph } = view;
  const lines = rows.flatMap(({ setting, isAtHydraulicLimit, cells }) => {
    const [cell] = cells;
    if (!cell) return [];
    const rate = shownRate(basis === "lane" ? cell.lbPerLaneMile : cell.lbPerMile, units);
    return [{ setting, isAtHydraulicLimit, rateAtOne: rate * shownSpeed(cell.mph, units) }];
  });
  return {
    rateUnit: rateUnitWords(view),
    speedUnit: speedUnitWords(units),
    lines,
    band: shownBand(band, view, truck.lanesPerPass),
    speeds: { from: shownSpeed(5, units), to: shownSpeed(45, units), step: shownSpeed(stepMph, units) },
    working: { setting: truck.workingSetting, speed: shownSpeed(truck.workingSpeedMph, units) },
  };
}

type Line = {
  id: number;
  testedOn: string;
  state: "ready" | "approved";
  working: { lbPerLaneMile: number; plusMinusLbPerLaneMile: number | null } | null;
};

/** What the drift chart draws: everything approved, and the one that is looked at. Null with nothing to draw. */
export function driftSpec(
  history: readonly Line[],
  ownId: number,
  band: Band,
  units: RateView["units"],
): DriftSpec | null {
  const first = history[0]?.testedOn;
  if (first === undefined) return null;
  const points = history.flatMap(({ id, testedOn, state, working }) => {
    if (working === null || (state === "ready" && id !== ownId)) return [];
    const { lbPerLaneMile, plusMinusLbPerLaneMile: plusMinus } = working;
    return [
      {
        testedOn,
        dayNumber: daysBetween(first, testedOn),
        rate: shownRate(lbPerLaneMile, units),
        plusMinus: plusMinus === null ? null : shownRate(plusMinus, units),
        isOurs: id === ownId,
      },
    ];
  });
  if (points.length < 2) return null;
  return {
    rateUnit: rateUnitWords({ units, basis: "lane" }),
    points,
    band: shownBand(band, { units, basis: "lane", stepMph: 5 }, 1),
  };
}
