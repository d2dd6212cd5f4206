import { Op, type Transaction } from "sequelize";
import type { NetworkActor, PersonActor, Role } from "#app/context.ts";
import { invitationLetter } from "#app/emails/invitation.ts";
import { dayMs, now } from "#app/lib/clock.server.ts";
import { inTransaction, isDuplicate } from "#app/lib/db.server.ts";
import { env } from "#app/lib/env.server.ts";
import { invitationGone, notFound } from "#app/lib/errors.ts";
import { newSecret, sha256 } from "#app/lib/secrets.server.ts";
import { Invitation } from "#app/models/invitation.server.ts";
import { Session } from "#app/models/session.server.ts";
import { ApiToken } from "#app/models/api-token.server.ts";
import { Town } from "#app/models/town.server.ts";
import { UserAccount } from "#app/models/user-account.server.ts";
import { recordAudit } from "./audit.server.ts";
import { queueMail } from "./outbox.server.ts";
import { startSession } from "./sessions.server.ts";

/** A person as the sign-in service vouches for them. */
export type Identity = { issuer: string; subject: string; name: string; email: string; isEmailVerified: boolean };

type Opened =
  | { ok: true; userId: number; sessionToken: string }
  | { ok: false; reason: "no-account" | "shut-out" | "invitation-spent" };

async function acceptInvitation(identity: Identity, tokenHash: string, transaction: Transaction) {
  const invitation = await Invitation.findOne({
    where: { tokenHash, acceptedAt: null, expiresAt: { [Op.gt]: now() } },
    lock: transaction.LOCK.UPDATE,
    transaction,
  });
  if (!invitation) return null;
  const account = await UserAccount.create(
    {
      issuer: identity.issuer,
      subject: identity.subject,
      name: identity.name,
      email: identity.isEmailVerified ? identity.email : invitation.email,
      role: invitation.role,
      townId: invitation.townId,
      createdAt: now(),
    },
    { transaction },
  );
  await invitation.update({ acceptedAt: now(), acceptedById: account.id }, { transaction });
  return account;
}

function actorOf(account: UserAccount, townName: string): PersonActor {
  const person = { userId: account.id, name: account.name, requestId: "sign-in", sessionId: null };
  if (account.role === "coordinator") return { kind: "network", role: account.role, ...person };
  if (account.role === "analyst") return { kind: "analyst", role: account.role, ...person };
  return { kind: "town", role: account.role, townId: account.townId ?? 0, townName, ...person };
}

/**
 * Find the account of an identity, or open one by invitation, and start a session.
 *
 * Accounts are keyed by issuer and subject. An e-mail address never opens one: addresses are handed on.
 *
 * @param invitationHash - SHA-256 of the invitation's token, when the sign-in began at one
 */
export async function openAccount(identity: Identity, invitationHash: string | null, device: string): Promise<Opened> {
  return inTransaction(async (transaction): Promise<Opened> => {
    const known = await UserAccount.findOne({
      where: { issuer: identity.issuer, subject: identity.subject },
      transaction,
    });
    if (known && !known.isActive) return { ok: false, reason: "shut-out" };
    if (!known && invitationHash === null) return { ok: false, reason: "no-account" };
    const account = known ?? (await acceptInvitation(identity, invitationHash ?? "", transaction));
    if (!account) return { ok: false, reason: "invitation-spent" };
    const sessionToken = await startSession({ userId: account.id, role: account.role }, device, transaction);
    const action = known ? "session.start" : "account.open";
    await recordAudit(actorOf(account, ""), { action, entity: "user_account", entityId: account.id }, transaction);
    return { ok: true, userId: account.id, sessionToken };
  });
}

export type InvitationView = { name: string; role: Role; townName: string | null; tokenHash: string };

/**
 * What an invitation's token offers.
 *
 * @throws 404 when it is unknown, used or past its seven days
 */
export async function getInvitation(token: string): Promise<InvitationView> {
  const tokenHash = sha256(token);
  const invitation = await Invitation.findOne({
    where: { tokenHash, acceptedAt: null, expiresAt: { [Op.gt]: now() } },
  });
  if (!invitation) throw invitationGone();
  const town = invitation.townId === null ? null : await Town.findByPk(invitation.townId, { attributes: ["name"] });
  return { name: invitation.name, role: invitation.role, townName: town?.name ?? null, tokenHash };
}

