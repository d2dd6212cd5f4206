import type { TownActor } from "#app/context.ts";
import { seasonLabel } from "#app/domain/dates.ts";
import type { Finding } from "#app/domain/finding.ts";
import { seasonFindings } from "#app/domain/season/season-findings.ts";
import { type SeasonAmounts, seasonTotals } from "#app/domain/season/season-totals.ts";
import { seasonSentLetter } from "#app/emails/season.ts";
import { now } from "#app/lib/clock.server.ts";
import { inTransaction } from "#app/lib/db.server.ts";
import { env } from "#app/lib/env.server.ts";
import { notFound } from "#app/lib/errors.ts";
import { Season } from "#app/models/season.server.ts";
import { type FigureState, SeasonFigure } from "#app/models/season-figure.server.ts";
import { recordAudit } from "./audit.server.ts";
import { coordinators } from "./mail-recipients.server.ts";
import { queueMail } from "./outbox.server.ts";

export type FigureView = {
  id: number;
  seasonStartYear: number;
  state: FigureState;
  version: number;
  amounts: SeasonAmounts;
  totals: ReturnType<typeof seasonTotals>;
  findings: Finding[];
  sentAt: string | null;
  reviewedAt: string | null;
  reviewNote: string | null;
};

/** A figure's measured amounts alone, without the columns around them. */
export function amountsOf(figure: SeasonFigure): SeasonAmounts {
  const { laneMiles, eventCount, saltLb, mixLb, mixSaltShare, sandLb, brineGal, materialCostCents } = figure;
  return { laneMiles, eventCount, saltLb, mixLb, mixSaltShare, sandLb, brineGal, materialCostCents };
}

/**
 * One figure as its town and the coordinator see it.
 *
 * @param earlier - the town's figures of earlier seasons, oldest first
 */
export function figureView(figure: SeasonFigure, earlier: readonly SeasonFigure[]): FigureView {
  const amounts = amountsOf(figure);
  return {
    id: figure.id,
    seasonStartYear: figure.seasonStartYear,
    state: figure.state,
    version: figure.version,
    amounts,
    totals: seasonTotals(amounts),
    findings: seasonFindings(amounts, earlier.map(amountsOf)),
    sentAt: figure.sentAt?.toISOString() ?? null,
    reviewedAt: figure.reviewedAt?.toISOString() ?? null,
    reviewNote: figure.reviewNote,
  };
}

export type SeasonView = {
  seasonStartYear: number;
  figuresDueOn: string;
  figure: FigureView | null;
  /** The town's other seasons, newest first. */
  otherSeasons: FigureView[];
  /** Every season the network has opened, newest first. */
  seasonStartYears: number[];
};

/** The season the town is asked for: the newest whose figures are wanted and that has begun, or the newest of all. */
export async function workingSeason(): Promise<number | null> {
  const today = now().toISOString().slice(0, 10);
  const seasons = await Season.findAll({ order: [["startYear", "DESC"]] });
  const over = seasons.find((season) => `${season.startYear + 1}-06-30` < today);
  return (over ?? seasons[0])?.startYear ?? null;
}

/** How many events the town's newest season figures name; null when it has sent in none. */
export async function lastEventCount(actor: TownActor): Promise<number | null> {
  const figure = await SeasonFigure.findOne({
    attributes: ["eventCount"],
    where: { townId: actor.townId },
    order: [["seasonStartYear", "DESC"]],
  });
  return figure?.eventCount ?? null;
}

/** @throws 404 when the network has not opened that season */
export async function getSeason(actor: TownActor, seasonStartYear: number): Promise<SeasonView> {
  const [seasons, figures] = await Promise.all([
    Season.findAll({ order: [["startYear", "DESC"]] }),
    SeasonFigure.findAll({ where: { townId: actor.townId }, order: [["seasonStartYear", "ASC"]] }),
  ]);
  const season = seasons.find(({ startYear }) => startYear === seasonStartYear);
  if (!season) throw notFound("season");
  const before = (year: number) => figures.filter((other) => other.seasonStartYear < year);
  const figure = figures.find((own) => own.seasonStartYear === seasonStartYear);
  return {
    seasonStartYear,
    figuresDueOn: season.figuresDueOn,
    figure: figure ? figureView(figure, before(seasonStartYear)) : null,
    otherSeasons: figures
      .filter((other) => other.seasonStartYear !== seasonStartYear)
      .reverse()
      .map((other) => figureView(other, before(other.seasonStartYear))),
    seasonStartYears: seasons.map(({ startYear }) => startYear),
  };
}

/**
 * Send a season in. From then on the town changes nothing in it unless the coordinator sends it back.
 *
 * @param version - the version the director looked at
 * @returns `{ ok: false }` when it was sent before or changed since the director looked
 * @throws 404 when the town has no figures for that season
 */
export async function sendSeason(actor: TownActor, seasonStartYear: number, version: number) {
  return inTransaction(async (transaction) => {
    const where = { townId: actor.townId, seasonStartYear };
    const figure = await SeasonFigure.findOne({ where, lock: transaction.LOCK.UPDATE, transaction });
    if (!figure) throw notFound("season figure");
    if (figure.state === "sent" || figure.state === "accepted") return { ok: false, reason: "sent-before" } as const;
    if (figure.version !== version) return { ok: false, reason: "changed-meanwhile" } as const;
    if (seasonFindings(amountsOf(figure), []).some((finding) => finding.severity === "error")) {
      return { ok: false, reason: "errors-stand" } as const;
    }
    await figure.update(
      { state: "sent", sentAt: now(), sentById: actor.userId, version: version + 1 },
      { transaction },
    );
    await recordAudit(
      actor,
      { action: "season-figure.send", entity: "season_figure", entityId: figure.id, detail: { ...amountsOf(figure) } },
      transaction,
    );
    for (const { userId, ...to } of await coordinators(transaction)) {
      const address = `${env.publicOrigin}/network/review/${figure.id}`;
      const sent = seasonSentLetter({ ...to, townName: actor.townName, season: seasonLabel(seasonStartYear), address });
      await queueMail(`season-sent:${figure.id}:${figure.version}:${userId}`, sent, transaction);
    }
    return { ok: true } as const;
  });
}
