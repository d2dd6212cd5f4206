import type { NetworkActor } from "#app/context.ts";
import { doubtOf, heaviestFirst } from "#app/domain/season/doubt.ts";
import { outlierFindings } from "#app/domain/season/outlier-findings.ts";
import { seasonTotals } from "#app/domain/season/season-totals.ts";
import { notFound } from "#app/lib/errors.ts";
import { figureTown } from "#app/models/associations.server.ts";
import { Season } from "#app/models/season.server.ts";
import { SeasonFigure } from "#app/models/season-figure.server.ts";
import { Town } from "#app/models/town.server.ts";
import { type SeasonBasis, readSeasonBasis } from "./season-basis.server.ts";
import {
  amountsOf,
  earlierFigures,
  type FigureView,
  figureView,
  readSurroundings,
  type Surroundings,
} from "./season-figures.server.ts";
import { type FigureHistory, figureHistory } from "./season-figures/history.server.ts";
import { type FleetCoverage, fleetCoverage } from "./season-figures/fleet-coverage.server.ts";

export type ReviewItem = { figure: FigureView; townName: string; doubts: number };
/** Salt per lane mile of one season, for the town's own road. */
export type SeasonPoint = { seasonStartYear: number; tonsPerLaneMile: number };

export type ReviewQueue = {
  seasonStartYear: number;
  figuresDueOn: string;
  /** Sent, with something to look at; most doubtful first. */
  doubtful: ReviewItem[];
  /** The most doubtful one's seasons, oldest first, itself last. */
  firstSeasons: SeasonPoint[];
  /** Sent, and passed every check. */
  clean: ReviewItem[];
  acceptedCount: number;
  returned: { figureId: number; townName: string }[];
  missingTowns: string[];
};

function saltRate(figure: SeasonFigure) {
  return seasonTotals(amountsOf(figure)).saltLbPerLaneMile;
}

function seasonPoint(figure: SeasonFigure): SeasonPoint {
  return {
    seasonStartYear: figure.seasonStartYear,
    tonsPerLaneMile: seasonTotals(amountsOf(figure)).saltTonsPerLaneMile,
  };
}

/** A figure with all that speaks for and against it, also what only the coordinator can see: the other towns. */
function reviewed(
  figure: SeasonFigure,
  earlier: readonly SeasonFigure[],
  around: Surroundings,
  rates: readonly number[],
) {
  const view = figureView(figure, earlier, around);
  const findings = heaviestFirst([...view.findings, ...outlierFindings(saltRate(figure), rates)]);
  return { ...view, findings };
}

/** What has been sent in for one season. @throws 404 when the season is not opened */
export async function getReviewQueue(_actor: NetworkActor, seasonStartYear: number): Promise<ReviewQueue> {
  const [season, figures, towns] = await Promise.all([
    Season.findByPk(seasonStartYear),
    SeasonFigure.findAll({ where: { seasonStartYear } }),
    Town.findAll({ attributes: ["id", "name"], order: [["name", "ASC"]] }),
  ]);
  if (!season) throw notFound("season");
  const sent = figures.filter((figure) => figure.state === "sent");
  const sentTownIds = sent.map((figure) => figure.townId);
  const [earlier, surroundings] = await Promise.all([
    earlierFigures(sentTownIds, seasonStartYear),
    readSurroundings(sentTownIds, seasonStartYear),
  ]);
  const nameOf = new Map(towns.map(({ id, name }) => [id, name]));
  const rates = figures.filter(({ state }) => state === "sent" || state === "accepted").map(saltRate);
  const items = sent.map((figure) => {
    const own = earlier.filter((other) => other.townId === figure.townId);
    const around = surroundings.get(figure.townId) ?? { basis: null, awssiByYear: new Map<number, number>() };
    const view = reviewed(figure, own, around, rates);
    const townName = nameOf.get(figure.townId) ?? "";
    return { item: { figure: view, townName, doubts: doubtOf(view.findings) }, seasons: [...own, figure] };
  });
  const doubtful = items
    .filter(({ item }) => item.doubts > 0)
    .sort((a, b) => b.item.doubts - a.item.doubts || a.item.townName.localeCompare(b.item.townName));
  const reported = new Set(figures.filter((figure) => figure.state !== "draft").map((figure) => figure.townId));
  return {
    seasonStartYear,
    figuresDueOn: season.figuresDueOn,
    doubtful: doubtful.map(({ item }) => item),
    firstSeasons: (doubtful[0]?.seasons ?? []).map(seasonPoint),
    clean: items
      .map(({ item }) => item)
      .filter((item) => item.doubts === 0)
      .sort((a, b) => a.townName.localeCompare(b.townName)),
    acceptedCount: figures.filter((figure) => figure.state === "accepted").length,
    returned: figures
      .filter((figure) => figure.state === "returned")
      .map((figure) => ({ figureId: figure.id, townName: nameOf.get(figure.townId) ?? "" })),
    missingTowns: towns.filter((town) => !reported.has(town.id)).map((town) => town.name),
  };
}

export type FigureReview = {
  figure: FigureView;
  townName: string;
  /** Oldest first. */
  earlier: FigureView[];
  basis: SeasonBasis;
  fleet: FleetCoverage;
  history: FigureHistory;
};

/** One sent figure beside the town's earlier seasons. Drafts are the town's own: 404, as for one that is not there. */
export async function getFigureReview(_actor: NetworkActor, figureId: number): Promise<FigureReview> {
  const figure = await SeasonFigure.findByPk(figureId, { include: [figureTown] });
  if (!figure || figure.state === "draft") throw notFound("sent season");
  const { townId, seasonStartYear } = figure;
  const [earlier, surroundings, basis, fleet, history, season] = await Promise.all([
    earlierFigures([townId], seasonStartYear),
    readSurroundings([townId], seasonStartYear),
    readSeasonBasis(townId, seasonStartYear),
    fleetCoverage(townId, seasonStartYear),
    figureHistory(figureId),
    SeasonFigure.findAll({ where: { seasonStartYear, state: ["sent", "accepted"] } }),
  ]);
  const around = surroundings.get(townId) ?? { basis: null, awssiByYear: new Map<number, number>() };
  const before = (year: number) => earlier.filter((other) => other.seasonStartYear < year);
  return {
    figure: reviewed(figure, earlier, around, season.map(saltRate)),
    townName: figure.town?.name ?? "",
    earlier: earlier.map((other) => figureView(other, before(other.seasonStartYear), { ...around, basis: null })),
    basis,
    fleet,
    history,
  };
}
