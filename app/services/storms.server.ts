import { QueryTypes, type Transaction } from "sequelize";
import type { TownActor } from "#app/context.ts";
import type { MaterialKind } from "#app/domain/calibration/band.ts";
import type { StormKind } from "#app/domain/season/storm.ts";
import type { StormEntry, StormKnowledge } from "#app/domain/season/storm-cells.ts";
import { now } from "#app/lib/clock.server.ts";
import { db, inTransaction } from "#app/lib/db.server.ts";
import { notFound } from "#app/lib/errors.ts";
import { Material } from "#app/models/material.server.ts";
import { Storm } from "#app/models/storm.server.ts";
import { StormMaterial } from "#app/models/storm-material.server.ts";
import { Truck } from "#app/models/truck.server.ts";
import { recordAudit } from "./audit.server.ts";
import { seasonRefusal } from "./season-figures/open.server.ts";

export const stormsPerPage = 40;

export type StormView = {
  id: number;
  version: number;
  startedAt: string;
  endedAt: string | null;
  kind: StormKind;
  pavementTempF: number | null;
  passes: number | null;
  laneMilesTreated: number | null;
  hours: number | null;
  truckId: number | null;
  route: string;
  note: string;
  isUploaded: boolean;
  used: { materialId: number; usedLb: number | null; usedGal: number | null }[];
};

export type StormPage = {
  storms: StormView[];
  lineCount: number;
  page: number;
  pageCount: number;
  /** Why nothing may be changed; null while the season is open. */
  refusal: string | null;
};

type StormRow = Omit<StormView, "used" | "isUploaded"> & { isUploaded: number };

const columns = `id, version, DATE_FORMAT(started_at, '%Y-%m-%d %H:%i') AS startedAt,
  DATE_FORMAT(ended_at, '%Y-%m-%d %H:%i') AS endedAt, kind, pavement_temp_f AS pavementTempF, passes,
  lane_miles_treated AS laneMilesTreated, hours, truck_id AS truckId, route, note, upload_id IS NOT NULL AS isUploaded`;

async function withMaterials(rows: StormRow[]): Promise<StormView[]> {
  const used = await StormMaterial.findAll({ where: { stormId: rows.map(({ id }) => id) }, raw: true });
  return rows.map((row) => ({
    ...row,
    isUploaded: row.isUploaded === 1,
    used: used
      .filter(({ stormId }) => stormId === row.id)
      .map(({ materialId, usedLb, usedGal }) => ({ materialId, usedLb: usedLb ?? null, usedGal: usedGal ?? null })),
  }));
}

/**
 * One page of the town's storm log, oldest first.
 *
 * @param page - from 1; one beyond the last shows the last
 * @throws 404 when the network has not opened that season
 */
export async function listStorms(actor: TownActor, seasonStartYear: number, page: number): Promise<StormPage> {
  const where = { townId: actor.townId, seasonStartYear };
  const [lineCount, refusal] = await Promise.all([
    Storm.count({ where }),
    inTransaction((transaction) => seasonRefusal(actor.townId, seasonStartYear, transaction)),
  ]);
  const pageCount = Math.max(1, Math.ceil(lineCount / stormsPerPage));
  const shownPage = Math.min(Math.max(1, page), pageCount);
  const rows = await db.query<StormRow>(
    `SELECT ${columns} FROM storm WHERE town_id = ? AND season_start_year = ? ORDER BY started_at, id LIMIT ? OFFSET ?`,
    {
      type: QueryTypes.SELECT,
      replacements: [actor.townId, seasonStartYear, stormsPerPage, (shownPage - 1) * stormsPerPage],
    },
  );
  return { storms: await withMaterials(rows), lineCount, page: shownPage, pageCount, refusal };
}

/** One line of the town's log. @throws 404 when it is not the town's, or of another season */
export async function getStorm(actor: TownActor, seasonStartYear: number, stormId: number): Promise<StormView> {
  const rows = await db.query<StormRow>(
    `SELECT ${columns} FROM storm WHERE id = ? AND town_id = ? AND season_start_year = ?`,
    { type: QueryTypes.SELECT, replacements: [stormId, actor.townId, seasonStartYear] },
  );
  const [storm] = await withMaterials(rows);
  if (!storm) throw notFound("storm");
  return storm;
}

/** What a town's log is written with: its materials and trucks. */
export async function getStormKnowledge(actor: TownActor, seasonStartYear: number): Promise<StormKnowledge> {
  const where = { townId: actor.townId };
  const [materials, trucks] = await Promise.all([
    Material.findAll({ attributes: ["id", "name", "kind"], where, order: [["id", "ASC"]] }),
    Truck.findAll({ attributes: ["id", "unitNumber"], where, order: [["id", "ASC"]] }),
  ]);
  const kindOrder: MaterialKind[] = ["salt", "mix", "sand", "brine"];
  return {
    seasonStartYear,
    materials: materials
      .map(({ id, name, kind }) => ({ id, name, kind }))
      .toSorted((a, b) => kindOrder.indexOf(a.kind) - kindOrder.indexOf(b.kind)),
    trucks: trucks.map(({ id, unitNumber }) => ({ id, unitNumber })),
  };
}

