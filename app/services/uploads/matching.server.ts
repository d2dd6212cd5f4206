import { z } from "zod";
import { measureUnits } from "#app/domain/upload/measure.ts";
import type { Upload } from "#app/models/upload.server.ts";

/** What is settled about a file before its rows are read. */
export const Matching = z.object({
  /** Visible sheets of a workbook; none of a CSV file. */
  sheetNames: z.array(z.string()),
  sheetName: z.string().nullable(),
  /** The row that holds the heads, as a spreadsheet counts. */
  headRow: z.number().int(),
  columns: z.array(
    z.object({
      index: z.number().int(),
      head: z.string(),
      field: z.string().nullable(),
      unit: z.enum(measureUnits).nullable(),
      isCertain: z.boolean(),
    }),
  ),
  decimalMark: z.enum(["point", "comma"]),
  isDecimalMarkCertain: z.boolean(),
  dateOrder: z.enum(["month-first", "day-first"]),
  isDateOrderCertain: z.boolean(),
  /** The first rows under the heads, shortened. */
  samples: z.array(z.object({ row: z.number(), cells: z.array(z.string()) })),
});
export type Matching = z.infer<typeof Matching>;

/** How a file is matched, or null when that is not settled yet. */
export function matchingOf(upload: Upload): Matching | null {
  return upload.matching === null || upload.matching === undefined ? null : Matching.parse(upload.matching);
}
