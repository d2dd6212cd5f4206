import type { TownActor } from "#app/context.ts";
import type { MaterialKind } from "#app/domain/calibration/band.ts";
import { inTransaction, isDuplicate } from "#app/lib/db.server.ts";
import { notFound } from "#app/lib/errors.ts";
import { Material } from "#app/models/material.server.ts";
import { MaterialPrice } from "#app/models/material-price.server.ts";
import { Season } from "#app/models/season.server.ts";
import { recordAudit } from "./audit.server.ts";

export type MaterialView = {
  id: number;
  name: string;
  kind: MaterialKind;
  saltShare: number;
  /** Cents a ton where a season has no price of its own; null when there is none. */
  usualCentsPerTon: number | null;
  prices: { seasonStartYear: number; centsPerTon: number }[];
};

export type MaterialsView = { materials: MaterialView[]; seasonStartYears: number[] };

/** What the town spreads, with its prices by season. */
export async function listMaterials(actor: TownActor): Promise<MaterialsView> {
  const [materials, seasons] = await Promise.all([
    Material.findAll({ where: { townId: actor.townId }, order: [["id", "ASC"]] }),
    Season.findAll({ attributes: ["startYear"], order: [["startYear", "DESC"]] }),
  ]);
  const prices = await MaterialPrice.findAll({ where: { materialId: materials.map(({ id }) => id) }, raw: true });
  return {
    materials: materials.map(({ id, name, kind, saltShare, priceCentsPerTon }) => ({
      id,
      name,
      kind,
      saltShare,
      usualCentsPerTon: priceCentsPerTon,
      prices: prices
        .filter((price) => price.materialId === id)
        .map(({ seasonStartYear, centsPerTon }) => ({ seasonStartYear, centsPerTon })),
    })),
    seasonStartYears: seasons.map(({ startYear }) => startYear),
  };
}

/**
 * Add something the town spreads.
 *
 * @param material - saltShare from 0 to 1 by weight
 * @returns false when the town has a material of that name
 */
export async function addMaterial(
  actor: TownActor,
  material: { name: string; kind: MaterialKind; saltShare: number },
): Promise<boolean> {
  try {
    await inTransaction(async (transaction) => {
      const created = await Material.create({ ...material, townId: actor.townId }, { transaction });
      await recordAudit(
        actor,
        { action: "material.add", entity: "material", entityId: created.id, detail: material },
        transaction,
      );
    });
    return true;
  } catch (error) {
    if (isDuplicate(error)) return false;
    throw error;
  }
}

/**
 * Change a material's salt share, and its price in one season. The kind stays: what was laid with it was of that kind.
 *
 * @param change - saltShare from 0 to 1; centsPerTon null takes the season's price away
 * @throws 404 when the material is not the town's, or the season is not opened
 */
export async function changeMaterial(
  actor: TownActor,
  materialId: number,
  change: { saltShare: number; seasonStartYear: number; centsPerTon: number | null },
): Promise<void> {
  await inTransaction(async (transaction) => {
    const material = await Material.findOne({
      where: { id: materialId, townId: actor.townId },
      lock: transaction.LOCK.UPDATE,
      transaction,
    });
    if (!material) throw notFound("material");
    const { saltShare, seasonStartYear, centsPerTon } = change;
    if (!(await Season.findByPk(seasonStartYear, { transaction }))) throw notFound("season");
    const before = { saltShare: material.saltShare };
    await material.update({ saltShare }, { transaction });
    if (centsPerTon === null) await MaterialPrice.destroy({ where: { materialId, seasonStartYear }, transaction });
    else await MaterialPrice.upsert({ materialId, seasonStartYear, centsPerTon }, { transaction });
    await recordAudit(
      actor,
      { action: "material.change", entity: "material", entityId: materialId, detail: { before, ...change } },
      transaction,
    );
  });
}
