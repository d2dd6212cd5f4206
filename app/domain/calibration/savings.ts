import { lbPerShortTon } from "#app/domain/units.ts";

/** What a change of the gate saves; figures below 0 say that it lays more. */
export type Savings = {
  savedLbPerLaneMile: number;
  /** Of the rate before. */
  savedPercent: number;
  /** Null without a price. */
  savedCentsPerLaneMile: number | null;
  /** Null without the town's lane miles and events; the money in it is null without a price. */
  season: { savedTons: number; savedCents: number | null } | null;
};

function refuseBelowZero(value: number | null, name: string) {
  if (value !== null && !(value >= 0 && Number.isFinite(value))) {
    throw new RangeError(`${name} must be 0 or more, not ${value}`);
  }
}

/**
 * Material and money saved by a new gate opening, on one lane mile treated once and over a season.
 *
 * The season's figure assumes that every lane mile is treated once in each event by trucks with this change.
 *
 * @param beforeLbPerLaneMile - > 0
 * @param afterLbPerLaneMile - ≥ 0
 * @param laneMiles - of the roads in question, or null when not known
 * @param eventCount - events in a season, or null when not known
 * @param priceCentsPerTon - cents for a short ton, or null when not known
 * @returns lb, percent, short tons and cents, all unrounded
 * @throws RangeError when a figure is out of range
 * @example beforeAfter({ beforeLbPerLaneMile: 400, afterLbPerLaneMile: 300, laneMiles: 80, eventCount: 25,
 *   priceCentsPerTon: 7000 }).season // { savedTons: 100, savedCents: 700000 }
 */
export function beforeAfter({
  beforeLbPerLaneMile,
  afterLbPerLaneMile,
  laneMiles,
  eventCount,
  priceCentsPerTon,
}: {
  beforeLbPerLaneMile: number;
  afterLbPerLaneMile: number;
  laneMiles: number | null;
  eventCount: number | null;
  priceCentsPerTon: number | null;
}): Savings {
  if (!(beforeLbPerLaneMile > 0)) throw new RangeError(`the rate before must be above 0, not ${beforeLbPerLaneMile}`);
  refuseBelowZero(beforeLbPerLaneMile, "the rate before");
  refuseBelowZero(afterLbPerLaneMile, "the rate after");
  refuseBelowZero(laneMiles, "lane miles");
  refuseBelowZero(eventCount, "events");
  refuseBelowZero(priceCentsPerTon, "the price");
  const savedLbPerLaneMile = beforeLbPerLaneMile - afterLbPerLaneMile;
  const centsFor = (savedLb: number) =>
    priceCentsPerTon === null ? null : (savedLb * priceCentsPerTon) / lbPerShortTon;
  const savedLb = laneMiles === null || eventCount === null ? null : savedLbPerLaneMile * laneMiles * eventCount;
  return {
    savedLbPerLaneMile,
    savedPercent: (100 * savedLbPerLaneMile) / beforeLbPerLaneMile,
    savedCentsPerLaneMile: centsFor(savedLbPerLaneMile),
    season: savedLb === null ? null : { savedTons: savedLb / lbPerShortTon, savedCents: centsFor(savedLb) },
  };
}
