import { type BandPlace, distanceFromBand } from "#app/domain/calibration/band.ts";
import { lbPerRevolution } from "#app/domain/calibration/catch-weight.ts";
import { type GateAdvice, gateAdvice, targetLbPerRev } from "#app/domain/calibration/gate-advice.ts";
import {
  bandSentence,
  bandSummary,
  rateSheet,
  type RateSheetRow,
  type RateSentencePart,
  speedsFromTo,
} from "#app/domain/calibration/rate-sheet.ts";
import { type WorksheetReadings, worksheetReadings } from "#app/domain/calibration/worksheet.ts";
import { seasonStartYearOf } from "#app/domain/dates.ts";
import type { Editor } from "./editor.ts";

type Given = Pick<Editor, "sheet" | "truck" | "band" | "earlier">;

export type WorkedOut = {
  gateOpeningIn: number;
  /** Around the working speed, for the phone's width. */
  nearSpeedsMph: number[];
  near: RateSheetRow[];
  /** From 5 to 45 mph by fives; worked out when somebody asks for it. */
  full: () => RateSheetRow[];
  sentence: RateSentencePart[];
  /** At the working setting and speed; null when that setting was not measured. */
  working: { lbPerLaneMile: number; plusMinus: number | null; place: BandPlace | null; distance: number } | null;
  /** Null when there is no band, or the working setting is in it, or catches were timed. */
  advice: (GateAdvice & { openingCount: number; isFitRefused: boolean }) | null;
};

/** Four speeds the truck drives at, by fives and the working one among them, within those of a rate sheet. */
function speedsNear(workingSpeedMph: number) {
  const all = speedsFromTo(5);
  const [slowest, fastest] = [Math.min(...all), Math.max(...all)];
  const around = [-20, -15, -10, -5, 0, 5, 10, 15, 20].map((step) => workingSpeedMph + step);
  const driven = around.filter((speed) => speed === workingSpeedMph || (speed >= slowest && speed <= fastest));
  const place = driven.indexOf(workingSpeedMph);
  const from = Math.max(0, Math.min(place - 2, driven.length - 4));
  return driven.slice(from, from + 4);
}

/** Other openings of this truck and material, weighed in the same season: the material is the same then. */
function otherOpenings({ sheet, earlier }: Given) {
  const season = seasonStartYearOf(sheet.testedOn);
  return earlier
    .filter(({ testedOn, catches }) => seasonStartYearOf(testedOn) === season && catches.length > 0)
    .map(({ gateOpeningIn, catches }) => ({ gateOpeningIn, lbPerRev: lbPerRevolution(catches) }));
}

/**
 * Everything that follows from a worksheet's readings, worked out on the phone.
 *
 * @returns null while a reading is missing or wrong, and when nothing was measured that gives a rate
 */
export function workedOut(given: Given): WorkedOut | null {
  const { sheet, truck, band } = given;
  const readings = worksheetReadings(sheet);
  if (!readings) return null;
  const { counts, catches, timedCatches, gateOpeningIn } = readings;
  if (gateOpeningIn === null) return null;
  if (timedCatches.length === 0 && (counts.length === 0 || catches.length === 0)) return null;
  const measured = sheet.method === "counts" ? { counts, catches } : { timedCatches };
  const all = { ...measured, lanesPerPass: truck.lanesPerPass, band };
  const nearSpeedsMph = speedsNear(truck.workingSpeedMph);
  const near = rateSheet({ ...all, speedsMph: nearSpeedsMph });
  const summary = band && bandSummary({ ...all, band, workingSpeedMph: truck.workingSpeedMph });
  const cell = rateSheet({ ...all, speedsMph: [truck.workingSpeedMph] }).find(
    ({ setting }) => setting === truck.workingSetting,
  )?.cells[0];
  const working = cell
    ? {
        lbPerLaneMile: cell.lbPerLaneMile,
        plusMinus: cell.plusMinus,
        place: cell.place,
        distance: band ? distanceFromBand(cell.lbPerLaneMile, band) : 0,
      }
    : null;
  return {
    gateOpeningIn,
    nearSpeedsMph,
    near,
    full: () => rateSheet({ ...all, speedsMph: speedsFromTo(5) }),
    sentence: bandSentence(summary).parts,
    working,
    advice: adviceFor(given, { gateOpeningIn, counts, catches, isInBand: working?.place === "in" }),
  };
}

type Weighed = Pick<WorksheetReadings, "counts" | "catches"> & { gateOpeningIn: number };

function adviceFor(given: Given, weighed: Weighed & { isInBand: boolean }): WorkedOut["advice"] {
  const { truck, band } = given;
  const { gateOpeningIn, counts, catches, isInBand } = weighed;
  if (!band || isInBand || catches.length === 0) return null;
  const target = targetLbPerRev({ counts, ...truck, band });
  if (target === null) return null;
  const own = { gateOpeningIn, lbPerRev: lbPerRevolution(catches) };
  const openings = [own, ...otherOpenings(given)];
  const openingCount = new Set(openings.map((one) => one.gateOpeningIn)).size;
  const wanted = { targetLbPerRev: target, gateMaxIn: truck.gateMaxIn };
  const fitted = gateAdvice({ weighed: openings, ...wanted });
  if (fitted.method !== "refused") return { ...fitted, openingCount, isFitRefused: false };
  // Openings that contradict each other give no line; the one weighed just now is known for certain.
  const proportional = gateAdvice({ weighed: [own], ...wanted });
  return proportional.method === "refused" ? null : { ...proportional, openingCount, isFitRefused: true };
}
