import { lbPerShortTon } from "../units.ts";
import type { MaterialKind } from "#app/domain/calibration/band.ts";
import type { StockBalance } from "./stock-balance.ts";
import { eventCountOf, type StormLine } from "./storm.ts";

/** One material of a town in one season: what the piles and the log say, and what a ton of it cost. */
export type MaterialUse = {
  name: string;
  kind: MaterialKind;
  /** 0 to 1 by weight. */
  saltShare: number;
  balance: StockBalance;
  /** By the storm log over the whole season, US gallons. Liquids only. */
  loggedGal: number;
  /** By the storm log over the whole season, lb. */
  loggedAllLb: number;
  /** Paid for priced deliveries of the season; null when none carries a price. */
  paidCentsPerTon: number | null;
  /** The season's price as the director wrote it down; null when not written. */
  listedCentsPerTon: number | null;
};

export type LogStorm = Pick<StormLine, "startedAt" | "endedAt" | "laneMilesTreated">;

/** A season's figures as storms and stock have them. null = they do not say. */
export type SeasonDraft = {
  laneMiles: number | null;
  eventCount: number;
  saltLb: number;
  mixLb: number;
  mixSaltShare: number | null;
  sandLb: number;
  brineGal: number | null;
  materialCostCents: number | null;
  laneMilesTreated: number | null;
  stockUsedLb: number | null;
  stockLoggedLb: number | null;
  /** Materials of which the piles say what was used; of the others the log does. */
  fromPiles: string[];
  /** Materials that were used and have no price, which leaves the cost unknown. */
  withoutPrice: string[];
};

/** What was used of a material: by its piles where both ends are measured and make sense, otherwise by the log. */
function usedLb({ balance, loggedAllLb }: MaterialUse) {
  return balance.usedLb !== null && balance.usedLb >= 0 ? balance.usedLb : loggedAllLb;
}

function costCents(material: MaterialUse): number | null {
  const centsPerTon = material.paidCentsPerTon ?? material.listedCentsPerTon;
  const used = usedLb(material);
  if (used === 0) return 0;
  return centsPerTon === null ? null : (used / lbPerShortTon) * centsPerTon;
}

/**
 * The season's figures out of storms, stock, roads and prices: a draft that the director compares with what was typed.
 *
 * Weights come from the piles where opening and closing are measured, otherwise from the storm log. Brine comes from the
 * log and costs nothing of its own: the salt in it left the salt pile.
 *
 * @param laneMiles - of the town's roads in that season; null = not written down
 * @param storms - every line of the log; may be empty
 * @param materials - every material of the town
 * @returns amounts in storage units, unrounded but for cents
 */
export function seasonFromLog(
  laneMiles: number | null,
  storms: readonly LogStorm[],
  materials: readonly MaterialUse[],
): SeasonDraft {
  const ofKind = (kind: MaterialKind) => materials.filter((material) => material.kind === kind);
  const total = (kind: MaterialKind) => ofKind(kind).reduce((sum, material) => sum + usedLb(material), 0);
  const mixLb = total("mix");
  const mixSaltLb = ofKind("mix").reduce((sum, mix) => sum + usedLb(mix) * mix.saltShare, 0);
  const solids = materials.filter(({ kind }) => kind !== "brine");
  const costs = solids.map(costCents);
  const treated = storms.map((storm) => storm.laneMilesTreated).filter((miles) => miles !== null);
  const measured = solids.filter(({ balance }) => balance.usedLb !== null && balance.usedLb >= 0);
  const brine = ofKind("brine");
  return {
    laneMiles,
    eventCount: eventCountOf(storms),
    saltLb: total("salt"),
    mixLb,
    mixSaltShare: mixLb === 0 ? null : mixSaltLb / mixLb,
    sandLb: total("sand"),
    brineGal: brine.length === 0 ? null : brine.reduce((sum, { loggedGal }) => sum + loggedGal, 0),
    materialCostCents: costs.some((cost) => cost === null)
      ? null
      : Math.round(costs.reduce<number>((sum, cost) => sum + (cost ?? 0), 0)),
    laneMilesTreated: treated.length === 0 ? null : treated.reduce((sum, miles) => sum + miles, 0),
    stockUsedLb: measured.length === 0 ? null : measured.reduce((sum, { balance }) => sum + (balance.usedLb ?? 0), 0),
    stockLoggedLb:
      measured.length === 0 || measured.some(({ balance }) => balance.loggedLb === null)
        ? null
        : measured.reduce((sum, { balance }) => sum + (balance.loggedLb ?? 0), 0),
    fromPiles: measured.map(({ name }) => name),
    withoutPrice: solids.filter((material) => costCents(material) === null).map(({ name }) => name),
  };
}
