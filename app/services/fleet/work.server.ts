import type { TownActor } from "#app/context.ts";
import { now } from "#app/lib/clock.server.ts";
import { inTransaction, isDuplicate } from "#app/lib/db.server.ts";
import { notFound } from "#app/lib/errors.ts";
import { Truck } from "#app/models/truck.server.ts";
import { TruckWork, type WorkPart } from "#app/models/truck-work.server.ts";
import { recordAudit } from "../audit.server.ts";

export type WorkInput = { clientRef: string; part: WorkPart; doneOn: string; note: string };

/**
 * Write down work on a truck. From that day on every calibration of an earlier day is due again.
 *
 * The same entry sent twice counts once, by its `clientRef`.
 *
 * @param input - `doneOn` is a local date that has come
 * @throws 404 when the truck is not the town's
 */
export async function enterWork(actor: TownActor, truckId: number, input: WorkInput): Promise<void> {
  try {
    await inTransaction(async (transaction) => {
      const where = { id: truckId, townId: actor.townId };
      const truck = await Truck.findOne({ attributes: ["id"], where, transaction });
      if (!truck) throw notFound("truck");
      const work = await TruckWork.create(
        { ...input, townId: actor.townId, truckId, createdById: actor.userId, createdAt: now() },
        { transaction },
      );
      const detail = { truckId, part: input.part, doneOn: input.doneOn };
      await recordAudit(actor, { action: "truck.work", entity: "truck_work", entityId: work.id, detail }, transaction);
    });
  } catch (error) {
    if (!isDuplicate(error)) throw error;
  }
}
