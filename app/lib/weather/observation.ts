import { readNumber } from "#app/domain/readings.ts";
import { fromGhcnUnits, isPossibleReading, type WeatherElement } from "#app/domain/severity/weather-day.ts";

/**
 * In which units a file's values stand: as the archive stores them (tenths of °C, mm, tenths of mm) or in the United
 * States' own (°F, inches). A file does not say so itself.
 */
export type WeatherUnits = "ghcn" | "standard";

/** The two flags of a value that matter here, blank when there is none. */
export type ValueFlags = { measurement: string; quality: string };

/** Why a value that stands there is not taken, though nothing is wrong with the file. */
export type MissingReason = "blank" | "failed-check" | "presumed-zero";

/** What one value says. */
export type Observation =
  | { state: "read"; reading: number | "trace" }
  | { state: "missing"; reason: MissingReason }
  | { state: "unreadable"; code: "not-a-number" | "units-differ" | "impossible"; message: string };

/** The archive's own mark for "no value". Source: NOAA NCEI, GHCN-Daily readme, section III, "VALUE". */
const noValue = "-9999";
const traceFlag = "T";
const presumedZeroFlag = "P";

function unreadable(code: "not-a-number" | "units-differ" | "impossible", message: string): Observation {
  return { state: "unreadable", code, message };
}

/**
 * The flags of a value, out of the text that a daily summary keeps beside it.
 *
 * @param attributes - "measurement,quality,source,time", each of which may be blank; undefined when the column is not there
 *
 * Source: NOAA NCEI, daily summaries, documentation of the attribute columns.
 * @example flagsOf(",I,W,2400").quality // "I"
 */
export function flagsOf(attributes: string | undefined): ValueFlags {
  const [measurement = "", quality = ""] = (attributes ?? "").split(",").map((flag) => flag.trim());
  return { measurement, quality };
}

/**
 * What one value of a weather file or reply says. A missing value is never filled in.
 *
 * A value with any quality flag has failed one of the archive's checks and is left out. A zero that the archive only
 * presumes is left out too.
 *
 * @param text - as it stands, blanks around it allowed
 * @param units - of the text; the result is in °F or inches, not rounded
 *
 * Source: NOAA NCEI, GHCN-Daily readme, section III, flags.
 * @example readObservation({ element: "SNOW", text: " 102", flags, units: "ghcn" }) // { state: "read", reading: 4.01… }
 */
export function readObservation({
  element,
  text,
  flags,
  units,
}: {
  element: WeatherElement;
  text: string;
  flags: ValueFlags;
  units: WeatherUnits;
}): Observation {
  const written = text.trim();
  const isAmount = element !== "TMAX" && element !== "TMIN";
  if (written === "" || written === noValue) return { state: "missing", reason: "blank" };
  if (flags.quality !== "") return { state: "missing", reason: "failed-check" };
  if (flags.measurement === presumedZeroFlag) return { state: "missing", reason: "presumed-zero" };
  if (isAmount && written === "T") return { state: "read", reading: "trace" };
  const number = readNumber(written);
  if (!number.ok)
    return unreadable("not-a-number", `${element} must be a plain number, not “${written.slice(0, 40)}”.`);
  if (units === "ghcn" && !Number.isInteger(number.value)) {
    return unreadable("units-differ", `${element} has decimals, so this file is in °F and inches. Choose those units.`);
  }
  const reading = units === "ghcn" ? fromGhcnUnits(element, number.value) : number.value;
  if (!isPossibleReading(element, reading)) {
    return unreadable("impossible", `${element} cannot be ${written} in these units. Were the right units chosen?`);
  }
  return { state: "read", reading: isAmount && flags.measurement === traceFlag ? "trace" : reading };
}
