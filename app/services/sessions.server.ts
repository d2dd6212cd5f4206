import { Op, QueryTypes, type Transaction } from "sequelize";
import type { PersonActor, Role } from "#app/context.ts";
import { dayMs, hourMs, minuteMs, now } from "#app/lib/clock.server.ts";
import { db, inTransaction } from "#app/lib/db.server.ts";
import { notFound } from "#app/lib/errors.ts";
import { newSecret, sha256 } from "#app/lib/secrets.server.ts";
import { Session } from "#app/models/session.server.ts";
import { recordAudit } from "./audit.server.ts";

/**
 * How long a session lasts: idle, and in all. A recorder's phone lies in a truck all day and must still be signed in
 * at the end of the shift; the others sit at a desk, and can approve and publish.
 */
const limits: Record<Role, { idleMs: number; absoluteMs: number }> = {
  recorder: { idleMs: 12 * hourMs, absoluteMs: 30 * dayMs },
  director: { idleMs: 2 * hourMs, absoluteMs: 12 * hourMs },
  coordinator: { idleMs: 2 * hourMs, absoluteMs: 12 * hourMs },
  analyst: { idleMs: 2 * hourMs, absoluteMs: 12 * hourMs },
};

type Owner = { userId: number; role: Role };

/** @returns the new session's secret, for the cookie; the database keeps only its hash */
export async function startSession(owner: Owner, device: string, transaction: Transaction): Promise<string> {
  const token = newSecret();
  const at = now();
  await Session.create(
    {
      tokenHash: sha256(token),
      userId: owner.userId,
      createdAt: at,
      lastSeenAt: at,
      authenticatedAt: at,
      expiresAt: new Date(at.getTime() + limits[owner.role].absoluteMs),
      device: device.slice(0, 200),
    },
    { transaction },
  );
  return token;
}

type SessionRow = {
  sessionId: number;
  lastSeenAt: Date;
  expiresAt: Date;
  userId: number;
  name: string;
  role: Role;
  townId: number | null;
  townName: string | null;
};

function asActor(row: SessionRow, requestId: string): PersonActor | null {
  const person = { userId: row.userId, name: row.name, requestId, sessionId: row.sessionId };
  switch (row.role) {
    case "coordinator":
      return { kind: "network", role: row.role, ...person };
    case "analyst":
      return { kind: "analyst", role: row.role, ...person };
    default:
      if (row.townId === null || row.townName === null) return null;
      return { kind: "town", role: row.role, townId: row.townId, townName: row.townName, ...person };
  }
}

/**
 * Who a session's secret stands for.
 *
 * @returns null when it is unknown, has ended, or its owner was shut out
 */
export async function findActorBySession(token: string, requestId: string): Promise<PersonActor | null> {
  // One plain query: this runs for every request of every signed-in person.
  const [row] = await db.query<SessionRow>(
    `SELECT s.id AS sessionId, s.last_seen_at AS lastSeenAt, s.expires_at AS expiresAt, u.id AS userId, u.name,
            u.role, u.town_id AS townId, t.name AS townName
       FROM session s JOIN user_account u ON u.id = s.user_id AND u.is_active = 1 LEFT JOIN town t ON t.id = u.town_id
      WHERE s.token_hash = ?`,
    { type: QueryTypes.SELECT, replacements: [sha256(token)] },
  );
  if (!row) return null;
  const at = now().getTime();
  const idleMs = at - row.lastSeenAt.getTime();
  if (at >= row.expiresAt.getTime() || idleMs >= limits[row.role].idleMs) return null;
  // Once a minute is enough for the idle limit, and spares a write for each request.
  if (idleMs > minuteMs) await Session.update({ lastSeenAt: new Date(at) }, { where: { id: row.sessionId } });
  return asActor(row, requestId);
}

/** End the session that a secret stands for. Harmless when there is none. */
export async function endSession(token: string): Promise<void> {
  await Session.destroy({ where: { tokenHash: sha256(token) } });
}

export type OwnSession = { id: number; device: string; createdAt: string; lastSeenAt: string; isThisOne: boolean };

/** The actor's own open sessions, newest first. */
export async function listOwnSessions(actor: PersonActor): Promise<OwnSession[]> {
  const at = now();
  const lastSeenAt = { [Op.gt]: new Date(at.getTime() - limits[actor.role].idleMs) };
  const sessions = await Session.findAll({
    where: { userId: actor.userId, expiresAt: { [Op.gt]: at }, lastSeenAt },
    order: [["id", "DESC"]],
    limit: 50,
  });
  return sessions.map((session) => ({
    id: session.id,
    device: session.device,
    createdAt: session.createdAt.toISOString(),
    lastSeenAt: session.lastSeenAt.toISOString(),
    isThisOne: session.id === actor.sessionId,
  }));
}

/** @throws 404 when the session is not the actor's own */
export async function endOwnSession(actor: PersonActor, sessionId: number): Promise<void> {
  await inTransaction(async (transaction) => {
    const ended = await Session.destroy({ where: { id: sessionId, userId: actor.userId }, transaction });
    if (ended === 0) throw notFound("session");
    await recordAudit(actor, { action: "session.end", entity: "session", entityId: sessionId }, transaction);
  });
}

/** Remove sessions that have ended, a thousand at a time. */
export async function forgetEndedSessions(): Promise<void> {
  await Session.destroy({ where: { expiresAt: { [Op.lt]: now() } }, limit: 1000 });
}
