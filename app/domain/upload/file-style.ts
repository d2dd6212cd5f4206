import type { DecimalMark } from "../readings.ts";
import type { DateOrder } from "./read-day.ts";

/** How a file writes figures and days. Detected, shown, and changed by whoever knows better. */
export type FileStyle = { decimalMark: DecimalMark; dateOrder: DateOrder };

/** What the cells seem to say; `isCertain` is false when they could be read either way. */
export type Guess<T> = { value: T; isCertain: boolean };

const decimalPoint = /^[+-]?(?:\d+|\d{1,3}(?:,\d{3})+)?\.(?:\d{1,2}|\d{4,})$/;
const decimalComma = /^[+-]?(?:\d+|\d{1,3}(?:\.\d{3})+)?,(?:\d{1,2}|\d{4,})$/;
const pointGroups = /^[+-]?\d{1,3}(?:\.\d{3}){2,}$/;
const commaGroups = /^[+-]?\d{1,3}(?:,\d{3}){2,}$/;
const eitherWay = /^[+-]?\d{1,3},\d{3}$/;

/**
 * Which mark the figures have before their decimals.
 *
 * @param texts - cells of columns that hold figures
 * @param separator - between the file's columns; a semicolon is what spreadsheets write where the comma is the mark
 * @example guessDecimalMark(["12,5", "1.204,75"], ";") // { value: "comma", isCertain: true }
 */
export function guessDecimalMark(texts: readonly string[], separator: string): Guess<DecimalMark> {
  const figures = texts.map((text) => text.replace(/\s+/gu, "").replace(/[a-z]+\.?$/i, ""));
  const points = figures.filter((text) => decimalPoint.test(text) || commaGroups.test(text)).length;
  const commas = figures.filter((text) => decimalComma.test(text) || pointGroups.test(text)).length;
  if (points > 0 && commas === 0) return { value: "point", isCertain: true };
  if (commas > 0 && points === 0) return { value: "comma", isCertain: true };
  if (points > 0 && commas > 0) return { value: commas > points ? "comma" : "point", isCertain: false };
  const isOpen = figures.some((text) => eitherWay.test(text));
  if (!isOpen) return { value: "point", isCertain: true };
  return separator === ";" ? { value: "comma", isCertain: false } : { value: "point", isCertain: true };
}

const twoNumbers = /^(\d{1,2})[-/.](\d{1,2})[-/.](?:\d{4}|\d{2})\b/;

/**
 * Whether days are written with the month or with the day first.
 *
 * @param texts - cells of columns that hold days; those with the year first or a month in words say nothing
 * @example guessDateOrder(["12/31/2025"]) // { value: "month-first", isCertain: true }
 */
export function guessDateOrder(texts: readonly string[]): Guess<DateOrder> {
  const pairs = texts.flatMap((text) => {
    const match = twoNumbers.exec(text.trim());
    return match ? [[Number(match[1]), Number(match[2])] as const] : [];
  });
  const dayFirst = pairs.filter(([first]) => first > 12).length;
  const monthFirst = pairs.filter(([, second]) => second > 12).length;
  if (dayFirst === 0 && monthFirst === 0) {
    return { value: "month-first", isCertain: pairs.every(([first, second]) => first === second) };
  }
  return { value: dayFirst > monthFirst ? "day-first" : "month-first", isCertain: dayFirst === 0 || monthFirst === 0 };
}
