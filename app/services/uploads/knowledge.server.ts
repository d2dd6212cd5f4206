import { QueryTypes, type Transaction } from "sequelize";
import type { TownActor } from "#app/context.ts";
import { nameList } from "#app/domain/season/name-lists.ts";
import type { OpenSeason } from "#app/domain/season/season-days.ts";
import type { StockKnowledge } from "#app/domain/season/stock-file.ts";
import type { SpreadMaterial } from "#app/domain/season/storm-fields.ts";
import type { StormKnowledge } from "#app/domain/season/storm-file.ts";
import { isStormKind } from "#app/domain/season/storm-kind.ts";
import type { RememberedColumn } from "#app/domain/upload/match-columns.ts";
import { type MeasureUnit, measureUnits } from "#app/domain/upload/measure.ts";
import { now } from "#app/lib/clock.server.ts";
import { db } from "#app/lib/db.server.ts";
import { Material } from "#app/models/material.server.ts";
import { Truck } from "#app/models/truck.server.ts";
import type { UploadKind } from "#app/models/upload.server.ts";

/** Options of a query that belongs to a transaction, if there is one. */
function inside(transaction: Transaction | undefined) {
  return transaction === undefined ? {} : { transaction };
}

/** The town's materials, in the order in which they were made. */
export async function townMaterials(actor: TownActor, transaction?: Transaction): Promise<SpreadMaterial[]> {
  const materials = await Material.findAll({
    where: { townId: actor.townId },
    order: [["id", "ASC"]],
    ...inside(transaction),
  });
  return materials.map(({ id, name, kind }) => ({ id, name, kind }));
}

/** The seasons the network has opened, and which of them this town has sent in. */
async function openSeasons(actor: TownActor, transaction?: Transaction): Promise<Map<number, OpenSeason>> {
  const seasons = await db.query<{
    startYear: number;
    opensOn: string | null;
    closesOn: string | null;
    state: string | null;
  }>(
    `SELECT s.start_year AS startYear, CAST(s.opens_on AS CHAR) AS opensOn, CAST(s.closes_on AS CHAR) AS closesOn, f.state
       FROM season s LEFT JOIN season_figure f ON f.season_start_year = s.start_year AND f.town_id = ?`,
    { type: QueryTypes.SELECT, replacements: [actor.townId], ...inside(transaction) },
  );
  return new Map(
    seasons.map(({ startYear, opensOn, closesOn, state }) => [
      startYear,
      { startYear, opensOn, closesOn, isClosed: state === "sent" || state === "accepted" },
    ]),
  );
}

export type NameSort = "truck" | "material" | "storm-kind";
export type OtherName = { sort: NameSort; name: string; meaning: string; uploadId: number | null };

/** What the town has said that names in its files mean. */
export async function otherNames(actor: TownActor, transaction?: Transaction): Promise<OtherName[]> {
  return db.query<OtherName>(
    "SELECT sort, name, meaning, upload_id AS uploadId FROM other_name WHERE town_id = ? ORDER BY name",
    { type: QueryTypes.SELECT, replacements: [actor.townId], ...inside(transaction) },
  );
}

/** What the town has said of heads in its earlier files of that kind. */
export async function rememberedColumns(actor: TownActor, kind: UploadKind): Promise<RememberedColumn[]> {
  const columns = await db.query<{ head: string; field: string; unit: string | null }>(
    "SELECT head, field, unit FROM column_match WHERE town_id = ? AND kind = ?",
    { type: QueryTypes.SELECT, replacements: [actor.townId, kind] },
  );
  return columns.map(({ head, field, unit }) => ({
    head,
    field: field === "" ? null : field,
    unit: measureUnits.find((known): known is MeasureUnit => known === unit) ?? null,
  }));
}

/** Ids that names of one sort stand for. */
export function idsByName(names: readonly OtherName[], sort: NameSort) {
  return names.filter((other) => other.sort === sort).map(({ name, meaning }) => ({ text: name, id: Number(meaning) }));
}

/** What has to be known of the town to read its storm log. */
export async function stormKnowledge(actor: TownActor, transaction?: Transaction): Promise<StormKnowledge> {
  const [materials, trucks, names, seasons] = await Promise.all([
    townMaterials(actor, transaction),
    Truck.findAll({
      attributes: ["id", "unitNumber", "capacityTons"],
      where: { townId: actor.townId },
      ...inside(transaction),
    }),
    otherNames(actor, transaction),
    openSeasons(actor, transaction),
  ]);
  const kinds = names.flatMap(({ sort, name, meaning }) =>
    sort === "storm-kind" && isStormKind(meaning) ? [{ text: name, id: meaning }] : [],
  );
  return {
    townName: actor.townName,
    trucks: new Map(trucks.map(({ id, unitNumber, capacityTons }) => [id, { id, unitNumber, capacityTons }])),
    materials: new Map(materials.map((material) => [material.id, material])),
    truckNames: nameList(
      trucks.map(({ id, unitNumber }) => ({ id, name: unitNumber })),
      idsByName(names, "truck"),
    ),
    materialNames: nameList(materials, idsByName(names, "material")),
    kindNames: nameList([], kinds),
    seasons,
    today: now().toISOString().slice(0, 10),
  };
}

/** What has to be known of the town to read its stock. */
export async function stockKnowledge(actor: TownActor, transaction?: Transaction): Promise<StockKnowledge> {
  const { materials, materialNames, seasons, today } = await stormKnowledge(actor, transaction);
  return { materials, materialNames, seasons, today };
}
