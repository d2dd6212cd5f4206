import type { Catch } from "#app/domain/calibration/catch-weight.ts";
import type { Count } from "#app/domain/calibration/count-rate.ts";
import type { TimedCatch } from "#app/domain/calibration/timed-catch.ts";
import { CalibrationCatch } from "#app/models/calibration-catch.server.ts";
import { CalibrationCount } from "#app/models/calibration-count.server.ts";
import { CalibrationLiquid } from "#app/models/calibration-liquid.server.ts";
import { CalibrationTimedCatch } from "#app/models/calibration-timed-catch.server.ts";
import { CalibrationVerification } from "#app/models/calibration-verification.server.ts";

/** What was counted and caught in the yard, as it was read. A calibration has counts and catches, or timed catches. */
export type Readings = {
  counts: Count[];
  catches: Catch[];
  timedCatches: (TimedCatch & { setting: number })[];
};

/** The readings as the rates take them; null where there are none to make rates of. */
export function dischargeReadings({ counts, catches, timedCatches }: Readings) {
  if (timedCatches.length > 0) return { timedCatches };
  return counts.length > 0 && catches.length > 0 ? { counts, catches } : null;
}

function grouped<Row extends { calibrationId: number }>(rows: readonly Row[]): Map<number, Row[]> {
  const groups = new Map<number, Row[]>();
  for (const row of rows) {
    const group = groups.get(row.calibrationId);
    if (group) group.push(row);
    else groups.set(row.calibrationId, [row]);
  }
  return groups;
}

/**
 * The raw readings of calibrations, in the order in which they were taken.
 *
 * @param ids - calibrations that the caller has already found to be the town's
 * @returns one entry for each id, with empty lists where there are no readings
 */
export async function readingsOf(ids: readonly number[]): Promise<Map<number, Readings>> {
  if (ids.length === 0) return new Map();
  const where = { calibrationId: [...ids] };
  const [counts, catches, timed] = await Promise.all([
    CalibrationCount.findAll({ where, order: ["setting"], raw: true }),
    CalibrationCatch.findAll({ where, order: ["position"], raw: true }),
    CalibrationTimedCatch.findAll({ where, order: ["position"], raw: true }),
  ]);
  const [countsById, catchesById, timedById] = [grouped(counts), grouped(catches), grouped(timed)];
  return new Map(
    ids.map((id) => [
      id,
      {
        counts: (countsById.get(id) ?? []).map(({ setting, revolutions, seconds }) => ({
          setting,
          revolutions,
          seconds,
        })),
        catches: (catchesById.get(id) ?? []).map(({ revolutions, grossLb, tareLb }) => ({
          revolutions,
          grossLb,
          tareLb,
        })),
        timedCatches: (timedById.get(id) ?? []).map(({ setting, seconds, grossLb, tareLb }) => ({
          setting,
          seconds,
          grossLb,
          tareLb,
        })),
      },
    ]),
  );
}

export type Verification = TimedCatch & { speedMph: number; commandedLbPerLaneMile: number };
export type LiquidReading = {
  kind: "prewet" | "direct";
  gallons: number;
  seconds: number;
  speedMph: number | null;
  lanes: number | null;
  dryLbPerMin: number | null;
};

/** The readings at simulated speeds of one calibration, in their order; empty where there are none. */
export async function verificationsOf(calibrationId: number): Promise<Verification[]> {
  const rows = await CalibrationVerification.findAll({ where: { calibrationId }, order: ["position"], raw: true });
  return rows.map(({ speedMph, commandedLbPerLaneMile, seconds, grossLb, tareLb }) => ({
    speedMph,
    commandedLbPerLaneMile,
    seconds,
    grossLb,
    tareLb,
  }));
}

/**
 * The liquid readings of calibrations, in their order.
 *
 * @param ids - calibrations that the caller has already found to be the town's
 * @returns an entry for those that have any
 */
export async function liquidsOf(ids: readonly number[]): Promise<Map<number, LiquidReading[]>> {
  if (ids.length === 0) return new Map();
  const where = { calibrationId: [...ids] };
  const found = grouped(await CalibrationLiquid.findAll({ where, order: ["position"], raw: true }));
  return new Map(
    [...found].map(([id, rows]) => [
      id,
      rows.map(({ kind, gallons, seconds, speedMph, lanes, dryLbPerMin }) => ({
        kind,
        gallons,
        seconds,
        speedMph,
        lanes,
        dryLbPerMin,
      })),
    ]),
  );
}
