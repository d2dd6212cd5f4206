import { QueryTypes, type Transaction } from "sequelize";
import type { TownActor } from "#app/context.ts";
import { seasonLabel } from "#app/domain/dates.ts";
import { db } from "#app/lib/db.server.ts";
import { listWords } from "#app/lib/words.ts";
import { SeasonFigure } from "#app/models/season-figure.server.ts";
import { Upload, type UploadKind } from "#app/models/upload.server.ts";
import { recordAudit } from "../audit.server.ts";
import { storeCalibrations } from "./store-calibrations.server.ts";
import { storeSeasons } from "./store-seasons.server.ts";
import { storeStock } from "./store-stock.server.ts";
import { storeTrucks } from "./store-trucks.server.ts";
import { storeStorms } from "./store-storms.server.ts";
import { storeWeather } from "./store-weather.server.ts";
import { NotNow, type StagedRow, type Stored } from "./staged.server.ts";
import { type Step, settledNow } from "./steps.server.ts";

type Store = (
  actor: TownActor,
  uploadId: number,
  rows: readonly StagedRow[],
  transaction: Transaction,
) => Promise<Stored>;

const stores: Record<UploadKind, Store> = {
  storms: storeStorms,
  stock: storeStock,
  "season-figures": storeSeasons,
  calibrations: storeCalibrations,
  trucks: storeTrucks,
  weather: storeWeather,
};

const rowsAtATime = 1000;

/** The good rows in their order, some at a time. */
async function* readyRows(uploadId: number, transaction: Transaction): AsyncGenerator<StagedRow[]> {
  let after = 0;
  for (;;) {
    const rows = await db.query<{ sheetRow: number; staged: string }>(
      `SELECT sheet_row AS sheetRow, staged FROM upload_row
        WHERE upload_id = ? AND sheet_row > ? AND state IN ('ok', 'check') AND staged IS NOT NULL
        ORDER BY sheet_row LIMIT ${rowsAtATime}`,
      { type: QueryTypes.SELECT, replacements: [uploadId, after], transaction },
    );
    const last = rows.at(-1);
    if (!last) return;
    after = last.sheetRow;
    yield rows.map(({ sheetRow, staged }) => {
      const value: unknown = JSON.parse(staged);
      return { sheetRow, staged: value };
    });
  }
}

/** The seasons must still be the town's to change when everything is stored: sending one in waits for this lock. */
async function assertSeasonsOpen(actor: TownActor, seasonStartYears: ReadonlySet<number>, transaction: Transaction) {
  if (seasonStartYears.size === 0) return;
  const figures = await SeasonFigure.findAll({
    attributes: ["id", "seasonStartYear", "state"],
    where: { townId: actor.townId, seasonStartYear: [...seasonStartYears] },
    lock: transaction.LOCK.UPDATE,
    transaction,
  });
  const closed = figures.filter(({ state }) => state === "sent" || state === "accepted");
  if (closed.length === 0) return;
  const names = listWords(closed.map(({ seasonStartYear }) => seasonLabel(seasonStartYear)));
  throw new NotNow(
    `${names} was sent in meanwhile, so nothing was taken in. Check the file again to see what is left.`,
  );
}

const replaceable = {
  storms: { table: "storm", day: "started_at" },
  stock: { table: "stock_entry", day: "day" },
} as const;

/** Rows of earlier files, in the same seasons and between the first and the last day of this one, give way to it. */
async function replaceEarlier(
  actor: TownActor,
  upload: Upload,
  found: { seasons: ReadonlySet<number>; firstDay: string; lastDay: string },
  transaction: Transaction,
) {
  if (upload.kind !== "storms" && upload.kind !== "stock") return;
  const { table, day } = replaceable[upload.kind];
  const where = `town_id = ? AND upload_id IS NOT NULL AND upload_id <> ? AND season_start_year IN (?)
    AND ${day} >= ? AND ${day} < DATE_ADD(?, INTERVAL 1 DAY)`;
  const replacements = [actor.townId, upload.id, [...found.seasons], found.firstDay, found.lastDay];
  const earlier = await db.query<{ uploadId: number; rowCount: number }>(
    `SELECT upload_id AS uploadId, COUNT(*) AS rowCount FROM ${table} WHERE ${where} GROUP BY upload_id`,
    { type: QueryTypes.SELECT, replacements, transaction },
  );
  for (const { uploadId, rowCount } of earlier) {
    await db.query("INSERT INTO upload_replacement VALUES (?, ?, ?)", {
      type: QueryTypes.INSERT,
      replacements: [upload.id, uploadId, rowCount],
      transaction,
    });
  }
  let left = earlier.reduce((sum, { rowCount }) => sum + rowCount, 0);
  while (left > 0) {
    await db.query(`DELETE FROM ${table} WHERE ${where} LIMIT 5000`, {
      type: QueryTypes.DELETE,
      replacements,
      transaction,
    });
    left -= 5000;
  }
}

async function storeAll(actor: TownActor, upload: Upload, transaction: Transaction) {
  const seasons = new Set<number>();
  let [rowCount, firstDay, lastDay]: [number, string | null, string | null] = [0, null, null];
  for await (const rows of readyRows(upload.id, transaction)) {
    const stored = await stores[upload.kind](actor, upload.id, rows, transaction);
    rowCount += stored.rowCount;
    for (const year of stored.seasonStartYears) seasons.add(year);
    for (const day of stored.days) {
      if (firstDay === null || day < firstDay) firstDay = day;
      if (lastDay === null || day > lastDay) lastDay = day;
    }
  }
  if (rowCount === 0) throw new NotNow("No row of this file is ready, so nothing was taken in.");
  await assertSeasonsOpen(actor, seasons, transaction);
  if (upload.isReplacing && firstDay !== null && lastDay !== null) {
    await replaceEarlier(actor, upload, { seasons, firstDay, lastDay }, transaction);
  }
  return { rowsAccepted: rowCount, periodStart: firstDay, periodEnd: lastDay };
}

/** Take every good row in: all in one transaction, or none. */
export async function runAccept({ upload, actor, write }: Step): Promise<void> {
  try {
    await write({}, async (transaction) => {
      const taken = await storeAll(actor, upload, transaction);
      await Upload.update(
        { state: "accepted", ...taken, ...settledNow(actor) },
        { where: { id: upload.id }, transaction },
      );
      const detail = { kind: upload.kind, ...taken, leftOut: upload.rowsLeftOut + upload.rowsError };
      await recordAudit(actor, { action: "upload.accept", entity: "upload", entityId: upload.id, detail }, transaction);
    });
  } catch (error) {
    if (!(error instanceof NotNow)) throw error;
    await write({ state: "checked", failure: error.message }, async () => {});
  }
}
