import { QueryTypes, type Transaction } from "sequelize";
import type { Actor } from "#app/context.ts";
import { now } from "#app/lib/clock.server.ts";
import { db } from "#app/lib/db.server.ts";
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
  actorName: string | null;
  actorRole: string;
  townName: string | null;
  action: string;
  entity: string;
  entityId: number | null;
};

/** Entries of the whole network's trail, newest first: at most `limit`, older than `beforeId` when that is given. */
export async function listTrail(limit: number, beforeId: number | null): Promise<TrailEntry[]> {
  const entries = await db.query<Omit<TrailEntry, "at"> & { at: Date }>(
    `SELECT a.id, a.created_at AS at, u.name AS actorName, a.actor_role AS actorRole, t.name AS townName, a.action,
            a.entity, a.entity_id AS entityId
       FROM audit_entry a LEFT JOIN user_account u ON u.id = a.actor_user_id LEFT JOIN town t ON t.id = a.town_id
      WHERE a.id < ? ORDER BY a.id DESC LIMIT ?`,
    { type: QueryTypes.SELECT, replacements: [beforeId ?? 4_294_967_295, limit] },
  );
  return entries.map(({ at, ...entry }) => ({ ...entry, at: at.toISOString() }));
}
