import { z } from "zod";
import { readInches, readNumber, type Reading } from "#app/domain/readings.ts";

type Limits = { what: string; min: number; max: number; isWhole?: boolean };

function checked(read: (text: string) => Reading, { what, min, max, isWhole = false }: Limits) {
  return z.string({ error: `Give the ${what}.` }).transform((text, context) => {
    const refuse = (message: string) => {
      context.addIssue({ code: "custom", message });
      return z.NEVER;
    };
    const reading = read(text);
    if (!reading.ok) {
      if (reading.code === "blank") return refuse(`Give the ${what}.`);
      return refuse(
        reading.code === "ambiguous"
          ? `Write the ${what} with a point for decimals, as in 1234.5.`
          : `The ${what} must be a plain number, without unit or words.`,
      );
    }
    if (reading.value < min || reading.value > max) return refuse(`The ${what} must lie between ${min} and ${max}.`);
    if (isWhole && !Number.isInteger(reading.value)) return refuse(`The ${what} must be a whole number.`);
    return reading.value;
  });
}

/**
 * A form field for a number as typed: read by the one reader of typed numbers, with sentences for what is wrong.
 *
 * @param limits - smallest and largest that can be, both allowed; `what` names it in the sentence, with its unit
 */
export function typedNumber(limits: Limits) {
  return checked(readNumber, limits);
}

/** As `typedNumber`, for inches: "1 7/8" is taken, too. */
export function typedInches(limits: Limits) {
  return checked(readInches, limits);
}
