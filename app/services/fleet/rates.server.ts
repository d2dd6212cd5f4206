import {
  type BandSummary,
  bandSummary,
  type RateSheetRow,
  rateSheet,
  speedsFromTo,
} from "#app/domain/calibration/rate-sheet.ts";
import type { TruckFacts } from "#app/domain/fleet/truck.ts";
import type { BandInForce } from "../bands.server.ts";
import { dischargeReadings, type Readings } from "./readings.server.ts";

export type Rates = { rows: RateSheetRow[]; summary: BandSummary | null };

type Measured = {
  readings: Readings;
  truck: Pick<TruckFacts, "lanesPerPass" | "workingSpeedMph">;
  band: BandInForce;
};

/**
 * The full table of a calibration, with what it means at the working speed.
 *
 * @param stepMph - between the speeds of the table; the working speed has a column of its own besides
 * @returns null when no setting was measured, as after liquids or ground-speed verification alone
 */
export function ratesOf({ readings, truck, band }: Measured, stepMph: number): Rates | null {
  const measured = dischargeReadings(readings);
  if (measured === null) return null;
  const { lanesPerPass, workingSpeedMph } = truck;
  const speedsMph = [...new Set([...speedsFromTo(stepMph), workingSpeedMph])].sort((a, b) => a - b);
  return {
    rows: rateSheet({ ...measured, lanesPerPass, speedsMph, band }),
    summary: band && bandSummary({ ...measured, lanesPerPass, workingSpeedMph, band }),
  };
}
