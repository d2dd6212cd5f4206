import { Op, type Transaction } from "sequelize";
import type { NetworkActor } from "#app/context.ts";
import { seasonLabel } from "#app/domain/dates.ts";
import { seasonAcceptedLetter, seasonReturnedLetter } from "#app/emails/season.ts";
import { now } from "#app/lib/clock.server.ts";
import { inTransaction } from "#app/lib/db.server.ts";
import { env } from "#app/lib/env.server.ts";
import { notFound } from "#app/lib/errors.ts";
import { figureTown } from "#app/models/associations.server.ts";
import { Season } from "#app/models/season.server.ts";
import { SeasonFigure } from "#app/models/season-figure.server.ts";
import { Town } from "#app/models/town.server.ts";
import { recordAudit } from "./audit.server.ts";
import { directorsOf } from "./mail-recipients.server.ts";
import { queueMail } from "./outbox.server.ts";
import { amountsOf, type FigureView, figureView } from "./season-figures.server.ts";

export type ReviewItem = { figure: FigureView; townName: string; doubts: number };

export type ReviewQueue = {
  seasonStartYear: number;
  figuresDueOn: string;
  /** Sent, with something to look at; most doubtful first. */
  doubtful: ReviewItem[];
  /** Sent, and passed every check. */
  clean: ReviewItem[];
  acceptedCount: number;
  returned: ReviewItem[];
  missingTowns: string[];
};

/** How doubtful a figure is: an error counts ten checks; a town's own history says how far off it is. */
function doubtsOf(view: FigureView): number {
  return view.findings.reduce((sum, finding) => sum + (finding.severity === "error" ? 10 : 1), 0);
}

/** What has been sent in for one season. @throws 404 when the season is not opened */
export async function getReviewQueue(_actor: NetworkActor, seasonStartYear: number): Promise<ReviewQueue> {
  const [season, figures, towns] = await Promise.all([
    Season.findByPk(seasonStartYear),
    SeasonFigure.findAll({ include: [figureTown], order: [["seasonStartYear", "ASC"]] }),
    Town.findAll({ attributes: ["id", "name"], order: [["name", "ASC"]] }),
  ]);
  if (!season) throw notFound("season");
  const ofSeason = figures.filter((figure) => figure.seasonStartYear === seasonStartYear);
  const items = ofSeason.map((figure) => {
    const earlier = figures.filter(
      (other) => other.townId === figure.townId && other.seasonStartYear < seasonStartYear && other.state !== "draft",
    );
    const view = figureView(figure, earlier);
    return { figure: view, townName: figure.town?.name ?? "", doubts: doubtsOf(view) };
  });
  const sent = items.filter((item) => item.figure.state === "sent");
  const reported = new Set(ofSeason.filter((figure) => figure.state !== "draft").map((figure) => figure.townId));
  return {
    seasonStartYear,
    figuresDueOn: season.figuresDueOn,
    doubtful: sent
      .filter((item) => item.doubts > 0)
      .sort((a, b) => b.doubts - a.doubts || a.townName.localeCompare(b.townName)),
    clean: sent.filter((item) => item.doubts === 0).sort((a, b) => a.townName.localeCompare(b.townName)),
    acceptedCount: items.filter((item) => item.figure.state === "accepted").length,
    returned: items.filter((item) => item.figure.state === "returned"),
    missingTowns: towns.filter((town) => !reported.has(town.id)).map((town) => town.name),
  };
}

export type FigureReview = { figure: FigureView; townName: string; earlier: FigureView[] };

