import { isLocalDate, type LocalDate } from "#app/domain/dates.ts";
import { mmToInches } from "#app/domain/units.ts";

/** The daily elements that are used, by their GHCN-Daily codes. */
export const weatherElements = ["TMAX", "TMIN", "SNOW", "SNWD", "PRCP"] as const;
export type WeatherElement = (typeof weatherElements)[number];

/**
 * One station's weather on one day, in °F and inches, as reported and not rounded. `null` is a reading that is missing.
 * A trace is a reading: its depth is 0 and its `is…Trace` is true.
 */
export type WeatherDay = {
  day: LocalDate;
  tmaxF: number | null;
  tminF: number | null;
  snowfallIn: number | null;
  isSnowfallTrace: boolean;
  snowDepthIn: number | null;
  isSnowDepthTrace: boolean;
  precipIn: number | null;
  isPrecipTrace: boolean;
};

/** What was read of one day: °F for the temperatures, inches or "trace" for the rest; a missing element is left out. */
export type WeatherReadings = Partial<Record<WeatherElement, number | "trace">>;

/** Wide on purpose: beyond these no weather lies, only a wrong unit. In °F and inches. */
const limits: Record<WeatherElement, { least: number; most: number }> = {
  TMAX: { least: -130, most: 140 },
  TMIN: { least: -130, most: 140 },
  SNOW: { least: 0, most: 100 },
  SNWD: { least: 0, most: 600 },
  PRCP: { least: 0, most: 80 },
};

/**
 * Whether the reading can be weather at all. Our own wide limits, without a source: they catch wrong units.
 *
 * @param value - °F for TMAX and TMIN, inches for the others
 * @example isPossibleReading("TMAX", 278) // false
 */
export function isPossibleReading(element: WeatherElement, value: number): boolean {
  return value >= limits[element].least && value <= limits[element].most;
}

/**
 * The reading in °F or inches of a value in the units in which GHCN-Daily stores it.
 *
 * @param value - tenths of °C for TMAX and TMIN, mm for SNOW and SNWD, tenths of mm for PRCP
 * @returns °F or inches, not rounded
 *
 * Source: NOAA NCEI, GHCN-Daily readme, section III, "ELEMENT".
 * @example fromGhcnUnits("TMAX", -178) // -0.04
 */
export function fromGhcnUnits(element: WeatherElement, value: number): number {
  // Ninths of fifties keep whole °F free of binary noise, so that a half stays a half until it is rounded.
  if (element === "TMAX" || element === "TMIN") return (value * 9) / 50 + 32;
  return mmToInches(element === "PRCP" ? value / 10 : value);
}

function amount(day: LocalDate, element: WeatherElement, reading: number | "trace" | undefined) {
  if (reading === undefined) return null;
  if (reading === "trace") return 0;
  if (!isPossibleReading(element, reading)) {
    throw new RangeError(`${element} on ${day} cannot be ${reading}: °F and inches are expected`);
  }
  return reading;
}

/**
 * The day with its readings.
 *
 * @param readings - °F and inches, or "trace" for SNOW, SNWD and PRCP
 * @throws RangeError when the day is none, a temperature is a trace or a reading can be no weather
 * @example weatherDay("2026-01-15", { TMAX: 28, SNOW: "trace" }).snowfallIn // 0
 */
export function weatherDay(day: LocalDate, readings: WeatherReadings): WeatherDay {
  if (!isLocalDate(day)) throw new RangeError(`a date must be a real day written YYYY-MM-DD, not "${day}"`);
  if (readings.TMAX === "trace" || readings.TMIN === "trace") {
    throw new RangeError(`a temperature on ${day} cannot be a trace`);
  }
  return {
    day,
    tmaxF: amount(day, "TMAX", readings.TMAX),
    tminF: amount(day, "TMIN", readings.TMIN),
    snowfallIn: amount(day, "SNOW", readings.SNOW),
    isSnowfallTrace: readings.SNOW === "trace",
    snowDepthIn: amount(day, "SNWD", readings.SNWD),
    isSnowDepthTrace: readings.SNWD === "trace",
    precipIn: amount(day, "PRCP", readings.PRCP),
    isPrecipTrace: readings.PRCP === "trace",
  };
}

function roundedTo(value: number | null, stepsPerUnit: number) {
  if (value === null) return null;
  // Twelve digits take away what binary fractions add: 4.35 × 10 is 43.49999999999999 and means 43.5.
  const steps = Math.round(Number((Math.abs(value) * stepsPerUnit).toPrecision(12)));
  return steps === 0 ? 0 : (Math.sign(value) * steps) / stepsPerUnit;
}

/**
 * The day in the steps in which weather is reported in the United States: whole °F, tenths of an inch of snowfall,
 * whole inches of snow on the ground, hundredths of an inch of precipitation. A half goes away from zero.
 *
 * The tables and rules of winter severity are made in these steps. That a half goes away from zero is our own rule.
 *
 * @example inReportedSteps(weatherDay("2026-01-15", { TMIN: -8.5 })).tminF // -9
 */
export function inReportedSteps(day: WeatherDay): WeatherDay {
  return {
    ...day,
    tmaxF: roundedTo(day.tmaxF, 1),
    tminF: roundedTo(day.tminF, 1),
    snowfallIn: roundedTo(day.snowfallIn, 10),
    snowDepthIn: roundedTo(day.snowDepthIn, 1),
    precipIn: roundedTo(day.precipIn, 100),
  };
}
