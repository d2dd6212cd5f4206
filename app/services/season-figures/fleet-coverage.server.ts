import { QueryTypes } from "sequelize";
import { seasonEnd, seasonStart } from "#app/domain/dates.ts";
import { db } from "#app/lib/db.server.ts";

export type FleetCoverage = { truckCount: number; calibratedCount: number };

/**
 * How many of a town's spreading trucks were calibrated for a season: approved, and tested within it. Trucks with tanks
 * alone are not counted.
 */
export async function fleetCoverage(townId: number, seasonStartYear: number): Promise<FleetCoverage> {
  const [counts] = await db.query<FleetCoverage>(
    `SELECT COUNT(*) AS truckCount, COALESCE(SUM(EXISTS (
              SELECT 1 FROM calibration c
               WHERE c.truck_id = t.id AND c.state = 'approved' AND c.tested_on BETWEEN :from AND :to)), 0)
              AS calibratedCount
       FROM truck t WHERE t.town_id = :townId AND t.is_in_service = 1 AND t.spreader_kind <> 'liquid-tanks'`,
    {
      type: QueryTypes.SELECT,
      replacements: { townId, from: seasonStart(seasonStartYear), to: seasonEnd(seasonStartYear) },
    },
  );
  return { truckCount: counts?.truckCount ?? 0, calibratedCount: Number(counts?.calibratedCount ?? 0) };
}
