import { isLocalDate, type LocalDate } from "#app/domain/dates.ts";
import { type WeatherElement, weatherElements } from "#app/domain/severity/weather-day.ts";
import { flagsOf, type ValueFlags } from "./observation.ts";
import { isStationId } from "./station-id.ts";

/** One value of a file, before it is read. */
export type FileValue = { element: WeatherElement; column: string; text: string; flags: ValueFlags };

/** What one line of a file holds: a station's day with some of its values, or the column that cannot be understood. */
export type FileLine =
  | { ok: true; stationId: string; day: LocalDate; values: FileValue[] }
  | { ok: false; column: string; text: string; code: "not-a-station" | "not-a-date" };

function elementOf(text: string) {
  return weatherElements.find((element) => element === text);
}

function lineOf(stationId: string, day: string, dayText: string, values: FileValue[]): FileLine {
  if (!isStationId(stationId)) return { ok: false, column: "STATION", text: stationId, code: "not-a-station" };
  if (!isLocalDate(day)) return { ok: false, column: "DATE", text: dayText, code: "not-a-date" };
  return { ok: true, stationId, day, values };
}

/**
 * Whether a file's first record is already a value, as in the archive's files by station, which have no heads.
 *
 * @example isByStationRecord(["USC00000001", "20260115", "TMAX", "-178", "", "", "0", "0700"]) // true
 */
export function isByStationRecord(record: readonly string[]): boolean {
  const [stationId = "", day = "", element = ""] = record;
  return isStationId(stationId.trim()) && /^\d{8}$/.test(day.trim()) && /^[A-Z]{2}[A-Z0-9]{2}$/.test(element.trim());
}

/**
 * A line of the archive's files by station: identifier, YYYYMMDD, element, value, then flags of measurement, quality and
 * source, and the time. Elements other than the five give a line without values.
 *
 * Source: NOAA NCEI, GHCN-Daily, readme of the files by station.
 */
export function byStationLine(record: readonly string[]): FileLine {
  const [stationId = "", dayText = "", elementText = "", text = "", measurement = "", quality = ""] = record.map(
    (cell) => cell.trim(),
  );
  const day = dayText.replace(/^(\d{4})(\d{2})(\d{2})$/, "$1-$2-$3");
  const element = elementOf(elementText);
  const values = element ? [{ element, column: element, text, flags: { measurement, quality } }] : [];
  return lineOf(stationId, day, dayText, values);
}

/**
 * A line of a daily-summaries file, or an object of such a reply: STATION, DATE, and a column for each element with its
 * flags in another. A column that is not there gives no value.
 *
 * @param cellOf - the text under a head, undefined where there is no such column
 *
 * Source: NOAA NCEI, daily summaries, documentation of the station files.
 */
export function summaryLine(cellOf: (head: string) => string | undefined): FileLine {
  const values = weatherElements.flatMap((element) => {
    const text = cellOf(element);
    return text === undefined
      ? []
      : [{ element, column: element, text, flags: flagsOf(cellOf(`${element}_ATTRIBUTES`)) }];
  });
  const dayText = (cellOf("DATE") ?? "").trim();
  return lineOf((cellOf("STATION") ?? "").trim(), dayText, dayText, values);
}
