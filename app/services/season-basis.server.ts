import { QueryTypes } from "sequelize";
import type { Finding } from "#app/domain/finding.ts";
import type { MaterialKind } from "#app/domain/calibration/band.ts";
import { laneMilesIn, type RoadClassLength } from "#app/domain/season/road-lengths.ts";
import {
  type LogStorm,
  type MaterialUse,
  type SeasonDraft,
  seasonFromLog,
} from "#app/domain/season/season-from-log.ts";
import { type LogLine, stockBalance, stockFindings, type StockLine } from "#app/domain/season/stock-balance.ts";
import { lbPerShortTon } from "#app/domain/units.ts";
import { db } from "#app/lib/db.server.ts";

export type BasisMaterial = MaterialUse & { id: number };

/** What a town's season rests on: its storms, piles, roads and prices. */
export type SeasonBasis = {
  draft: SeasonDraft;
  materials: BasisMaterial[];
  stormLineCount: number;
  findings: Finding[];
};

type MaterialRow = {
  id: number;
  townId: number;
  name: string;
  kind: MaterialKind;
  saltShare: number;
  seasonCentsPerTon: number | null;
  usualCentsPerTon: number | null;
};
type StockRow = StockLine & { materialId: number; priceCents: number | null };
type LogRow = { materialId: number; day: string; usedLb: number | null; usedGal: number | null };
type StormRow = LogStorm & { townId: number; lineCount: number };
type RoadRow = RoadClassLength & { townId: number };

async function rows<Row extends object>(query: string, townIds: readonly number[], seasonStartYear: number) {
  return db.query<Row>(query, { type: QueryTypes.SELECT, replacements: { townIds, seasonStartYear } });
}

function grouped<Row>(all: readonly Row[], keyOf: (row: Row) => number) {
  const groups = new Map<number, Row[]>();
  for (const row of all) {
    const group = groups.get(keyOf(row));
    if (group) group.push(row);
    else groups.set(keyOf(row), [row]);
  }
  return groups;
}

/** Cents a ton over the deliveries that carry a price. */
function paidCentsPerTon(stock: readonly StockRow[]) {
  const priced = stock.filter((line) => line.kind === "delivery" && line.priceCents !== null && line.quantityLb > 0);
  const tons = priced.reduce((sum, line) => sum + line.quantityLb / lbPerShortTon, 0);
  return tons === 0 ? null : priced.reduce((sum, line) => sum + (line.priceCents ?? 0), 0) / tons;
}

function materialUse(
  row: MaterialRow,
  stock: readonly StockRow[],
  log: readonly LogRow[],
  hasLog: boolean,
): BasisMaterial {
  const lines = log.map(({ day, usedLb }): LogLine => ({ day, usedLb: usedLb ?? 0 }));
  return {
    id: row.id,
    name: row.name,
    kind: row.kind,
    saltShare: row.saltShare,
    balance: stockBalance(stock, hasLog ? lines : null),
    loggedGal: log.reduce((sum, line) => sum + (line.usedGal ?? 0), 0),
    loggedAllLb: lines.reduce((sum, line) => sum + line.usedLb, 0),
    paidCentsPerTon: paidCentsPerTon(stock),
    listedCentsPerTon: row.seasonCentsPerTon ?? row.usualCentsPerTon,
  };
}

/**
 * What the seasons of several towns rest on, each town's by itself.
 *
 * @param townIds - at most a few hundred
 * @returns by town id; a town without anything has an empty basis
 */
export async function readSeasonBases(
  townIds: readonly number[],
  seasonStartYear: number,
): Promise<Map<number, SeasonBasis>> {
  if (townIds.length === 0) return new Map();
  const ask = <Row extends object>(query: string) => rows<Row>(query, townIds, seasonStartYear);
  const [materials, stock, log, storms, roads] = await Promise.all([
    ask<MaterialRow>(
      `SELECT m.id, m.town_id AS townId, m.name, m.kind, m.salt_share AS saltShare,
              p.cents_per_ton AS seasonCentsPerTon, m.price_cents_per_ton AS usualCentsPerTon
         FROM material m
         LEFT JOIN material_price p ON p.material_id = m.id AND p.season_start_year = :seasonStartYear
        WHERE m.town_id IN (:townIds) ORDER BY m.id`,
    ),
    ask<StockRow>(
      `SELECT material_id AS materialId, kind, day, quantity_lb AS quantityLb, price_cents AS priceCents
         FROM stock_entry WHERE town_id IN (:townIds) AND season_start_year = :seasonStartYear`,
    ),
    ask<LogRow>(
      `SELECT u.material_id AS materialId, DATE_FORMAT(s.started_at, '%Y-%m-%d') AS day,
              SUM(u.used_lb) AS usedLb, SUM(u.used_gal) AS usedGal
         FROM storm s JOIN storm_material u ON u.storm_id = s.id
        WHERE s.town_id IN (:townIds) AND s.season_start_year = :seasonStartYear
        GROUP BY u.material_id, day`,
    ),
    ask<StormRow>(
      `SELECT town_id AS townId, DATE_FORMAT(started_at, '%Y-%m-%d %H:%i') AS startedAt,
              DATE_FORMAT(MAX(ended_at), '%Y-%m-%d %H:%i') AS endedAt, SUM(lane_miles_treated) AS laneMilesTreated,
              COUNT(*) AS lineCount
         FROM storm WHERE town_id IN (:townIds) AND season_start_year = :seasonStartYear
        GROUP BY town_id, started_at`,
    ),
    ask<RoadRow>(
      `SELECT town_id AS townId, name, season_start_year AS seasonStartYear, lane_miles AS laneMiles
         FROM road_class WHERE town_id IN (:townIds) AND season_start_year <= :seasonStartYear`,
    ),
  ]);
  const stockOf = grouped(stock, (line) => line.materialId);
  const logOf = grouped(log, (line) => line.materialId);
  const stormsOf = grouped(storms, (storm) => storm.townId);
  const roadsOf = grouped(roads, (road) => road.townId);
  const materialsOf = grouped(materials, (material) => material.townId);
  return new Map(
    townIds.map((townId) => {
      const ownStorms = stormsOf.get(townId) ?? [];
      const own = (materialsOf.get(townId) ?? []).map((row) =>
        materialUse(row, stockOf.get(row.id) ?? [], logOf.get(row.id) ?? [], ownStorms.length > 0),
      );
      const laneMiles = laneMilesIn(roadsOf.get(townId) ?? [], seasonStartYear);
      return [
        townId,
        {
          draft: seasonFromLog(laneMiles, ownStorms, own),
          materials: own,
          stormLineCount: ownStorms.reduce((sum, storm) => sum + storm.lineCount, 0),
          findings: own.flatMap(({ name, kind, balance }) => (kind === "brine" ? [] : stockFindings(name, balance))),
        },
      ];
    }),
  );
}

/** What one town's season rests on. */
export async function readSeasonBasis(townId: number, seasonStartYear: number): Promise<SeasonBasis> {
  const basis = (await readSeasonBases([townId], seasonStartYear)).get(townId);
  if (!basis) throw new RangeError("the basis of a town that was asked for is always there");
  return basis;
}
