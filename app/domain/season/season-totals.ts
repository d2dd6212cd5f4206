import { lbToShortTons } from "#app/domain/units.ts";

/** What a town sends in for one season. null = not reported, or not used. */
export type SeasonAmounts = {
  laneMiles: number;
  eventCount: number;
  saltLb: number;
  mixLb: number;
  /** 0 to 1 by weight; null when no mix was used. */
  mixSaltShare: number | null;
  sandLb: number;
  brineGal: number | null;
  materialCostCents: number | null;
};

export type SeasonTotals = {
  totalSaltLb: number;
  saltLbPerLaneMile: number;
  saltTonsPerLaneMile: number;
  saltLbPerLaneMileEvent: number | null;
  abrasivesTonsPerLaneMile: number;
  chlorideLbPerLaneMile: number;
  materialCostCentsPerLaneMile: number | null;
};

/**
 * Chloride in sodium chloride, by weight. Source: molar masses Na 22.990 and Cl 35.453 g/mol (IUPAC):
 * 35.453 / 58.443 = 0.6066. Road salt is taken as pure and dry, so the figure is a high estimate.
 */
export const chlorideShareOfSalt = 0.6066;

/** Under three events one event's luck decides the quotient, so none is given. */
export const fewestEvents = 3;

/**
 * The season's figures brought to a lane mile, unrounded.
 *
 * Salt counts dry salt and the salt inside the mix; salt dissolved in brine is not counted, as the brine's strength is
 * not reported.
 *
 * @param amounts - lane miles > 0; weights in lb, brine in US gallons, cost in cents, all ≥ 0
 * @returns salt in lb, salt per lane mile in lb and short tons, salt per lane mile and event in lb (null under three
 *   events), sand and the mix's sand in short tons per lane mile, chloride in lb per lane mile, cost in cents per lane
 *   mile (null when not reported)
 * @throws RangeError when lane miles are not above 0, or mix was used and its salt share is not known
 * @example seasonTotals({ laneMiles: 100, eventCount: 20, saltLb: 600_000, mixLb: 0, mixSaltShare: null, sandLb: 0,
 *   brineGal: null, materialCostCents: null }).saltLbPerLaneMileEvent // 300
 */
export function seasonTotals(amounts: SeasonAmounts): SeasonTotals {
  const { laneMiles, eventCount, saltLb, mixLb, mixSaltShare, sandLb, materialCostCents } = amounts;
  if (!(laneMiles > 0)) throw new RangeError(`lane miles must be above 0, not ${laneMiles}`);
  if (mixLb > 0 && mixSaltShare === null) throw new RangeError("mix was used, so its salt share must be known");
  const mixSaltLb = mixLb * (mixSaltShare ?? 0);
  const totalSaltLb = saltLb + mixSaltLb;
  const saltLbPerLaneMile = totalSaltLb / laneMiles;
  return {
    totalSaltLb,
    saltLbPerLaneMile,
    saltTonsPerLaneMile: lbToShortTons(saltLbPerLaneMile),
    saltLbPerLaneMileEvent: eventCount < fewestEvents ? null : saltLbPerLaneMile / eventCount,
    abrasivesTonsPerLaneMile: lbToShortTons(sandLb + mixLb - mixSaltLb) / laneMiles,
    chlorideLbPerLaneMile: saltLbPerLaneMile * chlorideShareOfSalt,
    materialCostCentsPerLaneMile: materialCostCents === null ? null : materialCostCents / laneMiles,
  };
}
