import { z } from "zod";
import type { LocalDate } from "#app/domain/dates.ts";
import { summaryLine } from "./file-records.ts";
import { readObservation } from "./observation.ts";
import { stationDays, type StationWeather } from "./station-days.ts";

/** A season has 366 days; more rows than this are no answer to what was asked. */
const mostRows = 2000;

const Value = z.union([z.string(), z.number(), z.null()]).transform((value) => (value === null ? "" : String(value)));
const Rows = z.array(z.record(z.string(), Value)).max(mostRows);

/** What was asked for; anything else in a reply is left out and counted. */
export type SummariesQuestion = { stationId: string; from: LocalDate; to: LocalDate };

export type SummariesReply =
  { ok: true; weather: StationWeather; strayRowCount: number } | { ok: false; reason: "not-json" | "unexpected" };

function parsed(text: string): unknown {
  try {
    return JSON.parse(text);
  } catch (error) {
    if (error instanceof SyntaxError) return undefined;
    throw error;
  }
}

/**
 * The weather in a JSON reply of the daily-summaries service: a list of flat objects, values as text, in °F and inches.
 *
 * Rows may come in any order, values may be padded or empty, and an element that was not observed is not there. None of
 * that is filled in. An empty list is a good reply without a day.
 *
 * @param text - the whole body
 * @param question - a row of another station, or of no day in the span, is left out and counted as stray
 * @returns the weather, or why this is no such reply
 *
 * Source: NOAA NCEI, Access Data Service, user documentation.
 */
export function readSummariesReply(text: string, { stationId, from, to }: SummariesQuestion): SummariesReply {
  const body = parsed(text);
  if (body === undefined) return { ok: false, reason: "not-json" };
  const rows = Rows.safeParse(body);
  if (!rows.success) return { ok: false, reason: "unexpected" };
  const station = stationDays(stationId);
  let strayRowCount = 0;
  for (const row of rows.data) {
    const cells = new Map(Object.entries(row));
    const line = summaryLine((head) => cells.get(head));
    if (!line.ok || line.stationId !== stationId || line.day < from || line.day > to) {
      strayRowCount++;
      continue;
    }
    for (const { element, text: value, flags } of line.values) {
      station.add(line.day, element, readObservation({ element, text: value, flags, units: "standard" }));
    }
  }
  return { ok: true, weather: station.weather(), strayRowCount };
}
