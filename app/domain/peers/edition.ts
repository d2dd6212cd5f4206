import { type Candidate, publishableGroups } from "#app/domain/disclosure/groups.ts";
import type { DisclosurePolicy } from "#app/domain/disclosure/policy.ts";
import { roundTo } from "#app/domain/disclosure/rounding.ts";
import { type ProtectedRows, protectedRows } from "#app/domain/disclosure/row-file.ts";
import { midRankAmong } from "#app/domain/stats/percentile-rank.ts";
import { indicatorAxis } from "./axis.ts";
import {
  type DownloadCell,
  type MemberCell,
  type WallCell,
  type WithheldReason,
  downloadCell,
  groupReason,
  memberCell,
  wallCell,
} from "./cell.ts";
import { type Contributor, type TownInput, contributorsOf } from "./contributors.ts";
import { type IndicatorKey, indicatorKeys, indicators } from "./indicators.ts";
import { type PeerGroup, groupKeysOf, peerGroups } from "./peer-groups.ts";

export type { TownInput } from "./contributors.ts";

/** Changes whenever the same figures could come out differently. */
export const engineVersion = "1.1.0";

/**
 * A group of an edition and who is behind it: for the server only. `figures`, one a contributor in the same order, let
 * a later edition notice a corrected figure, which could be worked out just as a newcomer's could; without them every
 * figure is taken as unchanged.
 */
export type RegisteredGroup = {
  indicator: IndicatorKey;
  groupKey: string;
  contributorIds: number[];
  figures?: number[];
};

export type EditionCell = { indicator: IndicatorKey; groupKey: string; groupLabel: string } & (
  | { audience: "member"; cell: MemberCell }
  | { audience: "wall"; cell: WallCell }
  | { audience: "download"; cell: DownloadCell }
);

export type EditionMember = RegisteredGroup & { figures: number[]; isPublished: boolean };

/** A town's exact own figure and its place of 100 in each published group it is in: for that town only. */
export type EditionPlace = {
  townId: number;
  indicator: IndicatorKey;
  ownValue: number;
  places: Record<string, number>;
};

export type BuiltEdition = {
  seasonStartYear: number;
  townCount: number;
  cells: EditionCell[];
  members: EditionMember[];
  places: EditionPlace[];
  rows: ProtectedRows | { state: "withheld"; reason: "given-before" };
};

type Member = { contributorId: number; groupKeys: string[]; value: number };
type Group = PeerGroup & { members: Member[]; reason: WithheldReason | null };

/** A contributor with a figure; when the figure is corrected it is somebody else to whoever subtracts editions. */
function tokenOf(contributorId: number, figure: number | undefined) {
  return figure === undefined ? String(contributorId) : `${contributorId}=${figure}`;
}

function membersOf(contributors: readonly Contributor[], indicator: IndicatorKey): Member[] {
  return contributors.flatMap((contributor) => {
    const value = contributor.values[indicator];
    return value === null
      ? []
      : [{ contributorId: contributor.contributorId, groupKeys: groupKeysOf(contributor), value }];
  });
}

function groupsOf(
  members: readonly Member[],
  menu: readonly PeerGroup[],
  earlier: readonly RegisteredGroup[],
  policy: DisclosurePolicy,
): Group[] {
  const groups = menu.map((group) => {
    const inGroup = members.filter(({ groupKeys }) => groupKeys.includes(group.key));
    const values = inGroup.map(({ value }) => value);
    return { ...group, members: inGroup, reason: groupReason(values, policy) };
  });
  const token = ({ contributorId, value }: Member) => tokenOf(contributorId, value);
  const candidates: Candidate<string>[] = groups
    .filter(({ reason }) => reason === null)
    .map(({ key, partition, members: inGroup }) => ({ groupKey: key, partition, members: inGroup.map(token) }));
  const figureNow = new Map(members.map(({ contributorId, value }) => [contributorId, value]));
  const registered = earlier.map(({ contributorIds, figures }) =>
    contributorIds.map((id, place) => tokenOf(id, figures?.[place] ?? figureNow.get(id))),
  );
  const published = publishableGroups(candidates, registered, "all", policy.minimumDifference);
  return groups.map((group) => ({
    ...group,
    reason: group.reason ?? (published.has(group.key) ? null : "too-close"),
  }));
}

function publishedNumbers(cell: MemberCell): number[] {
  if (cell.state === "withheld") return [];
  const ranges = [cell.interval, cell.middleHalf, cell.tenths].flatMap((range) =>
    range ? [range.low, range.high] : [],
  );
  const borders = cell.bins.flatMap(({ from, to }) => [from, to].filter((border) => border !== null));
  return [cell.median, ...ranges, ...borders];
}

