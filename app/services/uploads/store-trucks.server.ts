import { Op, type Transaction } from "sequelize";
import type { TownActor } from "#app/context.ts";
import { now } from "#app/lib/clock.server.ts";
import { Material } from "#app/models/material.server.ts";
import { Truck } from "#app/models/truck.server.ts";
import { TruckMaterial } from "#app/models/truck-material.server.ts";
import { recordAudit } from "../audit.server.ts";
import { NotNow, type StagedRow, type Stored, TruckShape } from "./staged.server.ts";

/** The file says which materials, and nothing of since when: a day that stands for one of them stays. */
async function carry(truckId: number, materialIds: number[], transaction: Transaction) {
  await TruckMaterial.destroy({ where: { truckId, materialId: { [Op.notIn]: [0, ...materialIds] } }, transaction });
  await TruckMaterial.bulkCreate(
    materialIds.map((materialId) => ({ truckId, materialId })),
    { ignoreDuplicates: true, transaction },
  );
}

/** Put the trucks of a checked file into the fleet, or change those that are there. */
export async function storeTrucks(
  actor: TownActor,
  _uploadId: number,
  rows: readonly StagedRow[],
  transaction: Transaction,
): Promise<Stored> {
  const staged = rows.map(({ staged: value }) => TruckShape.parse(value));
  const where = { townId: actor.townId };
  const [trucks, materials] = await Promise.all([
    Truck.findAll({ where, lock: transaction.LOCK.UPDATE, transaction }),
    Material.findAll({ attributes: ["id"], where, transaction }),
  ]);
  for (const { row: _row, truckId, materialIds, ...facts } of staged) {
    const known = trucks.find(({ id }) => id === truckId);
    if ((truckId !== null && !known) || !materialIds.every((id) => materials.some((material) => material.id === id))) {
      throw new NotNow("A truck or material of this file is no longer the town’s. Check the file again.");
    }
    if (actor.role !== "director" && facts.isInService !== (known?.isInService ?? true)) {
      throw new NotNow("The director took a truck in or out of service meanwhile. Check the file again.");
    }
    const truck = known
      ? await known.update(facts, { transaction })
      : await Truck.create({ ...where, ...facts, createdAt: now() }, { transaction });
    await carry(truck.id, materialIds, transaction);
    const action = known ? "truck.change" : "truck.add";
    const detail = { after: { ...facts, materialIds } };
    await recordAudit(actor, { action, entity: "truck", entityId: truck.id, detail }, transaction);
  }
  return { rowCount: staged.length, seasonStartYears: [], days: [] };
}
