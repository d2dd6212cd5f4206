import type { TownActor } from "#app/context.ts";
import { now } from "#app/lib/clock.server.ts";
import { inTransaction } from "#app/lib/db.server.ts";
import { forbidden, notFound } from "#app/lib/errors.ts";
import { Calibration } from "#app/models/calibration.server.ts";
import { recordAudit } from "../audit.server.ts";

const mostAtOnce = 500;

/**
 * Approve calibrations that are ready: the newest becomes the one in force for its truck and material.
 *
 * @param calibrationIds - at most 500; those of other towns or approved before are passed over
 * @returns how many were approved by this call
 * @throws 403 unless the actor is the town's director
 */
export async function approveCalibrations(actor: TownActor, calibrationIds: readonly number[]): Promise<number> {
  if (actor.role !== "director") throw forbidden("The director approves calibrations.");
  return inTransaction(async (transaction) => {
    const ready = await Calibration.findAll({
      where: { id: [...calibrationIds].slice(0, mostAtOnce), townId: actor.townId, state: "ready" },
      order: ["id"],
      lock: transaction.LOCK.UPDATE,
      transaction,
    });
    for (const calibration of ready) {
      await calibration.update({ state: "approved", approvedAt: now(), approvedById: actor.userId }, { transaction });
      await recordAudit(
        actor,
        { action: "calibration.approve", entity: "calibration", entityId: calibration.id },
        transaction,
      );
    }
    return ready.length;
  });
}

/**
 * Approve one calibration.
 *
 * @returns `{ ok: false }` when it was approved before, so that the page can say so
 * @throws 404 when it is not the town's; 403 as approveCalibrations
 */
export async function approveCalibration(actor: TownActor, calibrationId: number) {
  const where = { id: calibrationId, townId: actor.townId };
  if ((await Calibration.count({ where })) === 0) throw notFound("calibration");
  const count = await approveCalibrations(actor, [calibrationId]);
  return count === 1 ? ({ ok: true } as const) : ({ ok: false, reason: "approved-before" } as const);
}
