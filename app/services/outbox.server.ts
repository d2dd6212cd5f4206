import { randomUUID } from "node:crypto";
import { Op, QueryTypes, type Transaction } from "sequelize";
import { dayMs, hourMs, minuteMs, now } from "#app/lib/clock.server.ts";
import { db, inTransaction } from "#app/lib/db.server.ts";
import { env } from "#app/lib/env.server.ts";
import { log } from "#app/lib/log.server.ts";
import { sendMail, UncertainDelivery } from "#app/lib/mailer.server.ts";
import { type MailState, OutboxMail } from "#app/models/outbox-mail.server.ts";

export type Letter = { toName: string; toAddress: string; subject: string; text: string; html: string };

/** How long to wait after each failed try; after the last the mail is given up and shown to the coordinator. */
const waits = [minuteMs, 5 * minuteMs, 30 * minuteMs, 2 * hourMs, 6 * hourMs, 12 * hourMs];

/**
 * Put a mail into the outbox, in the transaction that causes it.
 *
 * @param dedupeKey - names the occasion; a second mail for the same occasion is not queued
 */
export async function queueMail(dedupeKey: string, letter: Letter, transaction: Transaction): Promise<void> {
  const queued = await OutboxMail.count({ where: { dedupeKey }, transaction });
  if (queued > 0) return;
  await OutboxMail.create(
    {
      ...letter,
      dedupeKey,
      messageId: `<${randomUUID()}@${new URL(env.publicOrigin).hostname}>`,
      runAfter: now(),
      createdAt: now(),
    },
    { transaction },
  );
}

/** Take the oldest mail that is due, for this process alone. */
async function claimMail(): Promise<OutboxMail | null> {
  return inTransaction(async (transaction) => {
    // Raw, because the query builder drops SKIP LOCKED for this database.
    const [due] = await db.query<{ id: number }>(
      "SELECT id FROM outbox_mail WHERE state = 'queued' AND run_after <= ? ORDER BY run_after, id LIMIT 1 FOR UPDATE SKIP LOCKED",
      { type: QueryTypes.SELECT, replacements: [now()], transaction },
    );
    if (!due) return null;
    const mail = await OutboxMail.findByPk(due.id, { transaction, rejectOnEmpty: true });
    return mail.update({ state: "sending", attempts: mail.attempts + 1, runAfter: now() }, { transaction });
  });
}

async function deliver(mail: OutboxMail): Promise<boolean> {
  try {
    await sendMail(mail);
  } catch (error) {
    const wait = waits[mail.attempts - 1];
    const reason = error instanceof Error ? error.message.slice(0, 300) : "unknown";
    // The server's own words may repeat the address, so the log gets the code alone.
    const code = error instanceof Error && "code" in error ? error.code : "unknown";
    log.warn({ mailId: mail.id, attempts: mail.attempts, code }, "mail not sent");
    await mail.update(
      error instanceof UncertainDelivery
        ? { state: "uncertain", lastError: reason }
        : wait === undefined
          ? { state: "dead", lastError: reason }
          : { state: "queued", runAfter: new Date(now().getTime() + wait), lastError: reason },
    );
    return false;
  }
  // Outside the try: a mail that went out is not queued again because the note of it failed.
  await mail.update({ state: "sent", sentAt: now(), lastError: null });
  return true;
}

/**
 * Send every mail that is due. A mail whose sending was cut off (the process died between the mail server's answer
 * and our note of it) may have gone out: it is marked uncertain and left to a person, never sent a second time.
 *
 * @returns how many were sent
 */
export async function sendDueMail(limit = 50): Promise<number> {
  await OutboxMail.update(
    { state: "uncertain", lastError: "The program stopped while this mail was being sent." },
    { where: { state: "sending", runAfter: { [Op.lt]: new Date(now().getTime() - 5 * minuteMs) } } },
  );
  let sent = 0;
  for (let turn = 0; turn < limit; turn++) {
    const mail = await claimMail();
    if (!mail) break;
    if (await deliver(mail)) sent++;
  }
  return sent;
}

export type OutboxLine = {
  id: number;
  toName: string;
  subject: string;
  state: MailState;
  attempts: number;
  createdAt: string;
  sentAt: string | null;
  lastError: string | null;
};

/** The mails of the last 60 days, newest first, at most 200. */
export async function listOutbox(): Promise<OutboxLine[]> {
  const mails = await OutboxMail.findAll({
    attributes: ["id", "toName", "subject", "state", "attempts", "createdAt", "sentAt", "lastError"],
    where: { createdAt: { [Op.gt]: new Date(now().getTime() - 60 * dayMs) } },
    order: [["id", "DESC"]],
    limit: 200,
  });
  return mails.map((mail) => ({
    id: mail.id,
    toName: mail.toName,
    subject: mail.subject,
    state: mail.state,
    attempts: mail.attempts,
    createdAt: mail.createdAt.toISOString(),
    sentAt: mail.sentAt?.toISOString() ?? null,
    lastError: mail.lastError,
  }));
}
