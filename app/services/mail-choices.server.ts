import type { PersonActor } from "#app/context.ts";
import { type MailOccasion, occasionsOf } from "#app/domain/mail-occasions.ts";
import { inTransaction } from "#app/lib/db.server.ts";
import { MailChoice } from "#app/models/mail-choice.server.ts";

export type MailChoiceView = { occasion: MailOccasion; isWanted: boolean };

/** Which mail one gets, occasion by occasion; none for a role that is not written to. */
export async function listMailChoices(actor: PersonActor): Promise<MailChoiceView[]> {
  const refused = await MailChoice.findAll({ where: { userId: actor.userId, isWanted: false }, raw: true });
  return occasionsOf(actor.role).map((occasion) => ({
    occasion,
    isWanted: !refused.some((choice) => choice.occasion === occasion),
  }));
}

/** Choose which mail one gets. @param wanted - occasions of one's role; the others are not sent from now on */
export async function saveMailChoices(actor: PersonActor, wanted: readonly string[]): Promise<void> {
  await inTransaction(async (transaction) => {
    for (const occasion of occasionsOf(actor.role)) {
      await MailChoice.upsert({ userId: actor.userId, occasion, isWanted: wanted.includes(occasion) }, { transaction });
    }
  });
}
