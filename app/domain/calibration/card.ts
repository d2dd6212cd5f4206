import { type LocalDate, seasonEnd, seasonStartYearOf } from "#app/domain/dates.ts";
import type { Band } from "./band.ts";
import type { DischargeReadings } from "./discharge.ts";
import { bandSummary, rateSheet } from "./rate-sheet.ts";

export type CabCardCell = { mph: number; wholeLbPerLaneMile: number; inBand: boolean };
export type CabCardRow = { setting: number; isAtHydraulicLimit: boolean; cells: CabCardCell[] };

export type CabCard = {
  unitNumber: string;
  materialName: string;
  gateOpeningIn: number;
  gateScaleMark: string | null;
  testedOn: LocalDate;
  testedBy: string;
  lanesPerPass: number;
  rows: CabCardRow[];
  /** Last day on which the card holds: the end of the season it was tested for. */
  validUntil: LocalDate;
  /** Lines for the card; they say what was measured, never what to apply. */
  words: { basis: string; band: string; limit: string | null };
};

const settingWords = (settings: readonly number[]) =>
  settings.length === 0 ? "no setting" : `setting${settings.length > 1 ? "s" : ""} ${settings.join(", ")}`;

function bandWords(
  readings: DischargeReadings & { lanesPerPass: number; workingSpeedMph: number },
  band: Band | null,
): string {
  if (!band) return "No band for this material";
  return `In the band at ${readings.workingSpeedMph} mph: ${settingWords(bandSummary({ ...readings, band }).inBandSettings)}`;
}

/**
 * What stands on a truck's cab card for one material.
 *
 * The only figures that are rounded here: a driver reads whole pounds. Whether a cell is in the band is judged by the
 * rate before rounding, so card and rate sheet agree.
 *
 * @param input - counts and catches, or timed catches; gate in inches; lanes a whole number from 1 up; speeds > 0, kept
 *   in their order; the band, or null when the material has none
 * @returns rows ascending by setting, whole lb per lane mile; valid until 30 June after the test
 * @throws RangeError when a reading, speed, lane or date is out of range
 * @example cabCard({ ...truck, counts, catches, speedsMph: [20, 25], workingSpeedMph: 25, band }).words.band
 *   // "In the band at 25 mph: setting 2"
 */
export function cabCard({
  unitNumber,
  materialName,
  gateOpeningIn,
  gateScaleMark,
  testedOn,
  testedBy,
  speedsMph,
  workingSpeedMph,
  band,
  ...readings
}: DischargeReadings & {
  unitNumber: string;
  materialName: string;
  gateOpeningIn: number;
  gateScaleMark: string | null;
  testedOn: LocalDate;
  testedBy: string;
  lanesPerPass: number;
  speedsMph: readonly number[];
  workingSpeedMph: number;
  band: Band | null;
}): CabCard {
  const { lanesPerPass } = readings;
  const rows = rateSheet({ ...readings, speedsMph, band }).map(({ setting, isAtHydraulicLimit, cells }) => ({
    setting,
    isAtHydraulicLimit,
    cells: cells.map((cell) => ({
      mph: cell.mph,
      wholeLbPerLaneMile: Math.round(cell.lbPerLaneMile),
      inBand: cell.place === "in",
    })),
  }));
  const limited = rows.filter((row) => row.isAtHydraulicLimit).map(({ setting }) => setting);
  const lastRising = rows.filter((row) => !row.isAtHydraulicLimit).at(-1);
  return {
    unitNumber,
    materialName,
    gateOpeningIn,
    gateScaleMark,
    testedOn,
    testedBy,
    lanesPerPass,
    rows,
    validUntil: seasonEnd(seasonStartYearOf(testedOn)),
    words: {
      basis: `lb per lane mile, ${lanesPerPass === 1 ? "one lane" : `${lanesPerPass} lanes`} in a pass`,
      band: bandWords({ ...readings, workingSpeedMph }, band),
      limit:
        lastRising && limited.length > 0
          ? `Hydraulics at their limit: ${settingWords(limited)} as setting ${lastRising.setting}`
          : null,
    },
  };
}
