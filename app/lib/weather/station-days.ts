import type { LocalDate } from "#app/domain/dates.ts";
import {
  weatherDay,
  type WeatherDay,
  type WeatherElement,
  weatherElements,
  type WeatherReadings,
} from "#app/domain/severity/weather-day.ts";
import type { MissingReason, Observation } from "./observation.ts";

/** What became of an element's values, in days. */
export type ElementTally = {
  readCount: number;
  blankCount: number;
  failedCheckCount: number;
  presumedZeroCount: number;
  unreadableCount: number;
  /** Days for which two different values stood; neither is taken. */
  contradictedCount: number;
};

export type StationWeather = {
  stationId: string;
  /** Days with at least one reading, by date. What is not there was not reported. */
  days: WeatherDay[];
  tallies: Record<WeatherElement, ElementTally>;
};

/** Gathers one station's values in whatever order they come. */
export type StationDays = {
  /** Takes a value; "contradicted" when another one stands for the same element and day. */
  add: (day: LocalDate, element: WeatherElement, observation: Observation) => "taken" | "contradicted";
  weather: () => StationWeather;
};

const tallyOfMissing: Record<MissingReason, "blankCount" | "failedCheckCount" | "presumedZeroCount"> = {
  blank: "blankCount",
  "failed-check": "failedCheckCount",
  "presumed-zero": "presumedZeroCount",
};

function emptyTally(): ElementTally {
  return {
    readCount: 0,
    blankCount: 0,
    failedCheckCount: 0,
    presumedZeroCount: 0,
    unreadableCount: 0,
    contradictedCount: 0,
  };
}

/**
 * An empty gathering of a station's days.
 *
 * The same value twice counts once. Where two values differ, nobody can know which holds: the element is missing on
 * that day. A value that is missing or unreadable takes nothing away from one that was read.
 *
 * @param stationId - GHCN-Daily identifier of 11 characters
 * @example stationDays("USC00000001").weather().days // []
 */
export function stationDays(stationId: string): StationDays {
  const readingsByDay = new Map<LocalDate, WeatherReadings>();
  const contradicted = new Set<string>();
  const tallies = {
    TMAX: emptyTally(),
    TMIN: emptyTally(),
    SNOW: emptyTally(),
    SNWD: emptyTally(),
    PRCP: emptyTally(),
  };

  function takeReading(day: LocalDate, element: WeatherElement, reading: number | "trace") {
    const key = `${day} ${element}`;
    if (contradicted.has(key)) return "contradicted";
    const readings = readingsByDay.get(day) ?? {};
    readingsByDay.set(day, readings);
    const earlier = readings[element];
    if (earlier === reading) return "taken";
    if (earlier === undefined) {
      readings[element] = reading;
      tallies[element].readCount++;
      return "taken";
    }
    readings[element] = undefined;
    contradicted.add(key);
    tallies[element].readCount--;
    tallies[element].contradictedCount++;
    return "contradicted";
  }

  return {
    add(day, element, observation) {
      if (observation.state === "read") return takeReading(day, element, observation.reading);
      const counted = observation.state === "missing" ? tallyOfMissing[observation.reason] : "unreadableCount";
      tallies[element][counted]++;
      return "taken";
    },
    weather: () => ({
      stationId,
      days: [...readingsByDay]
        .filter(([, readings]) => weatherElements.some((element) => readings[element] !== undefined))
        .sort(([a], [b]) => (a < b ? -1 : 1))
        .map(([day, readings]) => weatherDay(day, readings)),
      tallies,
    }),
  };
}