function cellsOf(indicator: IndicatorKey, groups: readonly Group[], policy: DisclosurePolicy): EditionCell[] {
  // A region that is withheld must not show in the scale either.
  const whole = groups.find(({ key, reason }) => key === "all" && reason === null);
  const region = whole?.members.map(({ value }) => value) ?? [];
  const band = indicators[indicator].band;
  const valuesOf = (group: Group) => group.members.map(({ value }) => value);
  const firstAxis = indicatorAxis(region, band, policy, []);
  const shown = groups.flatMap((group) =>
    publishedNumbers(memberCell(valuesOf(group), group.reason, firstAxis, policy)),
  );
  const axis = indicatorAxis(region, band, policy, shown);
  return groups.flatMap((group): EditionCell[] => {
    const named = { indicator, groupKey: group.key, groupLabel: group.label };
    const values = valuesOf(group);
    return [
      { ...named, audience: "member", cell: memberCell(values, group.reason, axis, policy) },
      { ...named, audience: "wall", cell: wallCell(values, group.reason, axis, policy) },
      { ...named, audience: "download", cell: downloadCell(values, group.reason, policy) },
    ];
  });
}

/** In steps, and never at the very ends: those would say that nobody lies beyond. */
function placeOf(rank: number, step: number) {
  return Math.min(100 - step, Math.max(step, roundTo(rank, step)));
}

function placesOf(
  towns: readonly TownInput[],
  indicator: IndicatorKey,
  groups: readonly Group[],
  policy: DisclosurePolicy,
): EditionPlace[] {
  const placing = groups
    .filter(({ reason, members }) => reason === null && members.length >= policy.quartilesFrom)
    .map(({ key, members }) => ({
      key,
      contributorIds: new Set(members.map(({ contributorId }) => contributorId)),
      rankOf: midRankAmong(members.map(({ value }) => value)),
    }));
  return towns.flatMap((town) => {
    const ownValue = town.values[indicator];
    if (ownValue === null) return [];
    const places = placing
      .filter(({ contributorIds }) => contributorIds.has(town.contributorId))
      .map(({ key, rankOf }) => [key, placeOf(rankOf(ownValue), policy.placeStep)] as const);
    return [{ townId: town.townId, indicator, ownValue, places: Object.fromEntries(places) }];
  });
}

/**
 * Everything an edition holds: what each audience may see of each group, who is behind it, each town's own place, and
 * the protected rows.
 *
 * The same figures give the same edition, in whatever order the towns come; only `rows` depend on `random`. Towns of
 * one contributor count once. The whole region comes first, then sizes, then districts: a group that conflicts with
 * one before it, or with a group of an earlier edition of the season, is withheld as "too-close". Rows are given out
 * once a season: each is a mean of a few figures, so two files would tell what one changed figure did to it.
 *
 * @param input - towns with values in the indicators' units; `registry` holds the groups that earlier editions of the
 *   same season published, of all indicators; `hasEarlierRows` says whether one of them gave out rows
 * @returns `cells` may leave the server; `members` never; of `places` a town sees its own
 * @throws RangeError when a town comes twice or a value is not finite
 *
 * Source: Handbook on Statistical Disclosure Control (ESSnet), chapters 3 to 5, with the limits of the policy.
 * @example buildEdition({ seasonStartYear: 2025, towns, registry: [], hasEarlierRows: false, policy, random }).cells
 */
export function buildEdition({
  seasonStartYear,
  towns,
  registry,
  hasEarlierRows,
  policy,
  random,
}: {
  seasonStartYear: number;
  towns: readonly TownInput[];
  registry: readonly RegisteredGroup[];
  hasEarlierRows: boolean;
  policy: DisclosurePolicy;
  random: () => number;
}): BuiltEdition {
  const contributors = contributorsOf(towns);
  const sortedTowns = [...towns].sort((a, b) => a.townId - b.townId);
  const menu = peerGroups(contributors);
  const built = indicatorKeys.map((indicator) => {
    const earlier = registry.filter((entry) => entry.indicator === indicator);
    const groups = groupsOf(membersOf(contributors, indicator), menu, earlier, policy);
    return { indicator, groups };
  });
  return {
    seasonStartYear,
    townCount: contributors.filter(({ values }) => Object.values(values).some((value) => value !== null)).length,
    cells: built.flatMap(({ indicator, groups }) => cellsOf(indicator, groups, policy)),
    members: built.flatMap(({ indicator, groups }) =>
      groups.map(({ key, members, reason }) => ({
        indicator,
        groupKey: key,
        contributorIds: members.map(({ contributorId }) => contributorId),
        figures: members.map(({ value }) => value),
        isPublished: reason === null,
      })),
    ),
    places: built.flatMap(({ indicator, groups }) => placesOf(sortedTowns, indicator, groups, policy)),
    rows: hasEarlierRows ? { state: "withheld", reason: "given-before" } : protectedRows(contributors, policy, random),
  };
}