/** One sent figure beside the town's earlier seasons. Drafts are the town's own: 404, as for one that is not there. */
export async function getFigureReview(_actor: NetworkActor, figureId: number): Promise<FigureReview> {
  const figure = await SeasonFigure.findByPk(figureId, { include: [figureTown] });
  if (!figure || figure.state === "draft") throw notFound("sent season");
  // Neither shown nor compared with: what a town has not sent is not the coordinator's to see.
  const where = { townId: figure.townId, state: { [Op.ne]: "draft" } };
  const figures = await SeasonFigure.findAll({ where, order: [["seasonStartYear", "ASC"]] });
  const earlier = figures.filter((other) => other.seasonStartYear < figure.seasonStartYear);
  const before = (year: number) => figures.filter((other) => other.seasonStartYear < year);
  return {
    figure: figureView(figure, earlier),
    townName: figure.town?.name ?? "",
    earlier: earlier.map((other) => figureView(other, before(other.seasonStartYear))),
  };
}

async function settle(
  actor: NetworkActor,
  figureId: number,
  version: number,
  verdict: { state: "accepted" | "returned"; note: string | null },
  transaction: Transaction,
) {
  const figure = await SeasonFigure.findByPk(figureId, {
    include: [figureTown],
    lock: { level: transaction.LOCK.UPDATE, of: SeasonFigure },
    transaction,
  });
  if (!figure || figure.state === "draft") throw notFound("sent season");
  if (figure.state !== "sent" || figure.version !== version) return { ok: false, reason: "changed-meanwhile" } as const;
  const { state, note } = verdict;
  await figure.update(
    { state, reviewNote: note, reviewedAt: now(), reviewedById: actor.userId, version: version + 1 },
    { transaction },
  );
  await recordAudit(
    actor,
    {
      action: state === "accepted" ? "season-figure.accept" : "season-figure.return",
      entity: "season_figure",
      entityId: figure.id,
      townId: figure.townId,
      detail: { note, ...amountsOf(figure) },
    },
    transaction,
  );
  const occasion = {
    townName: figure.town?.name ?? "",
    season: seasonLabel(figure.seasonStartYear),
    address: `${env.publicOrigin}/season/${figure.seasonStartYear}`,
  };
  for (const { userId, ...to } of await directorsOf(figure.townId, transaction)) {
    const written =
      note === null ? seasonAcceptedLetter({ ...to, ...occasion }) : seasonReturnedLetter({ ...to, ...occasion, note });
    await queueMail(`season-${state}:${figure.id}:${figure.version}:${userId}`, written, transaction);
  }
  return { ok: true } as const;
}

/**
 * Accept a sent season as it is; it goes into the next edition.
 *
 * @param version - the version the coordinator looked at
 * @returns `{ ok: false }` when it was settled or changed meanwhile
 * @throws 404 when nothing was sent under that id
 */
export async function acceptFigure(actor: NetworkActor, figureId: number, version: number) {
  return inTransaction((transaction) =>
    settle(actor, figureId, version, { state: "accepted", note: null }, transaction),
  );
}

/** Send a season back with a question, which goes to the town by mail. Returns and throws as acceptFigure. */
export async function returnFigure(actor: NetworkActor, figureId: number, version: number, note: string) {
  return inTransaction((transaction) => settle(actor, figureId, version, { state: "returned", note }, transaction));
}

/** A figure as the coordinator saw it on the page. */
export type SeenFigure = { figureId: number; version: number };

/**
 * Accept the sent seasons that the coordinator saw listed as clean. One that was changed or settled since, or is no
 * longer clean, is passed over.
 *
 * @param seen - at most 1,000
 * @returns how many were accepted
 */
export async function acceptCleanFigures(
  actor: NetworkActor,
  seasonStartYear: number,
  seen: readonly SeenFigure[],
): Promise<number> {
  const { clean } = await getReviewQueue(actor, seasonStartYear);
  const isSeen = ({ id, version }: FigureView) =>
    seen.slice(0, 1000).some((one) => one.figureId === id && one.version === version);
  let accepted = 0;
  for (const { figure } of clean.filter((item) => isSeen(item.figure))) {
    const outcome = await acceptFigure(actor, figure.id, figure.version);
    if (outcome.ok) accepted++;
  }
  return accepted;
}
