import { cellProblem, cellText, type FileProblem, type FileRow } from "./file-problem.ts";
import { readNumber } from "./readings.ts";

type Limits = {
  /** What the column holds, for messages: "salt, tons". */
  what: string;
  /** Smallest figure that can be; anything under it is refused. */
  min: number;
  /** Largest figure that can be for any town; anything over it is refused as absurd. */
  max: number;
  isWhole?: boolean;
  /** Whether a blank means "not reported" rather than a mistake. */
  mayBeBlank?: boolean;
};

/**
 * The figure in one cell, checked.
 *
 * @param problems - what is wrong is added here, with its row and column
 * @returns the number; null when the cell is blank and may be, or when a problem was added
 */
export function cellNumber(fileRow: FileRow, column: string, limits: Limits, problems: FileProblem[]): number | null {
  const refuse = (code: string, message: string) => {
    problems.push(cellProblem(fileRow, column, code, message));
    return null;
  };
  const text = cellText(fileRow, column);
  if (text === "") {
    return limits.mayBeBlank ? null : refuse("blank", `Give the ${limits.what}; write 0 if there was none.`);
  }
  const read = readNumber(text);
  if (!read.ok) {
    return read.code === "ambiguous"
      ? refuse("ambiguous", `Write the ${limits.what} with a point for decimals, as in 1234.5.`)
      : refuse("not-a-number", `The ${limits.what} must be a plain number, without unit or words.`);
  }
  if (read.value < limits.min) {
    return limits.min === 0
      ? refuse("negative", `The ${limits.what} cannot be below zero.`)
      : refuse("too-small", `The ${limits.what} must be at least ${limits.min}.`);
  }
  if (read.value > limits.max) {
    return refuse("absurd", `${text} is more than any town could have for the ${limits.what}. Is the unit right?`);
  }
  if (limits.isWhole && !Number.isInteger(read.value)) {
    return refuse("not-whole", `The ${limits.what} must be a whole number.`);
  }
  return read.value;
}
