import { cellProblem, cellText, type FileProblem, type FileRow } from "./file-problem.ts";
import { readNumber } from "./readings.ts";
import { convertMeasure, dimensionOf, type MeasureUnit, splitMeasure, unitWords } from "./upload/measure.ts";

type Limits = {
  /** What the column holds, for messages: "salt, tons". */
  what: string;
  /** Smallest figure that can be; anything under it is refused. */
  min: number;
  /** Largest figure that can be for any town; anything over it is refused as absurd. */
  max: number;
  isWhole?: boolean;
  /** A sign that may stand with the figure and says nothing more. */
  sign?: "$" | "%";
  /** The unit of min, max and the result; a column or a cell in another unit of the same kind is converted. */
  unit?: MeasureUnit;
  /** Bulk density for cubic yards, lb; without it they are refused. */
  lbPerCubicYard?: number | null;
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
  const bare = limits.sign === undefined ? text : text.replace(limits.sign, "").trim();
  const measured = limits.unit === undefined ? { figure: bare, unit: null } : splitMeasure(bare);
  if (measured.unit === "unknown") {
    return refuse(
      "unknown-unit",
      `“${text.slice(0, 40)}” has a unit that is not known here. Write lb, tons, kg or tonnes out.`,
    );
  }
  const decimalMark = fileRow.style?.decimalMark ?? "point";
  const read = readNumber(measured.figure, decimalMark);
  if (!read.ok) {
    return read.code === "ambiguous"
      ? refuse(
          "ambiguous",
          `Write the ${limits.what} with a ${decimalMark} for decimals, as in ${decimalMark === "point" ? "1234.5" : "1234,5"}.`,
        )
      : refuse("not-a-number", `The ${limits.what} must be a plain number, without unit or words.`);
  }
  const value = inUnit(read.value, measured.unit ?? fileRow.style?.units.get(column), limits);
  if (typeof value === "string") return refuse("other-unit", value);
  if (value < limits.min) {
    return limits.min === 0
      ? refuse("negative", `The ${limits.what} cannot be below zero.`)
      : refuse("too-small", `The ${limits.what} must be at least ${limits.min}.`);
  }
  if (value > limits.max) {
    return refuse("absurd", `${text} is more than any town could have for the ${limits.what}. Is the unit right?`);
  }
  if (limits.isWhole && !Number.isInteger(value)) {
    return refuse("not-whole", `The ${limits.what} must be a whole number.`);
  }
  return value;
}

/** The figure in the column's unit, or the sentence that says why it cannot be. */
function inUnit(value: number, from: MeasureUnit | undefined, { unit, what, lbPerCubicYard }: Limits): number | string {
  if (unit === undefined || from === undefined || from === unit) return value;
  if (dimensionOf(from) !== dimensionOf(unit)) return `The ${what} cannot be in ${unitWords[from]}.`;
  if (from === "cubic-yard" && typeof lbPerCubicYard !== "number") return `The ${what} cannot be in cubic yards.`;
  return convertMeasure(value, from, unit, lbPerCubicYard ?? null);
}
