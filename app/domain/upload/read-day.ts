import { isLocalDate, type LocalDate } from "../dates.ts";

/** In which order a file writes day and month where they are digits alone. */
export type DateOrder = "month-first" | "day-first";

export type DayReading =
  { ok: true; day: LocalDate; minutes: number | null } | { ok: false; code: "not-a-date" | "has-zone" };

const months = ["jan", "feb", "mar", "apr", "may", "jun", "jul", "aug", "sep", "oct", "nov", "dec"];
const clock = String.raw`(?:[T,]?\s*(\d{1,2}[:.]?\d{0,2}(?::\d{2}(?:\.\d+)?)?\s*(?:[ap]\.?m\.?)?))?`;
const isoPattern = new RegExp(String.raw`^(\d{4})[-/](\d{1,2})[-/](\d{1,2})${clock}$`, "i");
const digitsPattern = new RegExp(String.raw`^(\d{1,2})[-/.](\d{1,2})[-/.](\d{4}|\d{2})${clock}$`, "i");
const dayMonthPattern = new RegExp(
  String.raw`^(\d{1,2})(?:st|nd|rd|th)?[-\s.]+([a-z]{3,9})\.?[-\s,]+(\d{4}|\d{2})${clock}$`,
  "i",
);
const monthDayPattern = new RegExp(
  String.raw`^([a-z]{3,9})\.?[-\s]+(\d{1,2})(?:st|nd|rd|th)?[-\s,]+(\d{4}|\d{2})${clock}$`,
  "i",
);
const weekday = /^(?:mon|tues?|wed(?:nes)?|thur?s?|fri|sat(?:ur)?|sun)(?:day)?\.?,?\s+/i;
const zone = /\d(?:\s*Z|\s*(?:UTC|GMT|E[SD]T|C[SD]T|M[SD]T|P[SD]T)|:\d{2}\s*[+-]\d{2}:?\d{2})$/i;

const notADate = { ok: false, code: "not-a-date" } as const;

/** Two digits are of this century up to 79: no spreader was logged in a spreadsheet before 1980. */
function fullYear(text: string) {
  if (text.length === 4) return text;
  return String(Number(text) + (Number(text) < 80 ? 2000 : 1900));
}

function monthNumber(text: string) {
  const index = months.indexOf(text.slice(0, 3).toLowerCase());
  return index === -1 ? null : String(index + 1);
}

function dayOf(year: string, month: string, day: string, time: string | undefined): DayReading {
  const date = `${fullYear(year)}-${month.padStart(2, "0")}-${day.padStart(2, "0")}`;
  if (!isLocalDate(date)) return notADate;
  if (time === undefined) return { ok: true, day: date, minutes: null };
  const minutes = readClock(time);
  return minutes === null ? notADate : { ok: true, day: date, minutes };
}

/**
 * The time of day as minutes after midnight, 0 to 1439, or null when the text is none.
 *
 * Taken: "06:30", "6:30 PM", "0630", "6 am", seconds are dropped.
 *
 * @example readClock("6:30 pm") // 1110
 */
export function readClock(text: string): number | null {
  const match = /^(\d{1,2})(?:[:.]?(\d{2}))?(?::\d{2}(?:\.\d+)?)?\s*([ap])?\.?(?:m\.?)?$/i.exec(text.trim());
  if (!match) return null;
  const [hourText = "", minuteText, half] = match.slice(1);
  if (minuteText === undefined && half === undefined) return null;
  const hour = Number(hourText);
  const minute = Number(minuteText ?? "0");
  if (minute > 59 || hour > (half === undefined ? 23 : 12) || (half !== undefined && hour === 0)) return null;
  const wholeHour = half === undefined ? hour : (hour % 12) + (half.toLowerCase() === "p" ? 12 : 0);
  return wholeHour * 60 + minute;
}

/**
 * The day, and the time of day if one stands with it, that a cell holds.
 *
 * Taken: 2026-01-05, 1/5/2026, 5.1.26, 5-Jan-26, January 5, 2026, each with or without a time; a weekday before it is
 * passed over. A zone is refused: storms are logged in the town's own time.
 *
 * @param order - what digits alone mean; year-first and months in words do not need it
 * @example readDay("1/5/26 6:30 am", "month-first") // { ok: true, day: "2026-01-05", minutes: 390 }
 */
export function readDay(text: string, order: DateOrder): DayReading {
  const typed = text.replace(/\s+/gu, " ").trim().replace(weekday, "");
  const iso = isoPattern.exec(typed);
  if (iso) return dayOf(iso[1] ?? "", iso[2] ?? "", iso[3] ?? "", iso[4]);
  const digits = digitsPattern.exec(typed);
  if (digits) {
    const [first = "", second = "", year = "", time] = digits.slice(1);
    return order === "month-first" ? dayOf(year, first, second, time) : dayOf(year, second, first, time);
  }
  const dayMonth = dayMonthPattern.exec(typed);
  if (dayMonth) {
    const month = monthNumber(dayMonth[2] ?? "");
    return month === null ? notADate : dayOf(dayMonth[3] ?? "", month, dayMonth[1] ?? "", dayMonth[4]);
  }
  const monthDay = monthDayPattern.exec(typed);
  if (monthDay) {
    const month = monthNumber(monthDay[1] ?? "");
    return month === null ? notADate : dayOf(monthDay[3] ?? "", month, monthDay[2] ?? "", monthDay[4]);
  }
  return zone.test(typed) ? { ok: false, code: "has-zone" } : notADate;
}
