/** A calendar day without a time or a zone, written YYYY-MM-DD. */
export type LocalDate = string;

const dayPattern = /^([1-9]\d{3})-(\d{2})-(\d{2})$/;
const millisecondsPerDay = 86_400_000;
/** A season runs from 1 July, so that no winter is cut in two. */
const firstMonthOfSeason = 7;

function isLeapYear(year: number) {
  return year % 4 === 0 && (year % 100 !== 0 || year % 400 === 0);
}

function daysInMonth(year: number, month: number) {
  if (month === 2) return isLeapYear(year) ? 29 : 28;
  return [4, 6, 9, 11].includes(month) ? 30 : 31;
}

function partsOf(text: string) {
  const match = dayPattern.exec(text);
  if (!match) return null;
  const [year, month, day] = [Number(match[1]), Number(match[2]), Number(match[3])];
  if (month < 1 || month > 12 || day < 1 || day > daysInMonth(year, month)) return null;
  return { year, month, day };
}

function partsOrRefuse(date: LocalDate) {
  const parts = partsOf(date);
  if (!parts) throw new RangeError(`a date must be a real day written YYYY-MM-DD, not "${date}"`);
  return parts;
}

function utcTimeOf(date: LocalDate) {
  const { year, month, day } = partsOrRefuse(date);
  return Date.UTC(year, month - 1, day);
}

/**
 * Whether the text is a day of the calendar, from the year 1000 on.
 *
 * @param text - anything; only YYYY-MM-DD passes
 * @example isLocalDate("2026-02-29") // false
 */
export function isLocalDate(text: string): boolean {
  return partsOf(text) !== null;
}

/**
 * The year in which the day's season starts; seasons run from 1 July to 30 June.
 *
 * @throws RangeError when the date is no real day
 * @example seasonStartYearOf("2026-01-15") // 2025
 */
export function seasonStartYearOf(date: LocalDate): number {
  const { year, month } = partsOrRefuse(date);
  return month >= firstMonthOfSeason ? year : year - 1;
}

/**
 * The season's name by its two years, with an en dash.
 *
 * @param startYear - four digits
 * @example seasonLabel(2025) // "2025–26"
 */
export function seasonLabel(startYear: number): string {
  return `${startYear}–${String((startYear + 1) % 100).padStart(2, "0")}`;
}

/**
 * The start year of a season written by its two years, or null when the text is no such name or its years do not follow.
 *
 * @param text - "2025–26", "2025-26", "2025/26" or "2025-2026"; blanks around it are ignored
 * @example parseSeasonLabel("2025/27") // null
 */
export function parseSeasonLabel(text: string): number | null {
  const match = /^([1-9]\d{3})[–/-](\d{2}|\d{4})$/.exec(text.trim());
  if (!match) return null;
  const startYear = Number(match[1]);
  const secondYear = match[2] ?? "";
  const expected = String(startYear + 1);
  return secondYear === expected || secondYear === expected.slice(-2) ? startYear : null;
}

/** The first day of the season. @example seasonStart(2025) // "2025-07-01" */
export function seasonStart(startYear: number): LocalDate {
  return `${startYear}-07-01`;
}

/** The last day of the season. @example seasonEnd(2025) // "2026-06-30" */
export function seasonEnd(startYear: number): LocalDate {
  return `${startYear + 1}-06-30`;
}

/**
 * Whole days from the first date to the second; negative when the second is earlier.
 *
 * @throws RangeError when a date is no real day
 * @example daysBetween("2026-02-28", "2026-03-01") // 1
 */
export function daysBetween(from: LocalDate, to: LocalDate): number {
  return (utcTimeOf(to) - utcTimeOf(from)) / millisecondsPerDay;
}
