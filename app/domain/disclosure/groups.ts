/**
 * How many members each of two groups has that the other has not.
 *
 * @param first - members, each once
 * @param second - members, each once
 * @example differenceSizes([1, 2, 3], [2, 3, 4, 5]) // { onlyInFirst: 1, onlyInSecond: 2 }
 */
export function differenceSizes<Id extends number | string>(
  first: readonly Id[],
  second: readonly Id[],
): { onlyInFirst: number; onlyInSecond: number } {
  const [inFirst, inSecond] = [new Set(first), new Set(second)];
  return {
    onlyInFirst: first.filter((id) => !inSecond.has(id)).length,
    onlyInSecond: second.filter((id) => !inFirst.has(id)).length,
  };
}

/**
 * Whether publishing the candidate beside what is published would let a reader subtract one group from another and be
 * left with a few towns.
 *
 * @param published - groups already published of the same indicator and season
 * @param candidate - the group in question
 * @param minimumDifference - on each side groups may differ by nobody, or by so many
 * @example conflictsWith([[1, 2, 3, 4, 5, 6, 7]], [1, 2, 3, 4, 5, 6], 5) // true: they differ by town 7 alone
 *
 * Source: Handbook on Statistical Disclosure Control (ESSnet), on differencing between overlapping tables.
 */
export function conflictsWith<Id extends number | string>(
  published: readonly (readonly Id[])[],
  candidate: readonly Id[],
  minimumDifference: number,
): boolean {
  return published.some((group) => {
    const { onlyInFirst, onlyInSecond } = differenceSizes(group, candidate);
    return [onlyInFirst, onlyInSecond].some((size) => size > 0 && size < minimumDifference);
  });
}

export type Candidate<Id> = { groupKey: string; partition: string; members: readonly Id[] };

function remainderOf<Id>(whole: readonly Id[], parts: readonly Candidate<Id>[]) {
  const covered = new Set(parts.flatMap(({ members }) => members));
  return whole.filter((id) => !covered.has(id));
}

/**
 * The candidates that may be published together, and beside what is published already.
 *
 * They are taken in their order, one that conflicts with an earlier one is left out. Then each partition is looked at
 * as a whole: all towns without its published groups are a group too, which anyone can work out, and must pass the
 * same test. If it does not, the partition's smallest group is left out, and so on.
 *
 * @param candidates - in order of precedence; those of one partition do not overlap and follow each other
 * @param earlier - groups published before, of the same indicator and season
 * @param wholeKey - the candidate that holds all the others; while it is not published, no remainder can be worked out
 * @param minimumDifference - on each side groups may differ by nobody, or by so many
 * @returns keys of the groups to publish
 * @example a district of all towns but three // left out: the three would be exposed
 */
export function publishableGroups<Id extends number | string>(
  candidates: readonly Candidate<Id>[],
  earlier: readonly (readonly Id[])[],
  wholeKey: string,
  minimumDifference: number,
): Set<string> {
  const taken: (readonly Id[])[] = [...earlier];
  const keys = new Set<string>();
  for (const partition of new Set(candidates.map((one) => one.partition))) {
    let parts: Candidate<Id>[] = [];
    for (const one of candidates.filter((candidate) => candidate.partition === partition)) {
      const beside = [...taken, ...parts.map(({ members }) => members)];
      if (!conflictsWith(beside, one.members, minimumDifference)) parts.push(one);
    }
    const whole = keys.has(wholeKey) ? (candidates.find(({ groupKey }) => groupKey === wholeKey)?.members ?? []) : [];
    let remainder = remainderOf(whole, parts);
    while (parts.length > 0 && remainder.length > 0 && isExposed(remainder, taken, minimumDifference)) {
      const smallest = parts.reduce((least, one) => (one.members.length <= least.members.length ? one : least));
      parts = parts.filter((one) => one !== smallest);
      remainder = remainderOf(whole, parts);
    }
    for (const { groupKey, members } of parts) {
      keys.add(groupKey);
      taken.push(members);
    }
    if (parts.length > 0 && remainder.length > 0) taken.push(remainder);
  }
  return keys;
}

function isExposed<Id extends number | string>(
  remainder: readonly Id[],
  taken: readonly (readonly Id[])[],
  minimumDifference: number,
) {
  return remainder.length < minimumDifference || conflictsWith(taken, remainder, minimumDifference);
}
