import type { FileProblem } from "#app/domain/file-problem.ts";
import { byStationLine, type FileLine, isByStationRecord } from "./file-records.ts";
import { fileProblem, fileStations } from "./file-stations.ts";
import type { WeatherUnits } from "./observation.ts";
import type { StationWeather } from "./station-days.ts";
import { readSummaryHeads } from "./summary-heads.ts";

/** Above this a file is no town's weather. */
const mostStations = 20;

const howTo = "Order the daily summaries of the station as CSV, or upload the archive's file of the station.";
const noFlags = "This file has no columns of flags, so doubtful values cannot be told. Order it with flags included.";

export type StationFile = { stations: StationWeather[]; problems: FileProblem[] };

function refusal(code: string, message: string): StationFile {
  return { stations: [], problems: [fileProblem(code, "error", message)] };
}

/**
 * The daily weather in a file of the public GHCN-Daily archive: a daily-summaries file with heads, or a file by station
 * without any. Which of the two it is shows in its first line.
 *
 * What the archive itself doubts is left out and counted in the station's tallies; it is no problem of the file. Nothing
 * missing is filled in.
 *
 * @param records - the file's records in order, cells as text; read once, never held
 * @param units - of a file with heads; a file by station is always in the archive's units
 * @returns the stations with their days, and problems by row (the first record being row 1), 200 at the most
 * @example await readStationFile([["USC00000001", "20260115", "TMAX", "-178", "", "", "0", ""]], { units: "ghcn" })
 */
export async function readStationFile(
  records: Iterable<readonly string[]> | AsyncIterable<readonly string[]>,
  { units }: { units: WeatherUnits },
): Promise<StationFile> {
  const found = fileStations();
  let layout: { read: (record: readonly string[]) => FileLine; units: WeatherUnits } | null = null;
  let [row, lineCount] = [0, 0];
  for await (const record of records) {
    row++;
    if (record.every((cell) => cell.trim() === "")) continue;
    if (layout === null && isByStationRecord(record)) layout = { read: byStationLine, units: "ghcn" };
    if (layout === null) {
      const heads = readSummaryHeads(record);
      if (!heads.ok) return refusal(heads.code, `${heads.message} ${howTo}`);
      if (!heads.hasFlags) found.note(fileProblem("no-flags", "check", noFlags));
      layout = { read: heads.read, units };
      continue;
    }
    lineCount++;
    found.add(row, layout.read(record), layout.units);
    if (found.stationCount() > mostStations) {
      return refusal("too-many-stations", `This file holds more than ${mostStations} stations. Order those you use.`);
    }
  }
  if (layout === null) return refusal("empty", `This file is empty. ${howTo}`);
  if (lineCount === 0) return refusal("only-heads", "This file has its heads but no rows under them.");
  return found.finish();
}
