import { QueryTypes, type Transaction } from "sequelize";
import type { FileProblem } from "#app/domain/file-problem.ts";
import { bulkRows } from "#app/lib/bulk.server.ts";
import { db } from "#app/lib/db.server.ts";
import { FileError } from "#app/lib/file-error.ts";
import type { Upload } from "#app/models/upload.server.ts";
import type { StationWeather } from "#app/lib/weather/station-days.ts";
import { readStationFile, type StationFile } from "#app/lib/weather/station-file.ts";
import { answersOf, keepProblems, keepRows, openProblems } from "./staging.server.ts";
import type { Step } from "./steps.server.ts";
import { storedRows } from "./stored-file.server.ts";

/** The station that the coordinator has attached to the town. */
export async function townStation(
  townId: number,
  transaction?: Transaction,
): Promise<{ id: number; code: string; name: string } | null> {
  const [station] = await db.query<{ id: number; code: string; name: string }>(
    "SELECT s.id, s.code, s.name FROM town t JOIN station s ON s.id = t.station_id WHERE t.id = ?",
    { type: QueryTypes.SELECT, replacements: [townId], ...(transaction ? { transaction } : {}) },
  );
  return station ?? null;
}

async function* records(upload: Upload): AsyncGenerator<string[]> {
  for await (const batch of storedRows(upload, null)) {
    for (const { cells } of batch) yield cells.map(String);
  }
}

/** The archive's own units first; decimals, or readings that cannot be, show that the file is in the other ones. */
async function readFile(upload: Upload): Promise<StationFile & { isInUsUnits: boolean }> {
  const asStored = await readStationFile(records(upload), { units: "ghcn" });
  const isDoubtful = asStored.problems.some(({ code }) => code === "units-differ" || code === "impossible");
  if (!isDoubtful) return { ...asStored, isInUsUnits: false };
  const asStandard = await readStationFile(records(upload), { units: "standard" });
  const errors = (file: StationFile) => file.problems.filter(({ severity }) => severity === "error").length;
  return errors(asStandard) < errors(asStored)
    ? { ...asStandard, isInUsUnits: true }
    : { ...asStored, isInUsUnits: false };
}

function check(code: string, message: string): FileProblem {
  return { row: null, column: null, value: null, code, severity: "check", message };
}

/** In which units the file was taken to be, with what follows from it, for somebody who knows the winter. */
function unitsCheck({ days }: StationWeather, isInUsUnits: boolean): FileProblem {
  const temperatures = days.flatMap(({ tmaxF, tminF }) => [tmaxF, tminF].filter((value) => value !== null));
  const units = isInUsUnits ? "°F and inches" : "the archive’s own units, tenths of °C and millimetres";
  if (temperatures.length === 0) return check("weather-units", `The file was read as being in ${units}.`);
  const [least, most] = bounds(temperatures).map(Math.round);
  return check("weather-units", `The file was read as being in ${units}: from ${least} to ${most} °F. Can that be?`);
}

/** Least and greatest, without spreading tens of thousands of arguments. */
function bounds(values: readonly number[]): [number, number] {
  return values.reduce<[number, number]>(
    ([least, most], value) => [Math.min(least, value), Math.max(most, value)],
    [Infinity, -Infinity],
  );
}

/** Look at a file of daily weather: the days of the town's own station are what would be taken in. */
export async function runStationCheck({ upload, actor, write }: Step): Promise<void> {
  const station = await townStation(actor.townId);
  if (!station) {
    const message = "Your town has no weather station yet. The coordinator attaches one; then read this file again.";
    throw new FileError("no-station", message);
  }
  const file = await readFile(upload);
  const own = file.stations.find(({ stationId }) => stationId === station.code);
  if (!own) {
    const [refusal] = file.problems;
    const names = file.stations
      .map(({ stationId }) => stationId)
      .slice(0, 5)
      .join(", ");
    throw names === "" && refusal
      ? new FileError(refusal.code, refusal.message)
      : new FileError(
          "other-station",
          `This file is of ${names}. Your town’s station is ${station.code}, ${station.name}.`,
        );
  }
  const answers = (await answersOf(upload.id)).get(0);
  const others = file.stations.length - 1;
  const wholeFile = [
    unitsCheck(own, file.isInUsUnits),
    ...(others > 0
      ? [check("other-stations", `The days of ${others} other stations in this file are not taken.`)]
      : []),
    ...file.problems.filter(({ row }) => row === null),
  ];
  const byRow = new Map<number, FileProblem[]>();
  for (const problem of file.problems) {
    if (problem.row !== null) byRow.set(problem.row, [...(byRow.get(problem.row) ?? []), problem]);
  }
  const { days } = own;
  for (let start = 0; start < days.length; start += bulkRows) {
    const rows = days.slice(start, start + bulkRows).map((day, place) => ({
      sheetRow: start + place + 1,
      state: "ok" as const,
      cells: null,
      stagedText: JSON.stringify(day),
      problems: [],
    }));
    await write({ rowsRead: start + rows.length }, (transaction) => keepRows(upload.id, rows, transaction));
  }
  const found = [
    { sheetRow: 0, problems: openProblems(wholeFile, answers) },
    ...[...byRow].map(([sheetRow, problems]) => ({ sheetRow, problems })),
  ];
  const counts = { rowsOk: days.length, rowsError: byRow.size, rowsTotal: days.length, rowsRead: days.length };
  const period = { periodStart: days[0]?.day ?? null, periodEnd: days.at(-1)?.day ?? null };
  await write({ state: "checked", ...counts, ...period }, (transaction) => keepProblems(upload.id, found, transaction));
}
