import { Op, type Transaction } from "sequelize";
import { calibrationRates, rateAtSetting } from "#app/domain/calibration/rates.ts";
import type { TownInput } from "#app/domain/peers/edition.ts";
import { seasonTotals } from "#app/domain/season/season-totals.ts";
import { median } from "#app/domain/stats/median.ts";
import { Calibration } from "#app/models/calibration.server.ts";
import { CalibrationCatch } from "#app/models/calibration-catch.server.ts";
import { CalibrationCount } from "#app/models/calibration-count.server.ts";
import { Material } from "#app/models/material.server.ts";
import { SeasonFigure } from "#app/models/season-figure.server.ts";
import { Town } from "#app/models/town.server.ts";
import { Truck } from "#app/models/truck.server.ts";
import { amountsOf } from "./season-figures.server.ts";

function groupedBy<Row>(rows: readonly Row[], keyOf: (row: Row) => number): Map<number, Row[]> {
  const groups = new Map<number, Row[]>();
  for (const row of rows) {
    const group = groups.get(keyOf(row));
    if (group) group.push(row);
    else groups.set(keyOf(row), [row]);
  }
  return groups;
}

/**
 * The salt calibration in force for each truck at the end of a season: the newest approved one, from that season or
 * the one before. Older ones no longer speak for the truck.
 */
async function saltCalibrationsInForce(seasonStartYear: number, transaction: Transaction) {
  const materials = await Material.findAll({ attributes: ["id"], where: { kind: "salt" }, transaction });
  const calibrations = await Calibration.findAll({
    attributes: ["id", "townId", "truckId"],
    where: {
      state: "approved",
      // Liquid alone says nothing of what the spreader lays, so it takes no dry calibration's place here.
      gateOpeningIn: { [Op.ne]: null },
      materialId: materials.map((material) => material.id),
      testedOn: { [Op.between]: [`${seasonStartYear - 1}-07-01`, `${seasonStartYear + 1}-06-30`] },
    },
    order: [
      ["testedOn", "DESC"],
      ["id", "DESC"],
    ],
    transaction,
  });
  const seen = new Set<number>();
  return calibrations.filter(({ truckId }) => !seen.has(truckId) && seen.add(truckId));
}

/** Each town's median salt rate at its trucks' working settings and speeds, lb per lane mile. */
async function workingRates(seasonStartYear: number, transaction: Transaction): Promise<Map<number, number>> {
  const inForce = await saltCalibrationsInForce(seasonStartYear, transaction);
  const where = { calibrationId: inForce.map((calibration) => calibration.id) };
  const [trucks, counts, catches] = await Promise.all([
    Truck.findAll({ where: { isInService: true }, transaction }),
    CalibrationCount.findAll({ where, raw: true, transaction }),
    CalibrationCatch.findAll({ where, raw: true, transaction }),
  ]);
  const truckById = new Map(trucks.map((truck) => [truck.id, truck]));
  const countsOf = groupedBy(counts, (count) => count.calibrationId);
  const catchesOf = groupedBy(catches, (caught) => caught.calibrationId);
  const ratesByTown = new Map<number, number[]>();
  for (const { id, townId, truckId } of inForce) {
    const truck = truckById.get(truckId);
    const readings = { counts: countsOf.get(id) ?? [], catches: catchesOf.get(id) ?? [] };
    if (!truck || readings.counts.length === 0 || readings.catches.length === 0) continue;
    const rate = rateAtSetting(
      calibrationRates(readings),
      truck.workingSetting,
      truck.workingSpeedMph,
      truck.lanesPerPass,
    );
    if (rate !== null) ratesByTown.set(townId, [...(ratesByTown.get(townId) ?? []), rate]);
  }
  return new Map([...ratesByTown].map(([townId, rates]) => [townId, median(rates)]));
}

/**
 * What every town brings to an edition: accepted season figures and calibrations in force. The only reader of more
 * than one town's raw figures besides the coordinator's review; its result never leaves the server.
 *
 * @returns one entry for each town that brings anything
 */
export async function readPeerFigures(seasonStartYear: number, transaction: Transaction): Promise<TownInput[]> {
  const [towns, figures, rates] = await Promise.all([
    Town.findAll({ transaction }),
    SeasonFigure.findAll({
      where: { state: "accepted", seasonStartYear: { [Op.lte]: seasonStartYear } },
      order: [["seasonStartYear", "DESC"]],
      transaction,
    }),
    workingRates(seasonStartYear, transaction),
  ]);
  const figuresOf = groupedBy(figures, (figure) => figure.townId);
  return towns
    .map((town): TownInput => {
      const [newest] = figuresOf.get(town.id) ?? [];
      const figure = newest?.seasonStartYear === seasonStartYear ? newest : null;
      return {
        townId: town.id,
        contributorId: town.reportsThroughTownId ?? town.id,
        district: town.district,
        laneMiles: newest?.laneMiles ?? null,
        values: {
          "salt-per-event": figure ? seasonTotals(amountsOf(figure)).saltLbPerLaneMileEvent : null,
          "rate-at-working-setting": rates.get(town.id) ?? null,
        },
      };
    })
    .filter((town) => Object.values(town.values).some((value) => value !== null));
}
