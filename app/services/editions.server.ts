import { z } from "zod";
import type { TownActor } from "#app/context.ts";
import type { WithheldReason } from "#app/domain/peers/cell.ts";
import { type IndicatorKey, indicatorKeys, isIndicatorKey } from "#app/domain/peers/indicators.ts";
import { notFound } from "#app/lib/errors.ts";
import { keepLast } from "#app/lib/kept.server.ts";
import { type Audience, EditionCell } from "#app/models/edition-cell.server.ts";
import { Edition } from "#app/models/edition.server.ts";
import { EditionPlace } from "#app/models/edition-place.server.ts";

export type EditionSummary = {
  id: number;
  seasonStartYear: number;
  number: number;
  publishedAt: string;
  townCount: number;
  contentSha256: string;
};

/** Every edition, the newest season and number first. */
export async function listEditions(): Promise<EditionSummary[]> {
  const editions = await Edition.findAll({
    attributes: ["id", "seasonStartYear", "number", "publishedAt", "townCount", "contentSha256"],
    order: [
      ["seasonStartYear", "DESC"],
      ["number", "DESC"],
    ],
    limit: 200,
    // Asked for by nearly every page: plain rows, no model for each.
    raw: true,
  });
  return editions.map(({ id, seasonStartYear, number, publishedAt, townCount, contentSha256 }) => ({
    id,
    seasonStartYear,
    number,
    townCount,
    contentSha256,
    publishedAt: publishedAt.toISOString(),
  }));
}

const Axis = z.object({ from: z.number(), to: z.number(), step: z.number() });
const Range = z.object({ low: z.number(), high: z.number() }).nullable();
const Edges = { from: z.number().nullable(), to: z.number().nullable() };
const Withheld = z.object({
  state: z.literal("withheld"),
  groupLabel: z.string(),
  reason: z.enum(["too-few", "too-similar", "too-close"]),
});

const MemberCellShape = z.discriminatedUnion("state", [
  Withheld.extend({ axis: Axis }),
  z.object({
    state: z.literal("shown"),
    groupLabel: z.string(),
    towns: z.number(),
    median: z.number(),
    interval: Range,
    middleHalf: Range,
    tenths: Range,
    bins: z.array(z.object({ ...Edges, towns: z.number() })),
    axis: Axis,
  }),
]);

const WallCellShape = z.discriminatedUnion("state", [
  Withheld.extend({ axis: Axis }),
  z.object({
    state: z.literal("shown"),
    groupLabel: z.string(),
    townBand: z.string(),
    median: z.number(),
    middleHalf: Range,
    bars: z.array(z.object({ ...Edges, count: z.number() })),
    axis: Axis,
  }),
]);

const DownloadCellShape = z.discriminatedUnion("state", [
  Withheld,
  z.object({
    state: z.literal("shown"),
    groupLabel: z.string(),
    townBand: z.string(),
    median: z.number(),
    lowerQuartile: z.number().nullable(),
    upperQuartile: z.number().nullable(),
  }),
]);

export type MemberCell = z.infer<typeof MemberCellShape>;
export type WallCell = z.infer<typeof WallCellShape>;
type Placed<Cell> = { indicator: IndicatorKey; groupKey: string; cell: Cell };

/** Editions never change, so their cells are read and checked once: the last fifty are kept for each audience. */
function cellsFor<Cell>(audience: Audience, shape: z.ZodType<Cell>) {
  const read = keepLast<`${number}`, Placed<Cell>[]>(
    50,
    async (editionId) => {
      const cells = await EditionCell.findAll({
        attributes: ["indicator", "groupKey", "cell"],
        where: { editionId: Number(editionId), audience },
        order: [["id", "ASC"]],
      });
      return cells.flatMap(({ indicator, groupKey, cell }) =>
        isIndicatorKey(indicator) ? [{ indicator, groupKey, cell: shape.parse(cell) }] : [],
      );
    },
    (cells) => cells.length > 0,
  );
  return (editionId: number) => read(`${editionId}`);
}

/** What members may see of an edition, in the order of its menu of groups. */
const listMemberCells = cellsFor("member", MemberCellShape);

/** What may go on a wall. */
export const listWallCells = cellsFor("wall", WallCellShape);

/** What may leave in a file. */
export const listDownloadCells = cellsFor("download", DownloadCellShape);

/** @throws 404 when there is no such edition */
export async function getEdition(editionId: number): Promise<EditionSummary> {
  const edition = (await listEditions()).find(({ id }) => id === editionId);
  if (!edition) throw notFound("edition");
  return edition;
}

const Places = z.record(z.string(), z.number());

type OwnPlace = { ownValue: number; places: Record<string, number> };

const readOwnPlaces = keepLast<`${number}|${number}`, Map<string, OwnPlace>>(
  500,
  async (key) => {
    const [editionId, townId] = key.split("|").map(Number);
    const places = await EditionPlace.findAll({ where: { editionId, townId } });
    return new Map(
      places.map(({ indicator, ownValue, places: ranks }) => [indicator, { ownValue, places: Places.parse(ranks) }]),
    );
  },
  (places) => places.size > 0,
);

export type StandingRow = {
  indicator: IndicatorKey;
  cell: MemberCell;
  ownValue: number | null;
  percentile: number | null;
};

export type Standing = {
  edition: EditionSummary;
  editions: EditionSummary[];
  groupKey: string;
  /** The menu of groups: shown with its number of towns, or withheld with the reason. */
  groups: { key: string; label: string; towns: number | null; reason: WithheldReason | null }[];
  rows: StandingRow[];
};

/**
 * Where the actor's own town stands in an edition.
 *
 * @param editionId - null for the newest
 * @param groupKey - the peer group to compare with; "all" for the whole region
 * @returns null while no edition is published
 * @throws 404 when there is no such edition or group
 */
export async function getStanding(
  actor: TownActor,
  editionId: number | null,
  groupKey: string,
): Promise<Standing | null> {
  const editions = await listEditions();
  const edition = editionId === null ? editions[0] : editions.find(({ id }) => id === editionId);
  if (!edition) {
    if (editionId === null) return null;
    throw notFound("edition");
  }
  const [cells, places] = await Promise.all([
    listMemberCells(edition.id),
    readOwnPlaces(`${edition.id}|${actor.townId}`),
  ]);
  const keys = [...new Set(cells.map((cell) => cell.groupKey))];
  if (!keys.includes(groupKey)) throw notFound("peer group");
  const groups = keys.map((key) => {
    const own = cells.filter((cell) => cell.groupKey === key).map(({ cell }) => cell);
    const shown = own.flatMap((cell) => (cell.state === "shown" ? [cell.towns] : []));
    const reason = own.flatMap((cell) => (cell.state === "withheld" ? [cell.reason] : []))[0] ?? null;
    return {
      key,
      label: own[0]?.groupLabel ?? key,
      towns: shown.length > 0 ? Math.max(...shown) : null,
      reason: shown.length > 0 ? null : reason,
    };
  });
  const rows = indicatorKeys.flatMap((key): StandingRow[] => {
    const found = cells.find((cell) => cell.indicator === key && cell.groupKey === groupKey);
    if (!found) return [];
    const place = places.get(key);
    return [
      {
        indicator: key,
        cell: found.cell,
        ownValue: place?.ownValue ?? null,
        percentile: place?.places[groupKey] ?? null,
      },
    ];
  });
  return { edition, editions, groupKey, groups, rows };
}
