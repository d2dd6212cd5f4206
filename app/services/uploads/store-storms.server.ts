import { QueryTypes, type Transaction } from "sequelize";
import type { TownActor } from "#app/context.ts";
import { insertRows } from "#app/lib/bulk.server.ts";
import { now } from "#app/lib/clock.server.ts";
import { db } from "#app/lib/db.server.ts";
import { type Stored, type StagedRow, StormShape } from "./staged.server.ts";

const insertStorm = `INSERT INTO storm (town_id, season_start_year, started_at, ended_at, kind, pavement_temp_f, passes,
  lane_miles_treated, hours, truck_id, route, note, upload_id, upload_row, created_by_id, created_at)
  VALUES (?, ?, ?, ?, ?, ?, ?, ?, ?, ?, ?, ?, ?, ?, ?, ?)`;

/** Put lines of a storm log into the season, each with the row of the file it came from: that row can be stored once. */
export async function storeStorms(
  actor: TownActor,
  uploadId: number,
  rows: readonly StagedRow[],
  transaction: Transaction,
): Promise<Stored> {
  const storms = rows.map(({ sheetRow, staged }) => ({ sheetRow, storm: StormShape.parse(staged) }));
  const createdAt = now().toISOString().replace("T", " ").slice(0, 23);
  await insertRows(
    insertStorm,
    storms.map(({ sheetRow, storm }) => [
      actor.townId,
      storm.seasonStartYear,
      storm.startedAt,
      storm.endedAt,
      storm.kind,
      storm.pavementTempF,
      storm.passes,
      storm.laneMilesTreated,
      storm.hours,
      storm.truckId,
      storm.route,
      storm.note,
      uploadId,
      sheetRow,
      actor.userId,
      createdAt,
    ]),
    transaction,
  );
  const [first, last] = [storms[0]?.sheetRow ?? 0, storms.at(-1)?.sheetRow ?? 0];
  const stored = await db.query<{ id: number; sheetRow: number }>(
    "SELECT id, upload_row AS sheetRow FROM storm WHERE upload_id = ? AND upload_row BETWEEN ? AND ?",
    { type: QueryTypes.SELECT, replacements: [uploadId, first, last], transaction },
  );
  const idByRow = new Map(stored.map(({ id, sheetRow }) => [sheetRow, id]));
  const uses = storms.flatMap(({ sheetRow, storm }) =>
    storm.uses.map(({ materialId, usedLb, usedGal }) => [idByRow.get(sheetRow) ?? null, materialId, usedLb, usedGal]),
  );
  await insertRows("INSERT INTO storm_material VALUES (?, ?, ?, ?)", uses, transaction);
  return {
    rowCount: storms.length,
    seasonStartYears: [...new Set(storms.map(({ storm }) => storm.seasonStartYear))],
    days: storms.map(({ storm }) => storm.startedAt.slice(0, 10)),
  };
}
