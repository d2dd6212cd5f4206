import type { AnalystActor, NetworkActor, TownActor } from "#app/context.ts";
import { type DatasetEdition, hasAcceptedTerms, listDatasetEditions } from "./dataset.server.ts";
import { type EditionSummary, listEditions } from "./editions.server.ts";
import { listFleet, todaysDate } from "./fleet/read.server.ts";
import { getReviewQueue } from "./review.server.ts";
import { type FigureView, getSeason, workingSeason } from "./season-figures.server.ts";
import { listTokens } from "./tokens.server.ts";

export type FleetLine = {
  truckId: number;
  unitNumber: string;
  workingSpeedMph: number;
  rateLbPerLaneMile: number | null;
  place: "under" | "in" | "over" | null;
  testedOn: string | null;
  isDue: boolean;
  /** Weighed again, and not yet approved. */
  isWaiting: boolean;
};

/** A truck and material to be weighed again, or for the first time. */
export type DueLine = { truckId: number; unitNumber: string; materialName: string; isOverdue: boolean };

export type TownToday = {
  today: string;
  season: { seasonStartYear: number; figuresDueOn: string; figure: FigureView | null } | null;
  readyCount: number;
  fleet: FleetLine[];
  due: DueLine[];
  edition: EditionSummary | null;
};

/** What waits for a town: its season, its trucks, the newest edition. */
export async function getTownToday(actor: TownActor): Promise<TownToday> {
  const today = todaysDate();
  const [startYear, trucks, editions] = await Promise.all([workingSeason(), listFleet(actor), listEditions()]);
  const season = startYear === null ? null : await getSeason(actor, startYear);
  const inService = trucks.filter((truck) => truck.isInService);
  const fleet = inService
    .filter((truck) => truck.spreaderKind !== "liquid-tanks")
    .map((truck): FleetLine => {
      const salt = truck.materials.find(({ materialKind }) => materialKind === "salt");
      const isWaiting = (salt?.ready.length ?? 0) > 0;
      return {
        truckId: truck.id,
        unitNumber: truck.unitNumber,
        workingSpeedMph: truck.workingSpeedMph,
        rateLbPerLaneMile: salt?.inForce?.working?.lbPerLaneMile ?? null,
        place: salt?.inForce?.working?.place ?? null,
        testedOn: salt?.inForce?.testedOn ?? null,
        isDue: !isWaiting && salt !== undefined && salt.due.state !== "in-date",
        isWaiting,
      };
    });
  // What was weighed already waits for the director, not for the yard.
  const due = inService.flatMap((truck) =>
    truck.materials
      .filter((line) => line.due.state !== "in-date" && line.ready.length === 0)
      .map((line) => ({
        truckId: truck.id,
        unitNumber: truck.unitNumber,
        materialName: line.materialName,
        isOverdue: line.due.state === "overdue",
      })),
  );
  return {
    today,
    season: season && {
      seasonStartYear: season.seasonStartYear,
      figuresDueOn: season.figuresDueOn,
      figure: season.figure,
    },
    readyCount: trucks.flatMap(({ materials }) => materials.flatMap((line) => line.ready)).length,
    fleet,
    due,
    edition: editions[0] ?? null,
  };
}

export type NetworkToday = {
  season: {
    seasonStartYear: number;
    doubtful: number;
    clean: number;
    accepted: number;
    missing: number;
    returned: number;
  } | null;
  edition: EditionSummary | null;
};

/** What waits for the coordinator: figures to review, an edition to publish. */
export async function getNetworkToday(actor: NetworkActor): Promise<NetworkToday> {
  const [startYear, editions] = await Promise.all([workingSeason(), listEditions()]);
  const queue = startYear === null ? null : await getReviewQueue(actor, startYear);
  return {
    season: queue && {
      seasonStartYear: queue.seasonStartYear,
      doubtful: queue.doubtful.length,
      clean: queue.clean.length,
      accepted: queue.acceptedCount,
      missing: queue.missingTowns.length,
      returned: queue.returned.length,
    },
    edition: editions[0] ?? null,
  };
}

export type AnalystToday = { edition: DatasetEdition | null; hasTerms: boolean; tokenCount: number };

/** What waits for an analyst: the newest edition, the terms, the tokens. */
export async function getAnalystToday(actor: AnalystActor): Promise<AnalystToday> {
  const [editions, hasTerms, tokens] = await Promise.all([
    listDatasetEditions(),
    hasAcceptedTerms(actor),
    listTokens(actor),
  ]);
  return { edition: editions[0] ?? null, hasTerms, tokenCount: tokens.length };
}
