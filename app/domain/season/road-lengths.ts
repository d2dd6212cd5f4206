export type RoadClassLength = { name: string; seasonStartYear: number; laneMiles: number };

/**
 * Lane miles of each class of road in a season: the length given for that season or the last one before it.
 *
 * @param lengths - any order; seasonStartYear is the first season the length holds for
 * @returns by name; classes whose first length holds for a later season only are left out, as are those ended with 0
 * @example roadsIn([{ name: "Local", seasonStartYear: 2021, laneMiles: 80 }], 2025)[0].laneMiles // 80
 */
export function roadsIn(lengths: readonly RoadClassLength[], seasonStartYear: number): RoadClassLength[] {
  const newest = new Map<string, RoadClassLength>();
  for (const length of lengths) {
    if (length.seasonStartYear > seasonStartYear) continue;
    const known = newest.get(length.name);
    if (known === undefined || known.seasonStartYear < length.seasonStartYear) newest.set(length.name, length);
  }
  return [...newest.values()]
    .filter(({ laneMiles }) => laneMiles > 0)
    .toSorted((a, b) => a.name.localeCompare(b.name, "en"));
}

/**
 * Lane miles of all roads in a season.
 *
 * @returns null when no class has a length for that season: not known, rather than none
 */
export function laneMilesIn(lengths: readonly RoadClassLength[], seasonStartYear: number): number | null {
  const roads = roadsIn(lengths, seasonStartYear);
  return roads.length === 0 ? null : roads.reduce((sum, road) => sum + road.laneMiles, 0);
}
