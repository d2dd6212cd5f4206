import { daysBetween, type LocalDate } from "../dates.ts";
import { cellProblem, cellText, type FileProblem, type FileRow } from "../file-problem.ts";
import { readClock, readDay } from "../upload/read-day.ts";
import { type OpenSeason, seasonOfDay } from "./season-days.ts";

/** Common practice, without a source: a storm longer than a week is two, or a slip of the pen. */
const longestStormDays = 7;

/** How a day is to be written, by what was wrong with it. */
export const dayMessages = {
  "not-a-date": "This is no day. Write it as year-month-day, as in 2026-01-05.",
  "has-zone": "Write the town's own time without a zone, as in 2026-01-05 06:30.",
};

/** Reads the day in a cell; a problem is added when there is none. A blank cell gives null without a problem. */
export function cellDay(fileRow: FileRow, column: string, problems: FileProblem[]) {
  const text = cellText(fileRow, column);
  if (text === "") return null;
  if (/^(?:grand |sub)?totals?\b/i.test(text)) {
    const message = "This row looks like a total. Leave it out: totals are added up here.";
    problems.push(cellProblem(fileRow, column, "totals-row", message));
    return null;
  }
  const read = readDay(text, fileRow.style?.dateOrder ?? "month-first");
  if (read.ok) return { day: read.day, minutes: read.minutes };
  problems.push(cellProblem(fileRow, column, read.code, dayMessages[read.code]));
  return null;
}

function cellClock(fileRow: FileRow, column: string, problems: FileProblem[]): number | null {
  const text = cellText(fileRow, column);
  if (text === "") return null;
  const minutes = readClock(text.replace(/^1899-12-3[01] /, ""));
  if (minutes === null) {
    problems.push(
      cellProblem(fileRow, column, "not-a-time", "This is no time of day. Write it as in 06:30 or 6:30 pm."),
    );
  }
  return minutes;
}

function instant(day: LocalDate, minutes: number) {
  const [hour, minute] = [Math.floor(minutes / 60), minutes % 60];
  return `${day} ${String(hour).padStart(2, "0")}:${String(minute).padStart(2, "0")}:00`;
}

function nextDay(day: LocalDate): LocalDate {
  const next = new Date(`${day}T00:00:00Z`);
  next.setUTCDate(next.getUTCDate() + 1);
  return next.toISOString().slice(0, 10);
}

function readEnd(fileRow: FileRow, started: { day: LocalDate; minutes: number }, problems: FileProblem[]) {
  const before = problems.length;
  const ended = cellDay(fileRow, "ended_on", problems);
  const clock = cellClock(fileRow, "end_time", problems);
  if (problems.length > before || (ended === null && clock === null)) return null;
  const minutes = clock ?? ended?.minutes ?? null;
  // An end that is earlier in the day than the start, with no day of its own, is after midnight.
  const sameOrNext = minutes !== null && minutes < started.minutes ? nextDay(started.day) : started.day;
  const day = ended?.day ?? sameOrNext;
  const column = ended === null ? "end_time" : "ended_on";
  const length = daysBetween(started.day, day);
  // A day without a time ends with its midnight.
  const isEarlier = length < 0 || (length === 0 && minutes !== null && minutes < started.minutes);
  if (isEarlier) {
    problems.push(cellProblem(fileRow, column, "ends-before", "This storm ends before it begins."));
    return null;
  }
  if (length > longestStormDays) {
    const message = `This storm lasts ${length} days. Is the end right?`;
    problems.push(cellProblem(fileRow, column, "very-long", message, "check"));
  }
  return instant(day, minutes ?? 1439);
}

/**
 * When a storm was, and in which season.
 *
 * @returns null when it cannot be told or the season takes nothing; the reasons are added to `problems`
 */
export function readStormTimes(
  fileRow: FileRow,
  seasons: ReadonlyMap<number, OpenSeason>,
  today: LocalDate,
  problems: FileProblem[],
): { seasonStartYear: number; startedAt: string; endedAt: string | null } | null {
  const before = problems.length;
  const started = cellDay(fileRow, "started_on", problems);
  if (started === null) {
    if (problems.length === before)
      problems.push(cellProblem(fileRow, "started_on", "blank", "Give the day on which the storm began."));
    return null;
  }
  const clock = cellClock(fileRow, "start_time", problems);
  const minutes = clock ?? started.minutes ?? 0;
  const season = seasonOfDay(started.day, seasons, today);
  if (!season.ok) {
    problems.push(cellProblem(fileRow, "started_on", season.code, season.message));
    return null;
  }
  if (season.isOutside) {
    const message = "This day lies outside the dates between which the season is open.";
    problems.push(cellProblem(fileRow, "started_on", "outside-season", message, "check"));
  }
  const endedAt = readEnd(fileRow, { day: started.day, minutes }, problems);
  return { seasonStartYear: season.seasonStartYear, startedAt: instant(started.day, minutes), endedAt };
}
