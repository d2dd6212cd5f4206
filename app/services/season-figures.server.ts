import { Op, type Transaction } from "sequelize";
import type { TownActor } from "#app/context.ts";
import { seasonLabel } from "#app/domain/dates.ts";
import type { Finding } from "#app/domain/finding.ts";
import { liquidShare } from "#app/domain/season/brine.ts";
import { heaviestFirst } from "#app/domain/season/doubt.ts";
import { logFindings } from "#app/domain/season/log-findings.ts";
import { seasonFindings } from "#app/domain/season/season-findings.ts";
import { type SeasonAmounts, seasonTotals, type SeasonTotals } from "#app/domain/season/season-totals.ts";
import { winterFindings } from "#app/domain/season/winter-findings.ts";
import { seasonSentLetter } from "#app/emails/season.ts";
import { now } from "#app/lib/clock.server.ts";
import { inTransaction } from "#app/lib/db.server.ts";
import { env } from "#app/lib/env.server.ts";
import { notFound } from "#app/lib/errors.ts";
import { FigureVersion } from "#app/models/figure-version.server.ts";
import { Season } from "#app/models/season.server.ts";
import { type FigureState, SeasonFigure } from "#app/models/season-figure.server.ts";
import { recordAudit } from "./audit.server.ts";
import { coordinators } from "./mail-recipients.server.ts";
import { queueMail } from "./outbox.server.ts";
import { readSeasonBases, readSeasonBasis, type SeasonBasis } from "./season-basis.server.ts";
import { awssiOfTowns } from "./weather.server.ts";

/** What a town reports besides its amounts. null = not reported, or not known. */
export type FigureExtras = {
  laneMilesTreated: number | null;
  wettedSaltLb: number | null;
  stockUsedLb: number | null;
  stockLoggedLb: number | null;
};

export type FigureView = {
  id: number;
  seasonStartYear: number;
  state: FigureState;
  version: number;
  amounts: SeasonAmounts;
  extras: FigureExtras;
  totals: SeasonTotals;
  /** 0 to 1; null when neither wetted salt nor brine is reported. */
  liquidShare: number | null;
  /** Of what left the piles, by the storm log; null when the piles were not measured. */
  unexplainedShare: number | null;
  /** The winter index of the season in points; null when not known. */
  awssiPoints: number | null;
  /** Heaviest first. */
  findings: Finding[];
  sentAt: string | null;
  reviewedAt: string | null;
  reviewNote: string | null;
};

/** What a figure is held against besides itself. */
export type Surroundings = {
  basis: Pick<SeasonBasis, "findings" | "draft"> | null;
  awssiByYear: ReadonlyMap<number, number>;
};

/** A figure's measured amounts alone, without the columns around them. */
export function amountsOf(figure: SeasonFigure): SeasonAmounts {
  const { laneMiles, eventCount, saltLb, mixLb, mixSaltShare, sandLb, brineGal, materialCostCents } = figure;
  return { laneMiles, eventCount, saltLb, mixLb, mixSaltShare, sandLb, brineGal, materialCostCents };
}

/** What stands beside a figure's amounts. */
export function extrasOf(figure: SeasonFigure): FigureExtras {
  const { laneMilesTreated, wettedSaltLb, stockUsedLb, stockLoggedLb } = figure;
  return { laneMilesTreated, wettedSaltLb, stockUsedLb, stockLoggedLb };
}

function findingsOf(figure: SeasonFigure, earlier: readonly SeasonFigure[], around: Surroundings): Finding[] {
  const amounts = amountsOf(figure);
  const found = seasonFindings(amounts, earlier.map(amountsOf));
  if (found.some(({ severity }) => severity === "error")) return found;
  const winterOf = (season: SeasonFigure) => ({
    saltLbPerLaneMile: seasonTotals(amountsOf(season)).saltLbPerLaneMile,
    awssiPoints: around.awssiByYear.get(season.seasonStartYear) ?? null,
  });
  return heaviestFirst([
    ...found,
    ...winterFindings(winterOf(figure), earlier.map(winterOf)),
    ...(around.basis ? [...logFindings(amounts, around.basis.draft), ...around.basis.findings] : []),
  ]);
}

