import type { Transaction } from "sequelize";
import { seasonLabel } from "#app/domain/dates.ts";
import { now } from "#app/lib/clock.server.ts";
import { conflict, notFound } from "#app/lib/errors.ts";
import { formatDay } from "#app/lib/format.ts";
import { Season } from "#app/models/season.server.ts";
import { SeasonFigure } from "#app/models/season-figure.server.ts";

/**
 * Why a town may not change its season now. Holds the town's figures until the transaction ends, so that they are not
 * sent in while something under them changes.
 *
 * @returns a sentence for the person, or null when the season is open to the town
 * @throws 404 when the network has not opened that season
 */
export async function seasonRefusal(
  townId: number,
  seasonStartYear: number,
  transaction: Transaction,
): Promise<string | null> {
  const [season, figure] = [
    await Season.findByPk(seasonStartYear, { transaction }),
    await SeasonFigure.findOne({
      attributes: ["id", "state"],
      where: { townId, seasonStartYear },
      lock: transaction.LOCK.UPDATE,
      transaction,
    }),
  ];
  if (!season) throw notFound("season");
  const label = seasonLabel(seasonStartYear);
  if (figure?.state === "sent" || figure?.state === "accepted") {
    return `${label} has been sent in, so nothing in it changes. Ask the coordinator to send it back first.`;
  }
  // What the coordinator sent back has to be put right, whatever the date.
  if (figure?.state === "returned") return null;
  const today = now().toISOString().slice(0, 10);
  if (season.opensOn !== null && today < season.opensOn) return `${label} opens on ${formatDay(season.opensOn)}.`;
  if (season.closesOn !== null && today > season.closesOn) {
    return `${label} was closed on ${formatDay(season.closesOn)}. Ask the coordinator to open it again.`;
  }
  return null;
}

/**
 * Refuse to change what belongs to a season that is closed to the town.
 *
 * @throws 404 when the network has not opened that season; 409 when it was sent in, is closed, or opens later
 */
export async function assertSeasonOpen(townId: number, seasonStartYear: number, transaction: Transaction) {
  const refusal = await seasonRefusal(townId, seasonStartYear, transaction);
  if (refusal !== null) throw conflict(refusal);
}