export type NewInvitation = { clientRef: string; name: string; email: string; role: Role; townId: number | null };

/**
 * Invite a person by mail. The same form sent twice invites once.
 *
 * @throws 404 when the town does not exist
 */
export async function invitePerson(actor: NetworkActor, input: NewInvitation): Promise<void> {
  const token = newSecret();
  const townId = input.role === "recorder" || input.role === "director" ? input.townId : null;
  try {
    await inTransaction(async (transaction) => {
      const town = townId === null ? null : await Town.findByPk(townId, { transaction });
      if (townId !== null && !town) throw notFound("town");
      const invitation = await Invitation.create(
        {
          tokenHash: sha256(token),
          clientRef: input.clientRef,
          name: input.name,
          email: input.email,
          role: input.role,
          townId,
          createdById: actor.userId,
          createdAt: now(),
          expiresAt: new Date(now().getTime() + 7 * dayMs),
        },
        { transaction },
      );
      await recordAudit(
        actor,
        {
          action: "invitation.send",
          entity: "invitation",
          entityId: invitation.id,
          townId,
          detail: { role: input.role },
        },
        transaction,
      );
      const letter = invitationLetter({
        toName: input.name,
        toAddress: input.email,
        role: input.role,
        townName: town?.name ?? null,
        fromName: actor.name,
        address: `${env.publicOrigin}/invitations/${token}`,
      });
      await queueMail(`invitation:${invitation.id}`, letter, transaction);
    });
  } catch (error) {
    if (!isDuplicate(error)) throw error;
  }
}

export type PersonLine = {
  id: number;
  name: string;
  email: string;
  role: Role;
  townName: string | null;
  isActive: boolean;
};
export type InvitationLine = { id: number; name: string; role: Role; townName: string | null; expiresAt: string };
export type TownChoice = { id: number; name: string };

/** Everybody in the network, the open invitations, and the towns one can be invited for. */
export async function listPeople(): Promise<{
  people: PersonLine[];
  invitations: InvitationLine[];
  towns: TownChoice[];
}> {
  const [accounts, invitations, towns] = await Promise.all([
    UserAccount.findAll({
      order: [
        ["role", "ASC"],
        ["name", "ASC"],
      ],
      limit: 1000,
    }),
    Invitation.findAll({
      where: { acceptedAt: null, expiresAt: { [Op.gt]: now() } },
      order: [["id", "DESC"]],
      limit: 200,
    }),
    Town.findAll({ attributes: ["id", "name"], order: [["name", "ASC"]] }),
  ]);
  const nameOf = new Map(towns.map((town) => [town.id, town.name]));
  const townName = (townId: number | null) => (townId === null ? null : (nameOf.get(townId) ?? null));
  return {
    people: accounts.map(({ id, name, email, role, townId, isActive }) => ({
      id,
      name,
      email,
      role,
      isActive,
      townName: townName(townId),
    })),
    invitations: invitations.map(({ id, name, role, townId, expiresAt }) => ({
      id,
      name,
      role,
      townName: townName(townId),
      expiresAt: expiresAt.toISOString(),
    })),
    towns: towns.map(({ id, name }) => ({ id, name })),
  };
}

/**
 * Shut a person out, or let them in again. Shutting out ends their sessions and tokens at once.
 *
 * @throws 404 when there is no such person, or it is the coordinator's own account
 */
export async function setPersonActive(actor: NetworkActor, userId: number, isActive: boolean): Promise<void> {
  await inTransaction(async (transaction) => {
    const account = await UserAccount.findByPk(userId, { lock: transaction.LOCK.UPDATE, transaction });
    if (!account || account.id === actor.userId) throw notFound("person");
    await account.update({ isActive }, { transaction });
    if (!isActive) {
      await Session.destroy({ where: { userId }, transaction });
      await ApiToken.update({ revokedAt: now() }, { where: { userId, revokedAt: null }, transaction });
    }
    const action = isActive ? "account.readmit" : "account.shut-out";
    await recordAudit(actor, { action, entity: "user_account", entityId: userId, townId: account.townId }, transaction);
  });
}
