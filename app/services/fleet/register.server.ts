import type { Transaction } from "sequelize";
import type { TownActor } from "#app/context.ts";
import type { TruckFacts } from "#app/domain/fleet/truck.ts";
import { truckFileColumns, truckFileRow } from "#app/domain/fleet/truck-file.ts";
import { now } from "#app/lib/clock.server.ts";
import { writeCsv } from "#app/lib/csv.server.ts";
import { inTransaction, isDuplicate } from "#app/lib/db.server.ts";
import { notFound } from "#app/lib/errors.ts";
import { sha256 } from "#app/lib/secrets.server.ts";
import { Material } from "#app/models/material.server.ts";
import { Truck } from "#app/models/truck.server.ts";
import { TruckMaterial } from "#app/models/truck-material.server.ts";
import { recordAudit } from "../audit.server.ts";

/** A material that a truck carries; `sinceOn` when it is a new one, or from a new supplier. */
export type CarriedMaterial = { materialId: number; sinceOn: string | null };
export type TruckInput = TruckFacts & { materials: CarriedMaterial[] };

export type TruckForm = {
  /** Null for a truck that is not there yet. */
  truck: TruckInput | null;
  /** Changes whenever anything of the truck does, so that a form knows that it has grown old. */
  version: string;
  materials: { id: number; name: string }[];
};

function factsOf(truck: Truck): TruckFacts {
  const { unitNumber, body, spreaderKind, control, lanesPerPass, workingSpeedMph, workingSetting } = truck;
  const { workingRpm, gateMaxIn, capacityTons, isInService } = truck;
  return {
    unitNumber,
    body,
    spreaderKind,
    control,
    lanesPerPass,
    workingSpeedMph,
    workingSetting,
    workingRpm,
    gateMaxIn,
    capacityTons,
    isInService,
  };
}

async function carriedBy(truckId: number, transaction: Transaction): Promise<CarriedMaterial[]> {
  const rows = await TruckMaterial.findAll({ where: { truckId }, order: ["materialId"], transaction });
  return rows.map(({ materialId, sinceOn }) => ({ materialId, sinceOn }));
}

function versionOf(truck: TruckInput) {
  return sha256(JSON.stringify(truck)).slice(0, 16);
}

/** What the form of a truck starts from; a new truck when no id is given. @throws 404 when it is not the town's */
export async function getTruckForm(actor: TownActor, truckId: number | null): Promise<TruckForm> {
  return inTransaction(async (transaction) => {
    const found = await Material.findAll({ where: { townId: actor.townId }, order: ["id"], transaction });
    const materials = found.map(({ id, name }) => ({ id, name }));
    if (truckId === null) return { truck: null, version: "", materials };
    const truck = await Truck.findOne({ where: { id: truckId, townId: actor.townId }, transaction });
    if (!truck) throw notFound("truck");
    const input = { ...factsOf(truck), materials: await carriedBy(truckId, transaction) };
    return { truck: input, version: versionOf(input), materials };
  });
}

/** Leaves the truck with just these materials. @throws 404 when one is not the town's */
async function carry(actor: TownActor, truckId: number, wanted: readonly CarriedMaterial[], transaction: Transaction) {
  const own = await Material.findAll({ attributes: ["id"], where: { townId: actor.townId }, transaction });
  if (!wanted.every(({ materialId }) => own.some(({ id }) => id === materialId))) throw notFound("material");
  await TruckMaterial.destroy({ where: { truckId }, transaction });
  await TruckMaterial.bulkCreate(
    wanted.map((material) => ({ truckId, ...material })),
    { transaction },
  );
}

type Saved = { ok: true; truckId: number } | { ok: false; reason: "number-taken" | "changed-meanwhile" };

/**
 * Put a truck into the fleet.
 *
 * A recorder's truck is in service. The same truck sent twice is one truck.
 *
 * @returns `{ ok: false }` when the town has another truck of that number
 * @throws 404 when a material is not the town's
 */
export async function addTruck(actor: TownActor, { materials, ...facts }: TruckInput): Promise<Saved> {
  const isInService = actor.role === "director" ? facts.isInService : true;
  try {
    return await inTransaction(async (transaction) => {
      const truck = await Truck.create(
        { townId: actor.townId, ...facts, isInService, createdAt: now() },
        { transaction },
      );
      await carry(actor, truck.id, materials, transaction);
      const detail = { after: { ...facts, isInService, materials } };
      await recordAudit(actor, { action: "truck.add", entity: "truck", entityId: truck.id, detail }, transaction);
      return { ok: true, truckId: truck.id };
    });
  } catch (error) {
    if (!isDuplicate(error)) throw error;
    const other = await Truck.findOne({ where: { townId: actor.townId, unitNumber: facts.unitNumber } });
    const isSame = other !== null && JSON.stringify(factsOf(other)) === JSON.stringify({ ...facts, isInService });
    return isSame ? { ok: true, truckId: other.id } : { ok: false, reason: "number-taken" };
  }
}

/**
 * Change a truck. Whether it is in service stays as it is unless the director changes it.
 *
 * @param version - of the form that the change began from
 * @returns `{ ok: false }` when the truck was changed since, or another one has the new number
 * @throws 404 when the truck or a material is not the town's
 */
export async function changeTruck(
  actor: TownActor,
  truckId: number,
  version: string,
  { materials, ...facts }: TruckInput,
): Promise<Saved> {
  try {
    return await inTransaction(async (transaction) => {
      const where = { id: truckId, townId: actor.townId };
      const truck = await Truck.findOne({ where, lock: transaction.LOCK.UPDATE, transaction });
      if (!truck) throw notFound("truck");
      const before = { ...factsOf(truck), materials: await carriedBy(truckId, transaction) };
      const isInService = actor.role === "director" ? facts.isInService : truck.isInService;
      const after = { ...facts, isInService, materials: byId(materials) };
      if (JSON.stringify(before) === JSON.stringify(after)) return { ok: true, truckId };
      if (versionOf(before) !== version) return { ok: false, reason: "changed-meanwhile" };
      await truck.update({ ...facts, isInService }, { transaction });
      await carry(actor, truckId, materials, transaction);
      const detail = { before, after };
      await recordAudit(actor, { action: "truck.change", entity: "truck", entityId: truckId, detail }, transaction);
      return { ok: true, truckId };
    });
  } catch (error) {
    if (isDuplicate(error)) return { ok: false, reason: "number-taken" };
    throw error;
  }
}

function byId(materials: readonly CarriedMaterial[]) {
  return [...materials].sort((a, b) => a.materialId - b.materialId);
}

/** Every truck of the town as CSV, with the columns that the import reads. */
export async function fleetCsv(actor: TownActor): Promise<string> {
  const where = { townId: actor.townId };
  const [trucks, materials] = await Promise.all([Truck.findAll({ where }), Material.findAll({ where, order: ["id"] })]);
  const carried = await TruckMaterial.findAll({ where: { truckId: trucks.map(({ id }) => id) } });
  const rows = trucks
    .sort((a, b) => a.unitNumber.localeCompare(b.unitNumber, "en", { numeric: true }))
    .map((truck) => {
      const ids = carried.filter(({ truckId }) => truckId === truck.id).map(({ materialId }) => materialId);
      const materialNames = materials.filter(({ id }) => ids.includes(id)).map(({ name }) => name);
      return truckFileRow({ ...factsOf(truck), materialNames });
    });
  return writeCsv(truckFileColumns, rows);
}
