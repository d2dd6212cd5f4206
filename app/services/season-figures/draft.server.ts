import type { TownActor } from "#app/context.ts";
import type { SeasonAmounts } from "#app/domain/season/season-totals.ts";
import { now } from "#app/lib/clock.server.ts";
import { inTransaction, isDuplicate } from "#app/lib/db.server.ts";
import { SeasonFigure } from "#app/models/season-figure.server.ts";
import { recordAudit } from "../audit.server.ts";
import { seasonRefusal } from "./open.server.ts";
import { amountsOf, extrasOf } from "../season-figures.server.ts";

export type DraftSaved = { ok: true; version: number } | { ok: false; refusal: string };

const changedMeanwhile =
  "Somebody changed these figures since you opened the page. Yours are still in the form: compare, and save again.";

/**
 * Write the town's own figures of a season down, typed or taken over from storms and stock.
 *
 * @param version - the version the person looked at; null when there were none
 * @returns the new version, or why not: the season is closed to the town, or somebody changed the figures meanwhile
 * @throws 404 when the network has not opened that season
 */
export async function saveDraft(
  actor: TownActor,
  seasonStartYear: number,
  given: { version: number | null; amounts: SeasonAmounts; wettedSaltLb: number | null },
): Promise<DraftSaved> {
  const { version, amounts, wettedSaltLb } = given;
  try {
    return await inTransaction(async (transaction): Promise<DraftSaved> => {
      const refusal = await seasonRefusal(actor.townId, seasonStartYear, transaction);
      if (refusal !== null) return { ok: false, refusal };
      const where = { townId: actor.townId, seasonStartYear };
      const figure = await SeasonFigure.findOne({ where, lock: transaction.LOCK.UPDATE, transaction });
      if ((figure?.version ?? null) !== version) return { ok: false, refusal: changedMeanwhile };
      const before = figure && { ...amountsOf(figure), ...extrasOf(figure) };
      const saved = figure
        ? await figure.update(
            { ...amounts, wettedSaltLb, uploadId: null, version: figure.version + 1 },
            { transaction },
          )
        : await SeasonFigure.create(
            { ...where, ...amounts, wettedSaltLb, version: 1, createdAt: now() },
            { transaction },
          );
      await recordAudit(
        actor,
        {
          action: "season-figure.fill",
          entity: "season_figure",
          entityId: saved.id,
          detail: { seasonStartYear, before, after: { ...amounts, wettedSaltLb } },
        },
        transaction,
      );
      return { ok: true, version: saved.version };
    });
  } catch (error) {
    // Two people began the same season at once: the second looks at what the first wrote.
    if (isDuplicate(error)) return { ok: false, refusal: changedMeanwhile };
    throw error;
  }
}
