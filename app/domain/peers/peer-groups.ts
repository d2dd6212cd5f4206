import { defaultPolicy } from "#app/domain/disclosure/policy.ts";
import { laneMileBandWords, laneMileRanges } from "#app/domain/disclosure/rounding.ts";

export type PeerGroup = { key: string; label: string; partition: "all" | "size" | "district" };

/** What puts a contributor into its groups; null where it is not known. */
export type Placed = { laneMiles: number | null; district: string | null };

const wholeRegion: PeerGroup = { key: "all", label: "The whole region", partition: "all" };

type Range = { from: number | null; to: number | null };

function sizeGroup(range: Range): PeerGroup {
  const { from, to } = range;
  const end = to === null ? "up" : String(to - 1);
  const key = from === null ? `size-under-${to ?? "any"}` : `size-${from}-${end}`;
  const words = laneMileBandWords(range);
  const label =
    from === null
      ? `Under ${to ?? "any"} lane miles`
      : to === null
        ? `${from} lane miles and more`
        : `${words} lane miles`;
  return { key, label, partition: "size" };
}

/** A district's part of a group key: lower-case letters and digits with single dashes between. */
function slugOf(district: string) {
  return district
    .normalize("NFKD")
    .toLowerCase()
    .replace(/[^a-z0-9]+/g, "-")
    .replace(/^-|-$/g, "");
}

function rangeOf(laneMiles: number) {
  return laneMileRanges(defaultPolicy.laneMileBands).find(({ to }) => laneMiles < (to ?? Number.POSITIVE_INFINITY));
}

/**
 * The keys of the groups a contributor is in: the whole region, its size, its district.
 *
 * @param contributor - lane miles ≥ 0 or null
 * @returns one to three keys, the whole region first
 * @example groupKeysOf({ laneMiles: 118, district: "Upper Fold" }) // ["all", "size-50-149", "district-upper-fold"]
 */
export function groupKeysOf({ laneMiles, district }: Placed): string[] {
  const keys = [wholeRegion.key];
  const range = laneMiles === null ? undefined : rangeOf(laneMiles);
  if (range) keys.push(sizeGroup(range).key);
  if (district !== null && slugOf(district) !== "") keys.push(`district-${slugOf(district)}`);
  return keys;
}

/**
 * The fixed menu of groups: the whole region, the four sizes, then the districts by name.
 *
 * A fixed menu instead of filters: every group that can be asked for is known and compared with the others before
 * anything is published.
 *
 * @param contributors - in any order
 * @returns the whole region and all sizes always, a district when a contributor lies in it
 * @example peerGroups([])[0] // { key: "all", label: "The whole region", partition: "all" }
 */
export function peerGroups(contributors: readonly Placed[]): PeerGroup[] {
  const names = [...new Set(contributors.flatMap(({ district }) => district ?? []))].sort((a, b) => (a < b ? -1 : 1));
  const districts = new Map<string, PeerGroup>();
  for (const name of names) {
    const key = `district-${slugOf(name)}`;
    if (slugOf(name) !== "" && !districts.has(key)) districts.set(key, { key, label: name, partition: "district" });
  }
  return [wholeRegion, ...laneMileRanges(defaultPolicy.laneMileBands).map(sizeGroup), ...districts.values()];
}
