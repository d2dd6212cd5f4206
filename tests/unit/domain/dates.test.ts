import { expect, test } from "vitest";
import {
  daysBetween,
  isLocalDate,
  parseSeasonLabel,
  seasonEnd,
  seasonLabel,
  seasonStart,
  seasonStartYearOf,
} from "#app/domain/dates.ts";

test.each(["2026-02-28", "2024-02-29", "2000-02-29", "2026-12-31"])("%s is a day", (text) => {
  expect(isLocalDate(text)).toBe(true);
});

test.each([
  "2026-02-29",
  "1900-02-29",
  "2026-02-31",
  "2026-13-01",
  "2026-00-10",
  "2026-1-1",
  "31/02/2026",
  "",
  "2026-01-01T00:00",
])('"%s" is no day', (text) => {
  expect(isLocalDate(text)).toBe(false);
});

test("30 June 2026 ends the season that 1 July 2025 began", () => {
  expect(seasonStartYearOf("2025-07-01")).toBe(2025);
  expect(seasonStartYearOf("2026-06-30")).toBe(2025);
  expect(seasonStartYearOf("2026-07-01")).toBe(2026);
  expect([seasonStart(2025), seasonEnd(2025)]).toEqual(["2025-07-01", "2026-06-30"]);
});

test("a date that is none is refused, not guessed", () => {
  expect(() => seasonStartYearOf("2026-02-31")).toThrow(RangeError);
  expect(() => daysBetween("2026-01-01", "soon")).toThrow(RangeError);
});

test("the season's name takes two digits of its second year, also over a century", () => {
  expect([seasonLabel(2025), seasonLabel(1999), seasonLabel(2008)]).toEqual(["2025–26", "1999–00", "2008–09"]);
});

test.each(["2025–26", "2025-26", "2025/26", "2025-2026", " 2025–2026 "])('"%s" is the season of 2025', (text) => {
  expect(parseSeasonLabel(text)).toBe(2025);
});

test.each(["2025-27", "2025-2027", "2025", "25-26", "2025-6", "2025 26", "season"])('"%s" names no season', (text) => {
  expect(parseSeasonLabel(text)).toBeNull();
});

test("days between two dates count over February and turn negative backwards", () => {
  expect(daysBetween("2026-02-28", "2026-03-01")).toBe(1);
  expect(daysBetween("2024-02-28", "2024-03-01")).toBe(2);
  expect(daysBetween("2026-07-01", "2025-07-01")).toBe(-365);
});
