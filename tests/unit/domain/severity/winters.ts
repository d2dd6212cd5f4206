import { calendarDays } from "#app/domain/severity/season-days.ts";
import { weatherDay, type WeatherDay, type WeatherReadings } from "#app/domain/severity/weather-day.ts";

const mild: WeatherReadings = { TMAX: 50, TMIN: 40, SNOW: 0, SNWD: 0, PRCP: 0 };

/** Weather of every day of a season, 50 and 40 °F without snow but for the days given; `null` leaves a day out. */
export function aSeason(seasonStartYear: number, own: Record<string, WeatherReadings | null> = {}): WeatherDay[] {
  return calendarDays(`${seasonStartYear}-07-01`, `${seasonStartYear + 1}-06-30`).flatMap((day) => {
    const readings = own[day];
    if (readings === null) return [];
    return [weatherDay(day, { ...mild, ...readings })];
  });
}

/** The same readings, or their absence, for each day from the first to the last. */
export function onDays<Kind>(from: string, to: string, readings: Kind): Record<string, Kind> {
  return Object.fromEntries(calendarDays(from, to).map((day) => [day, readings]));
}