/**
 * One figure as its town and the coordinator see it.
 *
 * @param earlier - the town's figures of earlier seasons, oldest first
 * @param around - what its storms, piles and winters say; nothing of it is checked when left out
 */
export function figureView(
  figure: SeasonFigure,
  earlier: readonly SeasonFigure[],
  around: Surroundings = { basis: null, awssiByYear: new Map() },
): FigureView {
  const [amounts, extras] = [amountsOf(figure), extrasOf(figure)];
  const totals = seasonTotals(amounts);
  const { wettedSaltLb, stockUsedLb, stockLoggedLb } = extras;
  return {
    id: figure.id,
    seasonStartYear: figure.seasonStartYear,
    state: figure.state,
    version: figure.version,
    amounts,
    extras,
    totals,
    liquidShare: liquidShare({ totalSaltLb: totals.totalSaltLb, wettedSaltLb, brineGal: amounts.brineGal }),
    unexplainedShare:
      stockUsedLb === null || stockLoggedLb === null || stockUsedLb <= 0
        ? null
        : (stockUsedLb - stockLoggedLb) / stockUsedLb,
    awssiPoints: around.awssiByYear.get(figure.seasonStartYear) ?? null,
    findings: findingsOf(figure, earlier, around),
    sentAt: figure.sentAt?.toISOString() ?? null,
    reviewedAt: figure.reviewedAt?.toISOString() ?? null,
    reviewNote: figure.reviewNote,
  };
}

/** What the seasons of several towns are held against. @returns by town id */
export async function readSurroundings(townIds: readonly number[], seasonStartYear: number) {
  const [bases, awssi] = await Promise.all([readSeasonBases(townIds, seasonStartYear), awssiOfTowns(townIds)]);
  return new Map(
    townIds.map((townId): [number, Surroundings] => [
      townId,
      { basis: bases.get(townId) ?? null, awssiByYear: awssi.get(townId) ?? new Map<number, number>() },
    ]),
  );
}

/** The season the town is asked for: the newest whose figures are wanted and that has begun, or the newest of all. */
export async function workingSeason(): Promise<number | null> {
  const today = now().toISOString().slice(0, 10);
  const seasons = await Season.findAll({ order: [["startYear", "DESC"]] });
  const over = seasons.find((season) => `${season.startYear + 1}-06-30` < today);
  return (over ?? seasons[0])?.startYear ?? null;
}

/** Every season the network has opened, newest first. */
export async function getSeasonYears(): Promise<number[]> {
  const seasons = await Season.findAll({ attributes: ["startYear"], order: [["startYear", "DESC"]] });
  return seasons.map(({ startYear }) => startYear);
}

export type SeasonState = {
  seasonStartYear: number;
  figuresDueOn: string;
  figure: { state: FigureState; reviewNote: string | null } | null;
};

/** How far the town is with a season, without looking at what the figures say. @throws 404 when it is not opened */
export async function getSeasonState(actor: TownActor, seasonStartYear: number): Promise<SeasonState> {
  const [season, figure] = await Promise.all([
    Season.findByPk(seasonStartYear),
    SeasonFigure.findOne({
      attributes: ["state", "reviewNote"],
      where: { townId: actor.townId, seasonStartYear },
    }),
  ]);
  if (!season) throw notFound("season");
  return {
    seasonStartYear,
    figuresDueOn: season.figuresDueOn,
    figure: figure && { state: figure.state, reviewNote: figure.reviewNote },
  };
}

export type SeasonView = {
  seasonStartYear: number;
  figuresDueOn: string;
  closesOn: string | null;
  figure: FigureView | null;
  /** The town's other seasons, newest first. */
  otherSeasons: FigureView[];
  /** Every season the network has opened, newest first. */
  seasonStartYears: number[];
  basis: SeasonBasis;
};

