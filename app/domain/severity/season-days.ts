import { daysBetween, type LocalDate, seasonStartYearOf } from "#app/domain/dates.ts";
import { weatherDay, type WeatherDay } from "./weather-day.ts";

const millisecondsPerDay = 86_400_000;

/**
 * Every day of the calendar from the first to the last, both included; none when the last comes first.
 *
 * @throws RangeError when a date is no real day
 * @example calendarDays("2024-02-28", "2024-03-01") // ["2024-02-28", "2024-02-29", "2024-03-01"]
 */
export function calendarDays(from: LocalDate, to: LocalDate): LocalDate[] {
  const length = Math.max(0, daysBetween(from, to) + 1);
  const firstMs = Date.parse(`${from}T00:00:00Z`);
  return Array.from({ length }, (_, place) =>
    new Date(firstMs + place * millisecondsPerDay).toISOString().slice(0, 10),
  );
}

/**
 * One entry for each calendar day of the span, in order. A day that was not reported is there with nothing read.
 *
 * @param days - in any order, of any length; days outside the span are left out
 * @throws RangeError when a day of the span stands there twice: which one holds cannot be known here
 * @example everyDay([], "2026-01-01", "2026-01-02").length // 2
 */
export function everyDay(days: readonly WeatherDay[], from: LocalDate, to: LocalDate): WeatherDay[] {
  const byDay = new Map<LocalDate, WeatherDay>();
  for (const weather of days) {
    if (weather.day < from || weather.day > to) continue;
    if (byDay.has(weather.day)) throw new RangeError(`${weather.day} is given twice`);
    byDay.set(weather.day, weather);
  }
  return calendarDays(from, to).map((day) => byDay.get(day) ?? weatherDay(day, {}));
}

/** The seasons, by start year in order, in which at least one of the days lies. */
export function seasonStartYearsOf(days: readonly WeatherDay[]): number[] {
  return [...new Set(days.map(({ day }) => seasonStartYearOf(day)))].sort((a, b) => a - b);
}
