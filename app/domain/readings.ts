/** A number read from what somebody typed, or why it was not taken. */
export type Reading = { ok: true; value: number } | { ok: false; code: "blank" | "not-a-number" | "ambiguous" };

/** Which mark stands before the decimals. */
export type DecimalMark = "point" | "comma";

/** A double keeps fifteen decimal digits for certain; a sixteenth would be stored as something else than was typed. */
const mostSignificantDigits = 15;

const plainNumber = /^[+-]?(?:\d+\.?\d*|\.\d+)$/;
const groupedNumber = /^[+-]?[1-9]\d{0,2}(?:,\d{3})+(?:\.\d*)?$/;
const commaNumber = /^[+-]?(?:\d+,?\d*|,\d+)$/;
const commaGroupedNumber = /^[+-]?[1-9]\d{0,2}(?:(?:\.\d{3})+|(?: \d{3})+)(?:,\d*)?$/;
/** Digits in an order that another country would read as another number. */
const digitsAndMarks = /^[+-]?\d[\d.,' ]*$/;

const fractionSigns: Record<string, string> = {
  "½": "1/2",
  "⅓": "1/3",
  "⅔": "2/3",
  "¼": "1/4",
  "¾": "3/4",
  "⅛": "1/8",
  "⅜": "3/8",
  "⅝": "5/8",
  "⅞": "7/8",
};
const inchFraction = /^(?:(\d{1,4})(?:-| +))?(\d{1,3}) *\/ *(\d{1,3})$/;

/** Blanks of every width become one plain blank; a typographic minus becomes the sign on the keyboard. */
function tidy(text: string) {
  return text.replace(/\s+/gu, " ").replace(/^−/u, "-").trim();
}

function significantDigits(text: string) {
  return text.replace(/[^\d]/g, "").replace(/^0+/, "").length;
}

/**
 * The number that was typed: the only way in which a typed or uploaded number enters the program.
 *
 * Taken: a sign, digits, a decimal point, commas between groups of three; blanks around it, also fixed ones. Where the
 * file's decimal mark is a comma: a decimal comma, points or blanks between groups of three.
 * Refused as ambiguous: the other mark. Refused as no number: letters, units, exponents, digits of other scripts, more
 * than fifteen significant digits.
 *
 * @param text - as typed
 * @param decimalMark - what the file, or the person, uses; a point unless something else is known
 * @returns the value, never rounded, or a code: "blank", "not-a-number", "ambiguous"
 * @example readNumber("1,234.5") // { ok: true, value: 1234.5 }
 */
export function readNumber(text: string, decimalMark: DecimalMark = "point"): Reading {
  const typed = tidy(text);
  if (typed === "") return { ok: false, code: "blank" };
  if (significantDigits(typed) > mostSignificantDigits) return { ok: false, code: "not-a-number" };
  if (decimalMark === "comma" && (commaNumber.test(typed) || commaGroupedNumber.test(typed))) {
    return { ok: true, value: Number(typed.replace(/[. ]/g, "").replace(",", ".")) + 0 };
  }
  if (decimalMark === "point" && (plainNumber.test(typed) || groupedNumber.test(typed))) {
    // Adding zero turns a typed "-0" into 0.
    return { ok: true, value: Number(typed.replaceAll(",", "")) + 0 };
  }
  return { ok: false, code: digitsAndMarks.test(typed) ? "ambiguous" : "not-a-number" };
}

/**
 * The length in inches that was typed, whole, decimal or as a fraction.
 *
 * Taken: "1 7/8", "1-7/8", "7/8", "1⅞", "1.875", each with or without an inch mark. A fraction has no sign;
 * with whole inches before it, it is less than one inch.
 *
 * @param text - as typed
 * @returns inches, or a code: "blank", "not-a-number" (also a fraction over zero), "ambiguous" ("1 9/8")
 * @example readInches('1 7/8"') // { ok: true, value: 1.875 }
 */
export function readInches(text: string): Reading {
  const typed = tidy(
    tidy(text)
      .replace(/ ?(?:"|″|”|in\.?)$/u, "")
      .replace(/[½⅓⅔¼¾⅛⅜⅝⅞]/gu, (sign) => ` ${fractionSigns[sign] ?? ""}`)
      .replaceAll("⁄", "/")
      .replace(/- /u, "-"),
  );
  const match = inchFraction.exec(typed);
  if (!match) return readNumber(typed);
  const [whole, numerator, denominator] = [Number(match[1] ?? 0), Number(match[2]), Number(match[3])];
  if (denominator === 0) return { ok: false, code: "not-a-number" };
  if (match[1] !== undefined && numerator >= denominator) return { ok: false, code: "ambiguous" };
  return { ok: true, value: whole + numerator / denominator };
}
