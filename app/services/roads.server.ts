import type { TownActor } from "#app/context.ts";
import { type RoadClassLength, roadsIn } from "#app/domain/season/road-lengths.ts";
import { inTransaction } from "#app/lib/db.server.ts";
import { notFound } from "#app/lib/errors.ts";
import { RoadClass } from "#app/models/road-class.server.ts";
import { Season } from "#app/models/season.server.ts";
import { recordAudit } from "./audit.server.ts";

export type RoadsView = {
  seasonStartYears: number[];
  /** Every length written down, by class and season. */
  lengths: (RoadClassLength & { id: number })[];
  /** The roads of each opened season, newest first. */
  seasons: { seasonStartYear: number; roads: RoadClassLength[] }[];
};

/** The town's roads by class, with the seasons their lengths hold for. */
export async function listRoads(actor: TownActor): Promise<RoadsView> {
  const [lengths, seasons] = await Promise.all([
    RoadClass.findAll({
      where: { townId: actor.townId },
      order: [
        ["name", "ASC"],
        ["seasonStartYear", "ASC"],
      ],
    }),
    Season.findAll({ attributes: ["startYear"], order: [["startYear", "DESC"]] }),
  ]);
  const plain = lengths.map(({ id, name, seasonStartYear, laneMiles }) => ({ id, name, seasonStartYear, laneMiles }));
  const seasonStartYears = seasons.map(({ startYear }) => startYear);
  return {
    seasonStartYears,
    lengths: plain,
    seasons: seasonStartYears.map((seasonStartYear) => ({ seasonStartYear, roads: roadsIn(plain, seasonStartYear) })),
  };
}

/**
 * Write down how long the roads of a class are from a season on. A length for the same class and season is replaced;
 * figures that were sent in keep the lane miles they were sent with.
 *
 * @param length - 0 lane miles ends the class with that season
 * @throws 404 when the network has not opened that season
 */
export async function saveRoadLength(actor: TownActor, length: RoadClassLength): Promise<void> {
  await inTransaction(async (transaction) => {
    if (!(await Season.findByPk(length.seasonStartYear, { transaction }))) throw notFound("season");
    const { name, seasonStartYear, laneMiles } = length;
    const where = { townId: actor.townId, name, seasonStartYear };
    const known = await RoadClass.findOne({ where, lock: transaction.LOCK.UPDATE, transaction });
    const before = known?.laneMiles ?? null;
    const saved = known
      ? await known.update({ laneMiles }, { transaction })
      : await RoadClass.create({ ...where, laneMiles }, { transaction });
    await recordAudit(
      actor,
      { action: "road.save", entity: "road_class", entityId: saved.id, detail: { ...length, before } },
      transaction,
    );
  });
}

/** Take a length out again: the one before it holds on. @throws 404 when it is not the town's */
export async function removeRoadLength(actor: TownActor, roadClassId: number): Promise<void> {
  await inTransaction(async (transaction) => {
    const road = await RoadClass.findOne({ where: { id: roadClassId, townId: actor.townId }, transaction });
    if (!road) throw notFound("road class");
    const detail = { name: road.name, seasonStartYear: road.seasonStartYear, laneMiles: road.laneMiles };
    await road.destroy({ transaction });
    await recordAudit(
      actor,
      { action: "road.remove", entity: "road_class", entityId: roadClassId, detail },
      transaction,
    );
  });
}
