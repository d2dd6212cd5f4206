import { median } from "#app/domain/stats/median.ts";
import { microaggregate } from "./microaggregate.ts";
import type { DisclosurePolicy } from "./policy.ts";
import { laneMileBandWords, laneMileRanges, protectedNumber } from "./rounding.ts";

/** One contributor's figures before protection; lane miles and values null when not reported. */
export type RowRecord = { laneMiles: number | null; values: Record<string, number | null> };
export type ProtectedRow = { id: string; laneMileBand: string; values: Record<string, number | null> };
export type ProtectedRows =
  { state: "published"; rows: ProtectedRow[] } | { state: "withheld"; reason: "too-few" | "too-similar" };

type SizeClass = { from: number | null; to: number | null; records: RowRecord[] };

/** The lane mile bands, neighbours merged until each can hold l groups of k. */
function sizeClasses(records: readonly RowRecord[], policy: DisclosurePolicy): SizeClass[] {
  const needed = policy.rowFile.k * policy.rowFile.l;
  const classes: SizeClass[] = laneMileRanges(policy.laneMileBands).map(({ from, to }) => ({
    from,
    to,
    records: records.filter(
      ({ laneMiles }) => laneMiles !== null && laneMiles >= (from ?? 0) && laneMiles < (to ?? Number.POSITIVE_INFINITY),
    ),
  }));
  for (;;) {
    const small = classes.findIndex((one) => one.records.length < needed);
    if (small === -1 || classes.length === 1) return classes;
    const [before, after] = [classes[small - 1], classes[small + 1]];
    // With the smaller neighbour, so that the bands stay as even as they can.
    const withBefore = before && (!after || before.records.length <= after.records.length);
    const start = withBefore ? small - 1 : small;
    const [low, high] = [classes[start], classes[start + 1]];
    if (!low || !high) return classes;
    classes.splice(start, 2, { from: low.from, to: high.to, records: [...low.records, ...high.records] });
  }
}

/** Which figures a record lacks is a mark in itself: a pattern that fewer than k share goes. */
function withoutRarePatterns(records: readonly RowRecord[], keys: readonly string[], k: number): RowRecord[] {
  const patternOf = ({ values }: RowRecord) => keys.map((key) => (values[key] ?? null) !== null).join();
  const counts = new Map<string, number>();
  for (const record of records) counts.set(patternOf(record), (counts.get(patternOf(record)) ?? 0) + 1);
  return records.filter((record) => (counts.get(patternOf(record)) ?? 0) >= k);
}

/** One figure's column of a class after protection, or null when it would tell too much. */
function protectedColumn(
  records: readonly RowRecord[],
  key: string,
  policy: DisclosurePolicy,
): (number | null)[] | null {
  const { k, l, spreadShare } = policy.rowFile;
  const known = records.map(({ values }) => values[key] ?? null);
  const reported = known.filter((value) => value !== null);
  if (reported.length === 0) return known;
  if (reported.length < k) return null;
  const rounded = microaggregate(reported, k).map((value) =>
    protectedNumber(value, policy.roundingBaseLb, policy.significantDigits),
  );
  const spread = Math.max(...rounded) - Math.min(...rounded);
  if (new Set(rounded).size < l || spread < spreadShare * median(rounded)) return null;
  let next = 0;
  return known.map((value) => (value === null ? null : (rounded[next++] ?? null)));
}

function protectedClass(one: SizeClass, keys: readonly string[], policy: DisclosurePolicy): Omit<ProtectedRow, "id">[] {
  const records = withoutRarePatterns(one.records, keys, policy.rowFile.k);
  if (records.length < policy.rowFile.k) return [];
  const columns = keys.map((key) => protectedColumn(records, key, policy));
  if (columns.includes(null)) return [];
  const band = laneMileBandWords(one);
  return records.map((_, row) => ({
    laneMileBand: band,
    values: Object.fromEntries(keys.map((key, column) => [key, columns[column]?.[row] ?? null])),
  }));
}

function shuffled<Item>(items: readonly Item[], random: () => number): Item[] {
  const result: Item[] = [];
  const left = [...items];
  while (left.length > 0) result.push(...left.splice(Math.floor(random() * left.length), 1));
  return result;
}

function freshId(random: () => number, used: ReadonlySet<string>) {
  for (let attempt = 0; attempt < 1000; attempt++) {
    const id = `r-${Array.from({ length: 8 }, () => Math.floor(random() * 16).toString(16)).join("")}`;
    if (!used.has(id)) return id;
  }
  throw new RangeError("random gives the same numbers again and again; no fresh ids can be drawn");
}

/**
 * One row a contributor, so far protected that none can be told apart, or word that no rows may be given out.
 *
 * The lane mile band is all that could point to a town: each band holds at least k rows, and bands too small for l
 * groups of k are merged with a neighbour. Within a band each figure is replaced by the rounded mean of k or more. A
 * band in which a figure takes fewer than l values, or hardly spreads, is left out. Rows are shuffled and named anew
 * each time, from `random` alone.
 *
 * @param records - one a contributor, holdings merged, values in lb
 * @param random - 0 ≤ number < 1, the only source of order and ids
 * @returns rows with values in the rounding base, or a reason: "too-few" (network too small), "too-similar" (no band
 *   passes)
 * @throws RangeError when a value is not finite or `random` repeats itself
 *
 * Source: L. Sweeney, k-anonymity (2002); A. Machanavajjhala and others, l-diversity (2007); limits are our own.
 * @example protectedRows([], defaultPolicy, Math.random) // { state: "withheld", reason: "too-few" }
 */
export function protectedRows(
  records: readonly RowRecord[],
  policy: DisclosurePolicy,
  random: () => number,
): ProtectedRows {
  const keys = [...new Set(records.flatMap(({ values }) => Object.keys(values)))].sort();
  const sized = records.filter(
    ({ laneMiles, values }) => laneMiles !== null && keys.some((key) => (values[key] ?? null) !== null),
  );
  if (sized.length < policy.rowFile.networkMin) return { state: "withheld", reason: "too-few" };
  const rows = sizeClasses(sized, policy).flatMap((one) => protectedClass(one, keys, policy));
  if (rows.length === 0) return { state: "withheld", reason: "too-similar" };
  const used = new Set<string>();
  return {
    state: "published",
    rows: shuffled(rows, random).map((row) => {
      const id = freshId(random, used);
      used.add(id);
      return { id, ...row };
    }),
  };
}
