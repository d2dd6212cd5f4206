import type { Transaction } from "sequelize";
import { z } from "zod";
import type { TownActor } from "#app/context.ts";
import {
  calibrationFileColumns,
  calibrationKey,
  readCalibrationRows,
  type StagedCalibration,
} from "#app/domain/calibration/calibration-file.ts";
import type { FileProblem, FileRow } from "#app/domain/file-problem.ts";
import { controlKinds, spreaderKinds } from "#app/domain/fleet/truck.ts";
import { readTruckRows, type StagedTruck, truckFileColumns } from "#app/domain/fleet/truck-file.ts";
import { readSeasonRows, seasonFileColumns, type StagedSeason } from "#app/domain/season/season-file.ts";
import { now } from "#app/lib/clock.server.ts";
import { Calibration } from "#app/models/calibration.server.ts";
import { Material } from "#app/models/material.server.ts";
import { Season } from "#app/models/season.server.ts";
import { SeasonFigure } from "#app/models/season-figure.server.ts";
import { Truck } from "#app/models/truck.server.ts";
import type { UploadKind } from "#app/models/upload.server.ts";

const Positive = z.number().positive();
const Amount = z.number().nonnegative();

export const StagedSeasons = z.array(
  z.object({
    row: z.number(),
    seasonStartYear: z.number().int(),
    amounts: z.object({
      laneMiles: Positive,
      eventCount: Amount,
      saltLb: Amount,
      mixLb: Amount,
      mixSaltShare: Amount.nullable(),
      sandLb: Amount,
      brineGal: Amount.nullable(),
      materialCostCents: Amount.nullable(),
    }),
  }),
) satisfies z.ZodType<StagedSeason[]>;

export const StagedCalibrations = z.array(
  z.object({
    row: z.number(),
    truckId: z.number().int(),
    unitNumber: z.string(),
    materialId: z.number().int(),
    materialName: z.string(),
    testedOn: z.string(),
    gateOpeningIn: Positive,
    counts: z.array(z.object({ setting: z.number().int(), revolutions: Positive, seconds: Positive })),
    catches: z.array(z.object({ revolutions: Positive, grossLb: Positive, tareLb: Amount })),
  }),
) satisfies z.ZodType<StagedCalibration[]>;

export const StagedTrucks = z.array(
  z.object({
    row: z.number(),
    truckId: z.number().int().nullable(),
    unitNumber: z.string(),
    body: z.string(),
    spreaderKind: z.enum(spreaderKinds),
    control: z.enum(controlKinds),
    lanesPerPass: Positive,
    workingSpeedMph: Positive,
    workingSetting: Positive,
    workingRpm: Positive.nullable(),
    gateMaxIn: Positive.nullable(),
    capacityTons: Positive.nullable(),
    isInService: z.boolean(),
    materialIds: z.array(z.number().int()),
  }),
) satisfies z.ZodType<StagedTruck[]>;

type Checked = { staged: unknown[]; problems: FileProblem[] };
type Kind = {
  label: string;
  columns: readonly string[];
  /** A row that shows how to fill the template in. */
  example: readonly (readonly string[])[];
  check: (actor: TownActor, rows: readonly FileRow[], transaction: Transaction) => Promise<Checked>;
};

async function checkSeasons(actor: TownActor, rows: readonly FileRow[], transaction: Transaction): Promise<Checked> {
  const [seasons, figures] = await Promise.all([
    Season.findAll({ attributes: ["startYear"], transaction }),
    SeasonFigure.findAll({ where: { townId: actor.townId }, transaction }),
  ]);
  return readSeasonRows(rows, {
    seasonStartYears: seasons.map((season) => season.startYear),
    closedStartYears: figures
      .filter((figure) => figure.state === "sent" || figure.state === "accepted")
      .map((figure) => figure.seasonStartYear),
    earlier: figures
      .filter((figure) => figure.state === "accepted")
      .map((figure) => ({ seasonStartYear: figure.seasonStartYear, amounts: figure })),
  });
}

async function checkCalibrations(
  actor: TownActor,
  rows: readonly FileRow[],
  transaction: Transaction,
): Promise<Checked> {
  const where = { townId: actor.townId };
  const [trucks, materials, calibrations] = await Promise.all([
    Truck.findAll({ where, transaction }),
    Material.findAll({ where, transaction }),
    Calibration.findAll({ where, attributes: ["truckId", "materialId", "testedOn", "gateOpeningIn"], transaction }),
  ]);
  return readCalibrationRows(rows, {
    trucks: trucks
      .map(({ id, unitNumber, gateMaxIn, workingSetting }) => ({ id, unitNumber, gateMaxIn, workingSetting }))
      .sort((one, other) => one.unitNumber.localeCompare(other.unitNumber, "en", { numeric: true })),
    materials: materials.map(({ id, name }) => ({ id, name })),
    storedKeys: new Set(
      calibrations.flatMap(({ truckId, materialId, testedOn, gateOpeningIn }) =>
        gateOpeningIn === null ? [] : [calibrationKey(truckId, materialId, testedOn, gateOpeningIn)],
      ),
    ),
    today: now().toISOString().slice(0, 10),
  });
}

async function checkTrucks(actor: TownActor, rows: readonly FileRow[], transaction: Transaction): Promise<Checked> {
  const where = { townId: actor.townId };
  const [trucks, materials] = await Promise.all([
    Truck.findAll({ where, attributes: ["id", "unitNumber", "isInService"], transaction }),
    Material.findAll({ where, attributes: ["id", "name"], transaction }),
  ]);
  return readTruckRows(rows, {
    trucks: trucks.map(({ id, unitNumber, isInService }) => ({ id, unitNumber, isInService })),
    materials: materials.map(({ id, name }) => ({ id, name })),
    maySetService: actor.role === "director",
  });
}

/** The kinds of file that are taken, each with its columns and its checks. */
export const uploadKinds: Record<UploadKind, Kind> = {
  "season-figures": {
    label: "Season figures",
    columns: seasonFileColumns,
    example: [["2025-26", "118", "24", "1890.5", "0", "", "240", "", "131400"]],
    check: checkSeasons,
  },
  calibrations: {
    label: "Calibrations",
    columns: calibrationFileColumns,
    example: [
      ["12", "Salt", "2026-10-09", "1 7/8", "count", "1", "11.25", "60", "", ""],
      ["12", "Salt", "2026-10-09", "1 7/8", "count", "2", "19.5", "60", "", ""],
      ["12", "Salt", "2026-10-09", "1 7/8", "catch", "", "1", "", "9.4", "1.6"],
    ],
    check: checkCalibrations,
  },
  trucks: {
    label: "Trucks",
    columns: truckFileColumns,
    example: [
      [
        "12",
        "8-yard hopper",
        "hopper-auger",
        "manual",
        "1",
        "25",
        "3",
        "1600",
        "4 1/2",
        "8.6",
        "yes",
        "Salt; Sand mix",
      ],
      ["14", "10-yard chain body", "conveyor", "ground-speed", "1", "25", "4", "", "", "", "yes", "Salt"],
    ],
    check: checkTrucks,
  },
};

/** Whether a text names a kind of file. */
export function isUploadKind(text: unknown): text is UploadKind {
  return typeof text === "string" && Object.hasOwn(uploadKinds, text);
}
