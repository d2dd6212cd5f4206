import type { Transaction } from "sequelize";
import type { TownActor } from "#app/context.ts";
import { insertRows } from "#app/lib/bulk.server.ts";
import { now } from "#app/lib/clock.server.ts";
import { sha256 } from "#app/lib/secrets.server.ts";
import { type Stored, type StagedRow, StockShape } from "./staged.server.ts";

const insertEntry = `INSERT INTO stock_entry (client_ref, town_id, season_start_year, material_id, kind, day, quantity_lb,
  typed_quantity, typed_unit, lb_per_cubic_yard, price_cents, supplier, upload_id, upload_row, created_by_id, created_at)
  VALUES (?, ?, ?, ?, ?, ?, ?, ?, ?, ?, ?, ?, ?, ?, ?, ?)`;

/** A reference that the same row of the same file always gets. */
function rowRef(uploadId: number, sheetRow: number) {
  const hex = sha256(`upload ${uploadId} row ${sheetRow}`);
  return [hex.slice(0, 8), hex.slice(8, 12), `8${hex.slice(13, 16)}`, `8${hex.slice(17, 20)}`, hex.slice(20, 32)].join(
    "-",
  );
}

/** Put entries into the stock, each with the row of the file it came from. */
export async function storeStock(
  actor: TownActor,
  uploadId: number,
  rows: readonly StagedRow[],
  transaction: Transaction,
): Promise<Stored> {
  const entries = rows.map(({ sheetRow, staged }) => ({ sheetRow, entry: StockShape.parse(staged) }));
  const createdAt = now().toISOString().replace("T", " ").slice(0, 23);
  await insertRows(
    insertEntry,
    entries.map(({ sheetRow, entry }) => [
      rowRef(uploadId, sheetRow),
      actor.townId,
      entry.seasonStartYear,
      entry.materialId,
      entry.kind,
      entry.day,
      entry.quantityLb,
      entry.typedQuantity,
      entry.typedUnit,
      entry.lbPerCubicYard,
      entry.priceCents,
      entry.supplier,
      uploadId,
      sheetRow,
      actor.userId,
      createdAt,
    ]),
    transaction,
  );
  return {
    rowCount: entries.length,
    seasonStartYears: [...new Set(entries.map(({ entry }) => entry.seasonStartYear))],
    days: entries.map(({ entry }) => entry.day),
  };
}
