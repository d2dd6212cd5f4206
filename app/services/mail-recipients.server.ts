import type { Transaction } from "sequelize";
import { UserAccount } from "#app/models/user-account.server.ts";

export type Recipient = { userId: number; toName: string; toAddress: string };

function recipients(accounts: UserAccount[]): Recipient[] {
  return accounts.map(({ id, name, email }) => ({ userId: id, toName: name, toAddress: email }));
}

/** Every coordinator who is let in. */
export async function coordinators(transaction: Transaction): Promise<Recipient[]> {
  return recipients(await UserAccount.findAll({ where: { role: "coordinator", isActive: true }, transaction }));
}

/** The directors of one town who are let in. */
export async function directorsOf(townId: number, transaction: Transaction): Promise<Recipient[]> {
  return recipients(await UserAccount.findAll({ where: { role: "director", townId, isActive: true }, transaction }));
}

/** Every director of the network who is let in. */
export async function allDirectors(transaction: Transaction): Promise<Recipient[]> {
  return recipients(await UserAccount.findAll({ where: { role: "director", isActive: true }, transaction }));
}