/** A line to be stored: with id and version when it is in the log already. */
export type StormSave = { clientRef: string; id: number | null; version: number | null; entry: StormEntry };

export type StormOutcome =
  | { clientRef: string; state: "saved"; id: number; version: number }
  /** Somebody changed or removed it since it was read. */
  | { clientRef: string; state: "changed-meanwhile" };

async function storeMaterials(stormId: number, entry: StormEntry, transaction: Transaction) {
  await StormMaterial.destroy({ where: { stormId }, transaction });
  await StormMaterial.bulkCreate(
    entry.used.map((line) => ({ stormId, ...line })),
    { transaction },
  );
}

async function storeStorm(
  actor: TownActor,
  seasonStartYear: number,
  { clientRef, id, version, entry: { used, ...fields } }: StormSave,
  transaction: Transaction,
): Promise<StormOutcome> {
  const entry = { used, ...fields };
  if (id === null) {
    const known = await Storm.findOne({ attributes: ["id", "version", "townId"], where: { clientRef }, transaction });
    // Sent twice: the first time was enough. Somebody else's reference is no storm of ours.
    if (known && known.townId !== actor.townId) throw notFound("storm");
    if (known) return { clientRef, state: "saved", id: known.id, version: known.version };
    const owner = { townId: actor.townId, seasonStartYear, createdById: actor.userId, createdAt: now() };
    const created = await Storm.create({ clientRef, ...owner, ...fields, version: 1 }, { transaction });
    await storeMaterials(created.id, entry, transaction);
    await recordAudit(
      actor,
      { action: "storm.add", entity: "storm", entityId: created.id, detail: { seasonStartYear, ...entry } },
      transaction,
    );
    return { clientRef, state: "saved", id: created.id, version: 1 };
  }
  const where = { id, townId: actor.townId, seasonStartYear };
  const [changedCount] = await Storm.update(
    { ...fields, version: (version ?? 0) + 1 },
    { where: { ...where, version: version ?? 0 }, transaction },
  );
  if (changedCount === 0) {
    if ((await Storm.count({ where, transaction })) === 0 && version === null) throw notFound("storm");
    return { clientRef, state: "changed-meanwhile" };
  }
  await storeMaterials(id, entry, transaction);
  await recordAudit(
    actor,
    { action: "storm.change", entity: "storm", entityId: id, detail: { seasonStartYear, ...entry } },
    transaction,
  );
  return { clientRef, state: "saved", id, version: (version ?? 0) + 1 };
}

/**
 * Store lines of the log: new ones once whatever how often they are sent, known ones if nobody changed them since.
 *
 * @returns an outcome for every line, or why the season takes none
 * @throws 404 when a truck or material is not the town's, or the season is not opened
 */
export async function saveStorms(actor: TownActor, seasonStartYear: number, saves: readonly StormSave[]) {
  const known = await getStormKnowledge(actor, seasonStartYear);
  for (const { entry } of saves) {
    if (entry.truckId !== null && !known.trucks.some(({ id }) => id === entry.truckId)) throw notFound("truck");
    if (entry.used.some((line) => !known.materials.some(({ id }) => id === line.materialId)))
      throw notFound("material");
  }
  return inTransaction(async (transaction) => {
    const refusal = await seasonRefusal(actor.townId, seasonStartYear, transaction);
    if (refusal !== null) return { ok: false, refusal } as const;
    const outcomes: StormOutcome[] = [];
    for (const save of saves) outcomes.push(await storeStorm(actor, seasonStartYear, save, transaction));
    return { ok: true, outcomes } as const;
  });
}

/**
 * Take a line out of the log.
 *
 * @returns why not, or null when it is out
 * @throws 404 when it is not the town's, or of another season
 */
export async function removeStorm(actor: TownActor, seasonStartYear: number, stormId: number, version: number) {
  return inTransaction(async (transaction) => {
    const refusal = await seasonRefusal(actor.townId, seasonStartYear, transaction);
    if (refusal !== null) return refusal;
    const where = { id: stormId, townId: actor.townId, seasonStartYear };
    if ((await Storm.count({ where, transaction })) === 0) throw notFound("storm");
    const removedCount = await Storm.destroy({ where: { ...where, version }, transaction });
    if (removedCount === 0) return "Somebody changed this storm meanwhile. Look at it again, then remove it.";
    await recordAudit(
      actor,
      { action: "storm.remove", entity: "storm", entityId: stormId, detail: { seasonStartYear } },
      transaction,
    );
    return null;
  });
}
