import { Op, type Transaction, type WhereOptions } from "sequelize";
import type { MailOccasion } from "#app/domain/mail-occasions.ts";
import { MailChoice } from "#app/models/mail-choice.server.ts";
import { UserAccount } from "#app/models/user-account.server.ts";

export type Recipient = { userId: number; toName: string; toAddress: string };

/** People who are let in and have not said no to the occasion. */
async function willing(where: WhereOptions<UserAccount>, occasion: MailOccasion, transaction: Transaction) {
  const accounts = await UserAccount.findAll({
    attributes: ["id", "name", "email", "townId"],
    where: { ...where, isActive: true },
    order: [["id", "ASC"]],
    transaction,
  });
  const refusals = await MailChoice.findAll({
    attributes: ["userId"],
    where: { userId: accounts.map(({ id }) => id), occasion, isWanted: false },
    raw: true,
    transaction,
  });
  const unwilling = new Set(refusals.map(({ userId }) => userId));
  return accounts.filter(({ id }) => !unwilling.has(id));
}

function recipients(accounts: readonly UserAccount[]): Recipient[] {
  return accounts.map(({ id, name, email }) => ({ userId: id, toName: name, toAddress: email }));
}

/** Every coordinator who is let in and wants the mail of that occasion. */
export async function coordinators(occasion: MailOccasion, transaction: Transaction): Promise<Recipient[]> {
  return recipients(await willing({ role: "coordinator" }, occasion, transaction));
}

/** The directors of one town who want the mail of that occasion. */
export async function directorsOf(townId: number, occasion: MailOccasion, transaction: Transaction) {
  return recipients(await willing({ role: "director", townId }, occasion, transaction));
}

/** The directors and recorders of one town who want the mail of that occasion. */
export async function peopleOf(townId: number, occasion: MailOccasion, transaction: Transaction) {
  return recipients(await willing({ role: ["director", "recorder"], townId }, occasion, transaction));
}

/** Every director of the network who wants the mail of that occasion. */
export async function allDirectors(occasion: MailOccasion, transaction: Transaction): Promise<Recipient[]> {
  return recipients(await willing({ role: "director" }, occasion, transaction));
}

/** Everybody of every town, but for the towns given, who wants the mail of that occasion. */
export async function townPeopleBut(
  townIds: readonly number[],
  occasion: MailOccasion,
  transaction: Transaction,
): Promise<Recipient[]> {
  const where = { role: ["director", "recorder"], townId: { [Op.notIn]: [0, ...townIds] } };
  return recipients(await willing(where, occasion, transaction));
}
