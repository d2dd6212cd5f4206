import { Op, type Transaction } from "sequelize";
import type { Actor } from "#app/context.ts";
import { now } from "#app/lib/clock.server.ts";
import { AuditEntry } from "#app/models/audit-entry.server.ts";

type Deed = {
  action: string;
  entity: string;
  entityId: number | null;
  /** The town concerned, when the actor is not that town's. */
  townId?: number | null;
  detail?: Record<string, unknown>;
};

/**
 * Write what was done into the trail, in the transaction that does it: both happen or neither.
 *
 * @param actor - who does it
 * @param deed - what is done to what; `detail` holds old and new values where they are figures
 */
export async function recordAudit(actor: Actor, deed: Deed, transaction: Transaction): Promise<void> {
  await AuditEntry.create(
    {
      createdAt: now(),
      actorUserId: actor.kind === "worker" ? null : actor.userId,
      actorRole: actor.role,
      townId: deed.townId ?? (actor.kind === "town" ? actor.townId : null),
      action: deed.action,
      entity: deed.entity,
      entityId: deed.entityId,
      detail: deed.detail ?? {},
      requestId: actor.requestId,
    },
    { transaction },
  );
}

export type TrailEntry = {
  id: number;
  at: string;
  actorUserId: number | null;
  actorRole: string;
  townId: number | null;
  action: string;
  entity: string;
  entityId: number | null;
};

/** The newest entries of the whole network's trail, newest first, at most `limit` older than `beforeId`. */
export async function listTrail(limit = 100, beforeId: number | null = null): Promise<TrailEntry[]> {
  const entries = await AuditEntry.findAll({
    where: beforeId === null ? {} : { id: { [Op.lt]: beforeId } },
    order: [["id", "DESC"]],
    limit,
  });
  return entries.map((entry) => ({
    id: entry.id,
    at: entry.createdAt.toISOString(),
    actorUserId: entry.actorUserId,
    actorRole: entry.actorRole,
    townId: entry.townId,
    action: entry.action,
    entity: entry.entity,
    entityId: entry.entityId,
  }));
}