/** @throws 404 when the network has not opened that season */
export async function getSeason(actor: TownActor, seasonStartYear: number): Promise<SeasonView> {
  const [seasons, figures, basis, awssi] = await Promise.all([
    Season.findAll({ order: [["startYear", "DESC"]] }),
    SeasonFigure.findAll({ where: { townId: actor.townId }, order: [["seasonStartYear", "ASC"]] }),
    readSeasonBasis(actor.townId, seasonStartYear),
    awssiOfTowns([actor.townId]),
  ]);
  const season = seasons.find(({ startYear }) => startYear === seasonStartYear);
  if (!season) throw notFound("season");
  const awssiByYear = awssi.get(actor.townId) ?? new Map<number, number>();
  const before = (year: number) => figures.filter((other) => other.seasonStartYear < year);
  const figure = figures.find((own) => own.seasonStartYear === seasonStartYear);
  return {
    seasonStartYear,
    figuresDueOn: season.figuresDueOn,
    closesOn: season.closesOn,
    figure: figure ? figureView(figure, before(seasonStartYear), { basis, awssiByYear }) : null,
    otherSeasons: figures
      .filter((other) => other.seasonStartYear !== seasonStartYear)
      .reverse()
      .map((other) => figureView(other, before(other.seasonStartYear), { basis: null, awssiByYear })),
    seasonStartYears: seasons.map(({ startYear }) => startYear),
    basis,
  };
}

async function writeToCoordinators(actor: TownActor, figure: SeasonFigure, transaction: Transaction) {
  for (const { userId, ...to } of await coordinators("season-sent", transaction)) {
    const address = `${env.publicOrigin}/network/review/${figure.id}`;
    const season = seasonLabel(figure.seasonStartYear);
    const letter = seasonSentLetter({ ...to, townName: actor.townName, season, address });
    await queueMail(`season-sent:${figure.id}:${figure.version}:${userId}`, letter, transaction);
  }
}

/**
 * Send a season in. What is sent is kept as it is, for good; from then on the town changes nothing in the season unless
 * the coordinator sends it back.
 *
 * @param version - the version the director looked at
 * @returns `{ ok: false }` when it was sent before, changed since the director looked, or cannot be right
 * @throws 404 when the town has no figures for that season
 */
export async function sendSeason(actor: TownActor, seasonStartYear: number, version: number) {
  const { draft } = await readSeasonBasis(actor.townId, seasonStartYear);
  return inTransaction(async (transaction) => {
    const where = { townId: actor.townId, seasonStartYear };
    const figure = await SeasonFigure.findOne({ where, lock: transaction.LOCK.UPDATE, transaction });
    if (!figure) throw notFound("season figure");
    if (figure.state === "sent" || figure.state === "accepted") return { ok: false, reason: "sent-before" } as const;
    if (figure.version !== version) return { ok: false, reason: "changed-meanwhile" } as const;
    if (seasonFindings(amountsOf(figure), []).some((finding) => finding.severity === "error")) {
      return { ok: false, reason: "errors-stand" } as const;
    }
    const { laneMilesTreated, stockUsedLb, stockLoggedLb } = draft;
    const sentAt = now();
    await figure.update(
      {
        state: "sent",
        sentAt,
        sentById: actor.userId,
        version: version + 1,
        laneMilesTreated,
        stockUsedLb,
        stockLoggedLb,
      },
      { transaction },
    );
    const content = { ...amountsOf(figure), ...extrasOf(figure) };
    await FigureVersion.create(
      { figureId: figure.id, version: figure.version, content, sentAt, sentById: actor.userId },
      { transaction },
    );
    await recordAudit(
      actor,
      { action: "season-figure.send", entity: "season_figure", entityId: figure.id, detail: content },
      transaction,
    );
    await writeToCoordinators(actor, figure, transaction);
    return { ok: true } as const;
  });
}

/** Figures of the same towns in earlier seasons, oldest first. */
export async function earlierFigures(townIds: readonly number[], seasonStartYear: number): Promise<SeasonFigure[]> {
  return SeasonFigure.findAll({
    where: { townId: [...townIds], seasonStartYear: { [Op.lt]: seasonStartYear } },
    order: [["seasonStartYear", "ASC"]],
  });
}
