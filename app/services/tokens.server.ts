import { randomBytes } from "node:crypto";
import { Op } from "sequelize";
import type { AnalystActor } from "#app/context.ts";
import { dayMs, now } from "#app/lib/clock.server.ts";
import { inTransaction, isDuplicate } from "#app/lib/db.server.ts";
import { notFound } from "#app/lib/errors.ts";
import { equalSecrets, newSecret, sha256 } from "#app/lib/secrets.server.ts";
import { ApiToken } from "#app/models/api-token.server.ts";
import { UserAccount } from "#app/models/user-account.server.ts";
import { recordAudit } from "./audit.server.ts";

const prefix = "cwt";

/**
 * Who a bearer token stands for.
 *
 * @param text - `cwt_`, eight letters to look it up, `_`, the secret
 * @returns null when it is unknown, revoked or past its date, or its owner was shut out
 */
export async function findActorByToken(text: string, requestId: string): Promise<AnalystActor | null> {
  const match = new RegExp(`^${prefix}_([0-9a-f]{8})_([\\w-]{43})$`).exec(text);
  if (!match?.[1] || !match[2]) return null;
  const token = await ApiToken.findOne({
    where: { lookupId: match[1], revokedAt: null, expiresAt: { [Op.gt]: now() } },
  });
  if (!token || !equalSecrets(token.secretSha256, sha256(match[2]))) return null;
  const owner = await UserAccount.findOne({ where: { id: token.userId, isActive: true, role: "analyst" } });
  if (!owner) return null;
  const today = now().toISOString().slice(0, 10);
  if (token.lastUsedOn !== today) await token.update({ lastUsedOn: today });
  return { kind: "analyst", role: "analyst", userId: owner.id, name: owner.name, requestId, sessionId: null };
}

export type NewToken = { clientRef: string; name: string };

/**
 * Make a token that is good for a year.
 *
 * @returns its text, shown once; null when the same form was sent before
 */
export async function createToken(actor: AnalystActor, input: NewToken): Promise<string | null> {
  const lookupId = randomBytes(4).toString("hex");
  const secret = newSecret();
  try {
    await inTransaction(async (transaction) => {
      const token = await ApiToken.create(
        {
          clientRef: input.clientRef,
          lookupId,
          secretSha256: sha256(secret),
          userId: actor.userId,
          name: input.name,
          createdAt: now(),
          expiresAt: new Date(now().getTime() + 365 * dayMs),
        },
        { transaction },
      );
      await recordAudit(actor, { action: "token.create", entity: "api_token", entityId: token.id }, transaction);
    });
  } catch (error) {
    if (isDuplicate(error)) return null;
    throw error;
  }
  return `${prefix}_${lookupId}_${secret}`;
}

/** @throws 404 when the token is not the actor's own or was revoked before */
export async function revokeToken(actor: AnalystActor, tokenId: number): Promise<void> {
  await inTransaction(async (transaction) => {
    const where = { id: tokenId, userId: actor.userId, revokedAt: null };
    const [revoked] = await ApiToken.update({ revokedAt: now() }, { where, transaction });
    if (revoked === 0) throw notFound("open token");
    await recordAudit(actor, { action: "token.revoke", entity: "api_token", entityId: tokenId }, transaction);
  });
}

export type TokenLine = { id: number; name: string; createdAt: string; expiresAt: string; lastUsedOn: string | null };

/** The actor's open tokens, newest first. */
export async function listTokens(actor: AnalystActor): Promise<TokenLine[]> {
  const tokens = await ApiToken.findAll({
    where: { userId: actor.userId, revokedAt: null, expiresAt: { [Op.gt]: now() } },
    order: [["id", "DESC"]],
    limit: 100,
  });
  return tokens.map((token) => ({
    id: token.id,
    name: token.name,
    createdAt: token.createdAt.toISOString(),
    expiresAt: token.expiresAt.toISOString(),
    lastUsedOn: token.lastUsedOn,
  }));
}
