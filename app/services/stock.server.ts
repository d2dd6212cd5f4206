import type { TownActor } from "#app/context.ts";
import type { StockKind } from "#app/domain/season/stock-balance.ts";
import { quantityToLb, type StockUnit } from "#app/domain/season/stock-quantity.ts";
import { now } from "#app/lib/clock.server.ts";
import { inTransaction, isDuplicate } from "#app/lib/db.server.ts";
import { notFound } from "#app/lib/errors.ts";
import { Material } from "#app/models/material.server.ts";
import { StockEntry } from "#app/models/stock-entry.server.ts";
import { recordAudit } from "./audit.server.ts";
import { type BasisMaterial, readSeasonBasis } from "./season-basis.server.ts";
import { seasonRefusal } from "./season-figures/open.server.ts";

export type StockEntryView = {
  id: number;
  materialId: number;
  kind: StockKind;
  day: string;
  quantityLb: number;
  typedQuantity: number;
  typedUnit: StockUnit;
  lbPerCubicYard: number | null;
  priceCents: number | null;
  supplier: string;
};

export type StockView = {
  /** Solids alone: brine is made from the salt pile. */
  materials: BasisMaterial[];
  entries: StockEntryView[];
  refusal: string | null;
};

/** More entries than this are no town's season; the newest are shown. */
const mostShown = 500;

/**
 * The town's piles in one season, with everything that moved or measured them, by day.
 *
 * @throws 404 when the network has not opened that season
 */
export async function getStock(actor: TownActor, seasonStartYear: number): Promise<StockView> {
  const [basis, entries, refusal] = await Promise.all([
    readSeasonBasis(actor.townId, seasonStartYear),
    StockEntry.findAll({
      where: { townId: actor.townId, seasonStartYear },
      order: [
        ["day", "DESC"],
        ["id", "DESC"],
      ],
      limit: mostShown,
    }),
    inTransaction((transaction) => seasonRefusal(actor.townId, seasonStartYear, transaction)),
  ]);
  return {
    materials: basis.materials.filter(({ kind }) => kind !== "brine"),
    entries: entries.reverse().map((entry) => ({
      id: entry.id,
      materialId: entry.materialId,
      kind: entry.kind,
      day: entry.day,
      quantityLb: entry.quantityLb,
      typedQuantity: entry.typedQuantity,
      typedUnit: entry.typedUnit,
      lbPerCubicYard: entry.lbPerCubicYard,
      priceCents: entry.priceCents,
      supplier: entry.supplier,
    })),
    refusal,
  };
}

export type NewStockEntry = {
  /** Named by the form, so that sending it twice stores it once. */
  clientRef: string;
  materialId: number;
  kind: StockKind;
  day: string;
  typedQuantity: number;
  typedUnit: StockUnit;
  /** Needed for cubic yards alone. */
  lbPerCubicYard: number | null;
  /** What the whole delivery cost; null when not known, or when it is no delivery. */
  priceCents: number | null;
  supplier: string;
};

/**
 * Write down one movement or measurement of a pile.
 *
 * @returns why not, or null when it is stored
 * @throws 404 when the material is not the town's, or the season is not opened
 */
export async function addStockEntry(actor: TownActor, seasonStartYear: number, entry: NewStockEntry) {
  const lbPerCubicYard = entry.typedUnit === "cubic-yard" ? entry.lbPerCubicYard : null;
  try {
    return await inTransaction(async (transaction) => {
      const refusal = await seasonRefusal(actor.townId, seasonStartYear, transaction);
      if (refusal !== null) return refusal;
      const where = { id: entry.materialId, townId: actor.townId };
      if ((await Material.count({ where, transaction })) === 0) throw notFound("material");
      const stored = {
        ...entry,
        lbPerCubicYard,
        quantityLb: quantityToLb(entry.typedQuantity, entry.typedUnit, lbPerCubicYard),
        townId: actor.townId,
        seasonStartYear,
        createdById: actor.userId,
        createdAt: now(),
      };
      const created = await StockEntry.create(stored, { transaction });
      const { clientRef: _clientRef, ...detail } = entry;
      await recordAudit(
        actor,
        { action: "stock.add", entity: "stock_entry", entityId: created.id, detail: { seasonStartYear, ...detail } },
        transaction,
      );
      return null;
    });
  } catch (error) {
    // Sent twice: the first time was enough.
    if (isDuplicate(error)) return null;
    throw error;
  }
}

/**
 * Take an entry out again.
 *
 * @returns why not, or null when it is out
 * @throws 404 when it is not the town's, or of another season
 */
export async function removeStockEntry(actor: TownActor, seasonStartYear: number, entryId: number) {
  return inTransaction(async (transaction) => {
    const refusal = await seasonRefusal(actor.townId, seasonStartYear, transaction);
    if (refusal !== null) return refusal;
    const where = { id: entryId, townId: actor.townId, seasonStartYear };
    const entry = await StockEntry.findOne({ where, transaction });
    if (!entry) throw notFound("stock entry");
    const { materialId, kind, day, quantityLb, typedQuantity, typedUnit } = entry;
    await entry.destroy({ transaction });
    await recordAudit(
      actor,
      {
        action: "stock.remove",
        entity: "stock_entry",
        entityId: entryId,
        detail: { seasonStartYear, materialId, kind, day, quantityLb, typedQuantity, typedUnit },
      },
      transaction,
    );
    return null;
  });
}
