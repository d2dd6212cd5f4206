import { daysBetween, isLocalDate, type LocalDate } from "../dates.ts";

/** A time on the town's own clock, without a zone, written YYYY-MM-DD HH:MM. Sorts as text. */
export type LocalTime = string;

const isoTime = /^(\d{4}-\d{2}-\d{2})(?:[T ]+(.+))?$/;
const usTime = /^(\d{1,2})\/(\d{1,2})(?:\/(\d{4}|\d{2}))?(?:\s+(.+))?$/;
const clock = /^(\d{1,2})(?::(\d{2})(?::\d{2}(?:\.\d+)?)?)?\s*(am|pm|a|p)?$/i;

function readClock(text: string | undefined): string | null {
  if (text === undefined) return "00:00";
  const match = clock.exec(text.trim());
  if (!match) return null;
  const half = match[3]?.toLowerCase().charAt(0);
  // A bare number is no time: "4" could be the day.
  if (match[2] === undefined && half === undefined) return null;
  const typedHour = Number(match[1]);
  const minute = Number(match[2] ?? "0");
  if (minute > 59 || typedHour > 23 || (half !== undefined && (typedHour < 1 || typedHour > 12))) return null;
  const hour = half === undefined ? typedHour : (typedHour % 12) + (half === "p" ? 12 : 0);
  return `${String(hour).padStart(2, "0")}:${String(minute).padStart(2, "0")}`;
}

function usDay(match: RegExpExecArray, seasonStartYear: number): LocalDate {
  const month = Number(match[1]);
  const typedYear = match[3];
  const inSeason = month >= 7 ? seasonStartYear : seasonStartYear + 1;
  const year =
    typedYear === undefined ? inSeason : typedYear.length === 2 ? 2000 + Number(typedYear) : Number(typedYear);
  return `${year}-${String(month).padStart(2, "0")}-${String(match[2]).padStart(2, "0")}`;
}

/**
 * The time somebody typed, or pasted from a spreadsheet.
 *
 * Taken: "2026-01-12 04:30", "2026-01-12T04:30", "1/12/2026 4:30 AM", "1/12/26 4:30 pm", "1/12 16:30" (the year follows
 * from the season), and a day alone, which is midnight. Months come before days, as in the trade's country.
 *
 * @param text - as typed
 * @param seasonStartYear - decides the year where none is written
 * @returns the time, or null when it is none
 * @example readLocalTime("1/12 4:30 am", 2025) // "2026-01-12 04:30"
 */
export function readLocalTime(text: string, seasonStartYear: number): LocalTime | null {
  const tidy = text.replace(/\s+/gu, " ").trim();
  const iso = isoTime.exec(tidy);
  const us = iso ? null : usTime.exec(tidy);
  const day = iso ? iso[1] : us ? usDay(us, seasonStartYear) : undefined;
  const time = readClock(iso ? iso[2] : us?.[4]);
  if (day === undefined || time === null || !isLocalDate(day)) return null;
  return `${day} ${time}`;
}

function minutesOfDay(time: LocalTime) {
  return Number(time.slice(11, 13)) * 60 + Number(time.slice(14, 16));
}

/**
 * Hours from one local time to another; negative when the second is earlier. A change of clocks between them is not
 * seen: an hour in a storm log is no more exact than that.
 *
 * @throws RangeError when a day is no real day
 * @example hoursBetween("2026-01-12 22:00", "2026-01-13 04:30") // 6.5
 */
export function hoursBetween(from: LocalTime, to: LocalTime): number {
  return daysBetween(from.slice(0, 10), to.slice(0, 10)) * 24 + (minutesOfDay(to) - minutesOfDay(from)) / 60;
}
