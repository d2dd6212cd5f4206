import { QueryTypes } from "sequelize";
import type { StagedCalibration } from "#app/domain/calibration/calibration-file.ts";
import type { StagedTruck } from "#app/domain/fleet/truck-file.ts";
import type { StagedSeason } from "#app/domain/season/season-file.ts";
import type { StagedStock } from "#app/domain/season/stock-file.ts";
import type { StagedStorm } from "#app/domain/season/storm-file.ts";
import { db } from "#app/lib/db.server.ts";
import { Material } from "#app/models/material.server.ts";
import { Truck } from "#app/models/truck.server.ts";
import type { Upload } from "#app/models/upload.server.ts";
import { CalibrationShape, SeasonShape, StockShape, StormShape, TruckShape } from "./staged.server.ts";

/** The first rows that would be taken in, as they were understood, and what they span. */
export type Sample = {
  seasons: StagedSeason[];
  calibrations: StagedCalibration[];
  trucks: StagedTruck[];
  storms: (StagedStorm & { sheetRow: number })[];
  stock: (StagedStock & { sheetRow: number })[];
  truckNames: Record<number, string>;
  materialNames: Record<number, string>;
  firstDay: string | null;
  lastDay: string | null;
  seasonStartYears: number[];
};

const shownRows = { wholeFiles: 200, logs: 8 };

const dayPaths = { storms: "$.startedAt", stock: "$.day" } as const;

async function span(upload: Upload) {
  if (upload.kind !== "storms" && upload.kind !== "stock")
    return { firstDay: null, lastDay: null, seasonStartYears: [] };
  const path = dayPaths[upload.kind];
  const seasons = await db.query<{ seasonStartYear: number; firstDay: string; lastDay: string }>(
    `SELECT JSON_VALUE(staged, '$.seasonStartYear') AS seasonStartYear, MIN(JSON_VALUE(staged, '${path}')) AS firstDay,
            MAX(JSON_VALUE(staged, '${path}')) AS lastDay
       FROM upload_row WHERE upload_id = ? AND state IN ('ok', 'check') AND staged IS NOT NULL GROUP BY 1`,
    { type: QueryTypes.SELECT, replacements: [upload.id] },
  );
  const days = seasons.flatMap(({ firstDay, lastDay }) => [firstDay.slice(0, 10), lastDay.slice(0, 10)]).sort();
  return {
    firstDay: days[0] ?? null,
    lastDay: days.at(-1) ?? null,
    seasonStartYears: seasons.map(({ seasonStartYear }) => Number(seasonStartYear)),
  };
}

/** What would be taken in: for a log its first rows, for a file of a few things all of them. */
export async function readySample(upload: Upload): Promise<Sample> {
  const isLog = upload.kind === "storms" || upload.kind === "stock";
  const limit = isLog ? shownRows.logs : shownRows.wholeFiles;
  const [rows, trucks, materials, days] = await Promise.all([
    db.query<{ sheetRow: number; staged: string }>(
      `SELECT sheet_row AS sheetRow, staged FROM upload_row
        WHERE upload_id = ? AND state IN ('ok', 'check') AND staged IS NOT NULL ORDER BY sheet_row LIMIT ${limit}`,
      { type: QueryTypes.SELECT, replacements: [upload.id] },
    ),
    Truck.findAll({ attributes: ["id", "unitNumber"], where: { townId: upload.townId } }),
    Material.findAll({ attributes: ["id", "name"], where: { townId: upload.townId } }),
    span(upload),
  ]);
  const staged = rows.map(({ sheetRow, staged: text }): { sheetRow: number; value: unknown } => ({
    sheetRow,
    value: JSON.parse(text),
  }));
  return {
    seasons: upload.kind === "season-figures" ? staged.map(({ value }) => SeasonShape.parse(value)) : [],
    calibrations: upload.kind === "calibrations" ? staged.map(({ value }) => CalibrationShape.parse(value)) : [],
    trucks: upload.kind === "trucks" ? staged.map(({ value }) => TruckShape.parse(value)) : [],
    storms:
      upload.kind === "storms" ? staged.map(({ sheetRow, value }) => ({ sheetRow, ...StormShape.parse(value) })) : [],
    stock:
      upload.kind === "stock" ? staged.map(({ sheetRow, value }) => ({ sheetRow, ...StockShape.parse(value) })) : [],
    truckNames: Object.fromEntries(trucks.map(({ id, unitNumber }) => [id, unitNumber])),
    materialNames: Object.fromEntries(materials.map(({ id, name }) => [id, name])),
    ...days,
  };
}
