import { QueryTypes } from "sequelize";
import type { TownActor } from "#app/context.ts";
import { db } from "#app/lib/db.server.ts";

export type WorksheetLine = {
  clientRef: string;
  unitNumber: string;
  materialName: string;
  state: "open" | "finished";
  calibrationId: number | null;
  version: number;
  device: string;
  byName: string;
  /** ISO instant. */
  updatedAt: string;
  /** Versions that met a newer one and wait for somebody to settle them. */
  unsettledCount: number;
};

/** The town's worksheets that have arrived, open ones first, then those finished of late; newest first, at most 100. */
export async function listWorksheets(actor: TownActor): Promise<WorksheetLine[]> {
  const rows = await db.query<Omit<WorksheetLine, "updatedAt"> & { updatedAt: Date }>(
    `SELECT w.client_ref AS clientRef, t.unit_number AS unitNumber, m.name AS materialName, w.state,
            w.calibration_id AS calibrationId, w.version, w.device, u.name AS byName, w.updated_at AS updatedAt,
            (SELECT COUNT(*) FROM worksheet_version v WHERE v.worksheet_id = w.id AND v.settled_at IS NULL) AS unsettledCount
       FROM worksheet w JOIN truck t ON t.id = w.truck_id JOIN material m ON m.id = w.material_id
            JOIN user_account u ON u.id = w.updated_by_id
      WHERE w.town_id = ?
      ORDER BY w.state = 'finished', w.updated_at DESC LIMIT 100`,
    { type: QueryTypes.SELECT, replacements: [actor.townId] },
  );
  return rows.map((row) => ({
    clientRef: row.clientRef,
    unitNumber: row.unitNumber,
    materialName: row.materialName,
    state: row.state,
    calibrationId: row.calibrationId,
    version: row.version,
    device: row.device,
    byName: row.byName,
    updatedAt: row.updatedAt.toISOString(),
    unsettledCount: Number(row.unsettledCount),
  }));
}
