import { mean } from "#app/domain/stats/mean.ts";
import { type IndicatorKey, indicatorKeys } from "./indicators.ts";

/** One town's figures for a season. null = not reported. */
export type TownInput = {
  townId: number;
  /** The same for towns whose figures come from one body: they count once. */
  contributorId: number;
  district: string;
  laneMiles: number | null;
  values: Record<IndicatorKey, number | null>;
};

export type Contributor = {
  contributorId: number;
  townIds: number[];
  /** null when its towns lie in different districts. */
  district: string | null;
  /** The sum over its towns; null when one is not known. */
  laneMiles: number | null;
  values: Record<IndicatorKey, number | null>;
};

function mergedValue(towns: readonly TownInput[], indicator: IndicatorKey): number | null {
  const known = towns.flatMap(({ laneMiles, values }) => {
    const value = values[indicator];
    return value === null ? [] : [{ laneMiles, value }];
  });
  if (known.length === 0) return null;
  const weights = known.map(({ laneMiles }) => laneMiles ?? 0);
  const weightSum = weights.reduce((sum, weight) => sum + weight, 0);
  // Without everyone's lane miles there is no fair weight, so each town counts the same.
  if (known.some(({ laneMiles }) => laneMiles === null) || weightSum === 0)
    return mean(known.map(({ value }) => value));
  return known.reduce((sum, { value }, place) => sum + value * (weights[place] ?? 0), 0) / weightSum;
}

function contributorOf(contributorId: number, towns: readonly TownInput[]): Contributor {
  const districts = new Set(towns.map(({ district }) => district));
  const laneMiles = towns.map((town) => town.laneMiles);
  return {
    contributorId,
    townIds: towns.map(({ townId }) => townId),
    district: districts.size === 1 ? (towns[0]?.district ?? null) : null,
    laneMiles: laneMiles.includes(null) ? null : laneMiles.reduce<number>((sum, miles) => sum + (miles ?? 0), 0),
    values: {
      "salt-per-event": mergedValue(towns, "salt-per-event"),
      "rate-at-working-setting": mergedValue(towns, "rate-at-working-setting"),
    } satisfies Record<(typeof indicatorKeys)[number], number | null>,
  };
}

/**
 * The contributors behind the towns: towns of one body are one, its figures the means weighted by lane miles.
 *
 * @param towns - in any order; lane miles ≥ 0
 * @returns ascending by contributor, whatever the order of the towns
 * @throws RangeError when a town comes twice or a figure is not finite
 * @example three towns that one county reports for // one contributor
 */
export function contributorsOf(towns: readonly TownInput[]): Contributor[] {
  const sorted = [...towns].sort((a, b) => a.contributorId - b.contributorId || a.townId - b.townId);
  const byContributor = new Map<number, TownInput[]>();
  const seen = new Set<number>();
  for (const town of sorted) {
    if (seen.has(town.townId)) throw new RangeError(`town ${town.townId} comes twice`);
    seen.add(town.townId);
    for (const value of Object.values(town.values)) {
      if (value !== null && !Number.isFinite(value))
        throw new RangeError(`a figure of town ${town.townId} is ${value}`);
    }
    byContributor.set(town.contributorId, [...(byContributor.get(town.contributorId) ?? []), town]);
  }
  return [...byContributor].map(([contributorId, members]) => contributorOf(contributorId, members));
}
