import type { TownActor } from "#app/context.ts";
import { calibrationKey, readCalibrationRows } from "#app/domain/calibration/calibration-file.ts";
import type { FileProblem, FileRow } from "#app/domain/file-problem.ts";
import { readTruckRows } from "#app/domain/fleet/truck-file.ts";
import { readSeasonRows } from "#app/domain/season/season-file.ts";
import { now } from "#app/lib/clock.server.ts";
import { Calibration } from "#app/models/calibration.server.ts";
import { Material } from "#app/models/material.server.ts";
import { Season } from "#app/models/season.server.ts";
import { SeasonFigure } from "#app/models/season-figure.server.ts";
import { Truck } from "#app/models/truck.server.ts";
import { idsByName, otherNames } from "./knowledge.server.ts";

export type WholeOutcome = Map<number, { staged: unknown; problems: FileProblem[] }>;

/** What was found, row by row. What stands for several rows is kept at the first of them. */
function byRow(
  rows: readonly FileRow[],
  { staged, problems }: { staged: readonly { row: number }[]; problems: readonly FileProblem[] },
): WholeOutcome {
  const outcome: WholeOutcome = new Map(rows.map(({ row }) => [row, { staged: null, problems: [] }]));
  for (const problem of problems) outcome.get(problem.row ?? rows[0]?.row ?? 0)?.problems.push(problem);
  for (const one of staged) {
    const own = outcome.get(one.row);
    if (own && !own.problems.some(({ severity }) => severity === "error")) own.staged = one;
  }
  return outcome;
}

/** Reads a file of season figures against what the network has opened and the town has sent in. */
export async function checkSeasons(actor: TownActor, rows: readonly FileRow[]): Promise<WholeOutcome> {
  const [seasons, figures] = await Promise.all([
    Season.findAll({ attributes: ["startYear"] }),
    SeasonFigure.findAll({ where: { townId: actor.townId } }),
  ]);
  const checked = readSeasonRows(rows, {
    seasonStartYears: seasons.map((season) => season.startYear),
    closedStartYears: figures
      .filter((figure) => figure.state === "sent" || figure.state === "accepted")
      .map((figure) => figure.seasonStartYear),
    earlier: figures
      .filter((figure) => figure.state === "accepted")
      .map((figure) => ({ seasonStartYear: figure.seasonStartYear, amounts: figure })),
  });
  return byRow(rows, checked);
}

/** Reads a file of trucks against the town's fleet; only a director may take one in or out of service. */
export async function checkTrucks(actor: TownActor, rows: readonly FileRow[]): Promise<WholeOutcome> {
  const where = { townId: actor.townId };
  const [trucks, materials] = await Promise.all([
    Truck.findAll({ where, attributes: ["id", "unitNumber", "isInService"] }),
    Material.findAll({ where, attributes: ["id", "name"] }),
  ]);
  const checked = readTruckRows(rows, {
    trucks: trucks.map(({ id, unitNumber, isInService }) => ({ id, unitNumber, isInService })),
    materials: materials.map(({ id, name }) => ({ id, name })),
    maySetService: actor.role === "director",
  });
  return byRow(rows, checked);
}

/** Reads a file of calibrations against the town's trucks and materials, and what is stored of them. */
export async function checkCalibrations(actor: TownActor, rows: readonly FileRow[]): Promise<WholeOutcome> {
  const where = { townId: actor.townId };
  const [trucks, materials, calibrations, names] = await Promise.all([
    Truck.findAll({ where }),
    Material.findAll({ where }),
    Calibration.findAll({ where, attributes: ["truckId", "materialId", "testedOn", "gateOpeningIn"] }),
    otherNames(actor),
  ]);
  const idByText = (sort: "truck" | "material") =>
    new Map(idsByName(names, sort).map(({ text, id }) => [text, id] as const));
  const checked = readCalibrationRows(rows, {
    trucks: trucks.map(({ id, unitNumber, gateMaxIn, workingSetting }) => ({
      id,
      unitNumber,
      gateMaxIn,
      workingSetting,
    })),
    materials: materials.map(({ id, name }) => ({ id, name })),
    otherNames: { truck: idByText("truck"), material: idByText("material") },
    storedKeys: new Set(
      calibrations.map((stored) =>
        calibrationKey(stored.truckId, stored.materialId, stored.testedOn, stored.gateOpeningIn),
      ),
    ),
    today: now().toISOString().slice(0, 10),
  });
  return byRow(rows, checked);
}
