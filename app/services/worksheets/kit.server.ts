import { Op } from "sequelize";
import type { TownActor } from "#app/context.ts";
import type { WorksheetCopy } from "#app/domain/calibration/worksheet-sync.ts";
import type { KitCalibration, YardKit } from "#app/domain/calibration/yard-kit.ts";
import { calibrationCatches, calibrationCounts } from "#app/models/associations.server.ts";
import { Calibration } from "#app/models/calibration.server.ts";
import { Material } from "#app/models/material.server.ts";
import { Truck } from "#app/models/truck.server.ts";
import { TruckMaterial } from "#app/models/truck-material.server.ts";
import { StoredWorksheet } from "#app/models/worksheet.server.ts";
import { bandsOfTown, tolerancePercent } from "../bands.server.ts";
import { SheetSchema } from "./sheet-schema.server.ts";

const keptOfEachPair = 3;

async function listCalibrations(townId: number): Promise<KitCalibration[]> {
  const rows = await Calibration.findAll({
    attributes: ["id", "truckId", "materialId", "testedOn", "gateOpeningIn", "state"],
    // Liquid alone has neither counts to take over nor a gate to compare.
    where: { townId, method: "counts", gateOpeningIn: { [Op.ne]: null } },
    include: [
      { association: calibrationCounts, separate: true },
      { association: calibrationCatches, separate: true },
    ],
    order: [
      ["testedOn", "DESC"],
      ["id", "DESC"],
    ],
    limit: 2000,
  });
  const seen = new Map<string, { count: number; hasInForce: boolean }>();
  return rows.flatMap(({ id, truckId, materialId, testedOn, gateOpeningIn, state, counts = [], catches = [] }) => {
    if (gateOpeningIn === null) return [];
    const pair = seen.get(`${truckId} ${materialId}`) ?? { count: 0, hasInForce: false };
    const isInForce = state === "approved" && !pair.hasInForce;
    seen.set(`${truckId} ${materialId}`, { count: pair.count + 1, hasInForce: pair.hasInForce || isInForce });
    if (pair.count >= keptOfEachPair && !isInForce) return [];
    return [
      {
        id,
        truckId,
        materialId,
        testedOn,
        gateOpeningIn,
        isInForce,
        counts: counts.map(({ setting, revolutions, seconds, rpm }) => ({
          setting,
          revolutions,
          seconds,
          engineRpm: rpm,
        })),
        catches: catches.map(({ revolutions, grossLb, tareLb }) => ({ revolutions, grossLb, tareLb })),
      },
    ];
  });
}

/**
 * All that a phone of this person needs in the yard, for every truck of the town.
 *
 * @returns figures in lb, inches, seconds, mph; bands in lb per lane mile, null where a kind of material has none
 */
export async function yardKit(actor: TownActor): Promise<YardKit> {
  const { townId } = actor;
  const trucks = await Truck.findAll({ where: { townId }, order: [["unitNumber", "ASC"]], limit: 500 });
  const [materials, carried, bands, percent, calibrations] = await Promise.all([
    Material.findAll({ attributes: ["id", "name", "kind"], where: { townId }, order: [["name", "ASC"]], limit: 100 }),
    TruckMaterial.findAll({ attributes: ["truckId", "materialId"], where: { truckId: trucks.map(({ id }) => id) } }),
    bandsOfTown(actor),
    tolerancePercent(),
    listCalibrations(townId),
  ]);
  return {
    userId: actor.userId,
    personName: actor.name,
    townId,
    townName: actor.townName,
    trucks: trucks
      .map((truck) => ({
        id: truck.id,
        unitNumber: truck.unitNumber,
        isInService: truck.isInService,
        spreaderKind: truck.spreaderKind,
        control: truck.control,
        lanesPerPass: truck.lanesPerPass,
        workingSpeedMph: truck.workingSpeedMph,
        workingSetting: truck.workingSetting,
        workingRpm: truck.workingRpm,
        gateMaxIn: truck.gateMaxIn,
        materialIds: carried.filter(({ truckId }) => truckId === truck.id).map(({ materialId }) => materialId),
      }))
      .sort((a, b) => a.unitNumber.localeCompare(b.unitNumber, "en", { numeric: true })),
    materials: materials.map(({ id, name, kind }) => ({ id, name, kind })),
    bands,
    tolerancePercent: percent,
    calibrations,
  };
}

/** The server's copy of one worksheet, or null when it has none: the phone may be the only one that knows it. */
export async function findWorksheetCopy(actor: TownActor, clientRef: string): Promise<WorksheetCopy | null> {
  const worksheet = await StoredWorksheet.findOne({ where: { townId: actor.townId, clientRef } });
  if (!worksheet) return null;
  const { content, version, calibrationId } = worksheet;
  return { sheet: SheetSchema.parse(content), version, calibrationId };
}
