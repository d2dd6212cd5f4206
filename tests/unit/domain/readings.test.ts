import fc from "fast-check";
import { expect, test } from "vitest";
import { readInches, readNumber } from "#app/domain/readings.ts";

test.each([
  ["1,234.5", 1234.5],
  ["-5", -5],
  ["+5", 5],
  ["\u2212 5".replace(" ", ""), -5],
  [".5", 0.5],
  ["5.", 5],
  ["007", 7],
  ["-0", 0],
  ["  12.25 ", 12.25],
  ["\u00a012\u202f", 12],
  ["1,234,567", 1234567],
  ["123456789012345", 123456789012345],
])('"%s" is read as %d', (text, value) => {
  expect(readNumber(text)).toEqual({ ok: true, value });
});

test.each(["", "   ", "\u00a0", "\t\n"])("blank text %j is blank, not zero", (text) => {
  expect(readNumber(text)).toEqual({ ok: false, code: "blank" });
});

test.each(["1.234,5", "1,5", "0,123", "1,23,456", "1 234", "1.234.567", "12,", "1'234"])(
  '"%s" is ambiguous',
  (text) => {
    expect(readNumber(text)).toEqual({ ok: false, code: "ambiguous" });
  },
);

test.each([
  "NaN",
  "Infinity",
  "-Infinity",
  "1e400",
  "1e5",
  "0x10",
  "12 t",
  "n/a",
  "-",
  ".",
  "--5",
  "5-",
  "$5",
  "٣",
  "１２",
  "1234567890123456",
  "12345678901234567890",
  "0.1234567890123456",
  "=1+1",
  "true",
  "null",
])('"%s" is no number', (text) => {
  expect(readNumber(text)).toEqual({ ok: false, code: "not-a-number" });
});

test("every number of up to 15 digits comes back as it was written", () => {
  fc.assert(
    fc.property(
      fc.integer({ min: -999_999_999, max: 999_999_999 }),
      fc.integer({ min: 0, max: 6 }),
      (digits, places) => {
        const written = (digits / 10 ** places).toFixed(places);
        expect(readNumber(written)).toEqual({ ok: true, value: Number(written) + 0 });
      },
    ),
  );
});

test("whatever is typed, the answer is a finite number or a code", () => {
  fc.assert(
    fc.property(fc.string({ unit: "binary" }), (text) => {
      for (const reading of [readNumber(text), readInches(text)]) {
        expect(reading.ok ? Number.isFinite(reading.value) : reading.code.length > 0).toBe(true);
      }
    }),
    { numRuns: 2000 },
  );
});

test.each([
  ["1 7/8", 1.875],
  ["1-7/8", 1.875],
  ["7/8", 0.875],
  ["1.875", 1.875],
  ['1 7/8"', 1.875],
  ["1 7/8 in", 1.875],
  ["1⅞", 1.875],
  ["1 ⅞", 1.875],
  ["1-⅞", 1.875],
  ["½", 0.5],
  ["1 7⁄8", 1.875],
  ["1 11/16", 1.6875],
  ["9/8", 1.125],
  ["2", 2],
])('"%s" is %d inches', (text, value) => {
  expect(readInches(text)).toEqual({ ok: true, value });
});

test.each([
  ["1 7/0", "not-a-number"],
  ["7/0", "not-a-number"],
  ["1 9/8", "ambiguous"],
  ["-7/8", "not-a-number"],
  ["1 7/8 7/8", "not-a-number"],
  ["7/", "not-a-number"],
  ["two", "not-a-number"],
  ["1,875", "number"],
  ["", "blank"],
  ["1,5", "ambiguous"],
])('"%s" is refused or read as %s', (text, code) => {
  const reading = readInches(text);
  expect(reading.ok ? "number" : reading.code).toBe(code);
});
