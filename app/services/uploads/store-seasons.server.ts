import type { Transaction } from "sequelize";
import type { TownActor } from "#app/context.ts";
import { seasonLabel } from "#app/domain/dates.ts";
import { now } from "#app/lib/clock.server.ts";
import { SeasonFigure } from "#app/models/season-figure.server.ts";
import { recordAudit } from "../audit.server.ts";
import { NotNow, type Stored, SeasonShape, type StagedRow } from "./staged.server.ts";

/** Fill seasons with the figures of a file; a draft that is there already gives way and is kept in the trail. */
export async function storeSeasons(
  actor: TownActor,
  uploadId: number,
  rows: readonly StagedRow[],
  transaction: Transaction,
): Promise<Stored> {
  const seasons = rows.map(({ staged }) => SeasonShape.parse(staged));
  for (const { seasonStartYear, amounts } of seasons) {
    const where = { townId: actor.townId, seasonStartYear };
    const figure = await SeasonFigure.findOne({ where, lock: transaction.LOCK.UPDATE, transaction });
    if (figure && figure.state !== "draft" && figure.state !== "returned") {
      throw new NotNow(
        `${seasonLabel(seasonStartYear)} was sent in meanwhile, so nothing was taken in. Ask the coordinator to send it back first.`,
      );
    }
    const before = figure ? { version: figure.version, saltLb: figure.saltLb, laneMiles: figure.laneMiles } : null;
    const saved = figure
      ? await figure.update({ ...amounts, uploadId, version: figure.version + 1 }, { transaction })
      : await SeasonFigure.create({ ...where, ...amounts, uploadId, createdAt: now() }, { transaction });
    const detail = { seasonStartYear, before, after: amounts };
    const deed = { action: "season-figure.fill", entity: "season_figure", entityId: saved.id, detail };
    await recordAudit(actor, deed, transaction);
  }
  return { rowCount: seasons.length, seasonStartYears: [], days: [] };
}
