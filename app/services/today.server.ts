import type { AnalystActor, NetworkActor, TownActor } from "#app/context.ts";
import { dueState } from "#app/domain/calibration/due.ts";
import { now } from "#app/lib/clock.server.ts";
import { hasAcceptedTerms } from "./dataset.server.ts";
import { type EditionSummary, listEditions } from "./editions.server.ts";
import { listFleet } from "./fleet.server.ts";
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

export type TownToday = {
  today: string;
  season: { seasonStartYear: number; figuresDueOn: string; figure: FigureView | null } | null;
  readyCount: number;
  fleet: FleetLine[];
  edition: EditionSummary | null;
};

/** What waits for a town: its season, its trucks, the newest edition. */
export async function getTownToday(actor: TownActor): Promise<TownToday> {
  const today = now().toISOString().slice(0, 10);
  const [startYear, trucks, editions] = await Promise.all([workingSeason(), listFleet(actor), listEditions()]);
  const season = startYear === null ? null : await getSeason(actor, startYear);
  const fleet = trucks
    .filter((truck) => truck.isInService && truck.spreaderKind !== "liquid-tanks")
    .map((truck): FleetLine => {
      const salt = truck.calibrations.find(
        ({ materialKind, state }) => materialKind === "salt" && state === "approved",
      );
      const isWaiting = truck.calibrations.some(
        ({ materialKind, state }) => materialKind === "salt" && state === "ready",
      );
      return {
        truckId: truck.id,
        unitNumber: truck.unitNumber,
        workingSpeedMph: truck.workingSpeedMph,
        rateLbPerLaneMile: salt?.workingRateLbPerLaneMile ?? null,
        place: salt?.workingPlace ?? null,
        testedOn: salt?.testedOn ?? null,
        isDue: !isWaiting && dueState(salt?.testedOn ?? null, today) !== "in-date",
        isWaiting,
      };
    });
  const ready = trucks.flatMap((truck) => truck.calibrations).filter(({ state }) => state === "ready");
  return {
    today,
    season: season && {
      seasonStartYear: season.seasonStartYear,
      figuresDueOn: season.figuresDueOn,
      figure: season.figure,
    },
    readyCount: ready.length,
    fleet,
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

export type AnalystToday = { edition: EditionSummary | null; hasTerms: boolean; tokenCount: number };

/** What waits for an analyst: the newest edition, the terms, the tokens. */
export async function getAnalystToday(actor: AnalystActor): Promise<AnalystToday> {
  const [editions, hasTerms, tokens] = await Promise.all([listEditions(), hasAcceptedTerms(actor), listTokens(actor)]);
  return { edition: editions[0] ?? null, hasTerms, tokenCount: tokens.length };
}
