import { QueryTypes } from "sequelize";
import { z } from "zod";
import { db } from "#app/lib/db.server.ts";
import type { Matching } from "./matching.server.ts";
import type { NameSort } from "./knowledge.server.ts";

export type ProblemRow = {
  /** As a spreadsheet counts; 0 for the file as a whole. */
  sheetRow: number;
  /** What stands in the cell now, after what has been answered. */
  value: string | null;
  message: string;
  /** Cells that tell which row it is. */
  context: string[];
  /** The cell that is to be put right, "" when it is none in particular. */
  field: string;
  columnName: string | null;
};

/** Problems of one sort, so that one look, or one answer, settles many rows. */
export type ProblemGroup = {
  /** Names the group in addresses and forms. */
  key: string;
  code: string;
  field: string;
  /** The column's head in the file, or the field's name where the file has none. */
  columnName: string | null;
  severity: "error" | "check";
  rowCount: number;
  /** The sentence, when it is the same for all rows. */
  message: string | null;
  /** Set where a name is to be explained: the different names, with how many rows have each. */
  names: { sort: NameSort; values: { value: string; rowCount: number }[] } | null;
  contextHeads: string[];
  rows: ProblemRow[];
};

const sortOfCode: Record<string, NameSort> = {
  "unknown-truck": "truck",
  "unknown-material": "material",
  "unknown-kind": "storm-kind",
};
const contextFields = ["started_on", "day", "season", "tested_on", "truck", "material", "kind", "route"];
/** A file with more different names than this has one cause, not hundreds. */
const mostNames = 60;
const rowsShown = { few: 4, many: 200 };
const Cells = z.array(z.union([z.string(), z.number()]));

/** Names a group. */
export function groupKey(code: string, field: string): string {
  return field === "" ? code : `${code}--${field.replace(":", "-")}`;
}

type Found = {
  code: string;
  field: string;
  severity: "error" | "check";
  rowCount: number;
  messages: number;
  message: string;
};

async function namesIn(uploadId: number, { code, field }: Found) {
  return db.query<{ value: string; rowCount: number }>(
    `SELECT value, COUNT(*) AS rowCount FROM upload_problem WHERE upload_id = ? AND code = ? AND field = ? AND value IS NOT NULL
      GROUP BY value ORDER BY rowCount DESC, value LIMIT ${mostNames}`,
    { type: QueryTypes.SELECT, replacements: [uploadId, code, field] },
  );
}

function nameOf(field: string, matching: Matching | null) {
  return field === "" ? null : (matching?.columns.find((column) => column.field === field)?.head ?? field);
}

async function rowsIn(uploadId: number, { code, field }: Found, matching: Matching | null, limit: number) {
  const rows = await db.query<{ sheetRow: number; value: string | null; message: string; cells: string | null }>(
    `SELECT p.sheet_row AS sheetRow, p.value, p.message, r.cells FROM upload_problem p
       LEFT JOIN upload_row r ON r.upload_id = p.upload_id AND r.sheet_row = p.sheet_row
      WHERE p.upload_id = ? AND p.code = ? AND p.field = ? ORDER BY p.sheet_row, p.position LIMIT ${limit}`,
    { type: QueryTypes.SELECT, replacements: [uploadId, code, field] },
  );
  const context = contextFields
    .filter((key) => key !== field)
    .flatMap((key) => matching?.columns.find((column) => column.field === key) ?? [])
    .slice(0, 3);
  return {
    contextHeads: context.map(({ head }) => head),
    rows: rows.map(({ sheetRow, value, message, cells }) => {
      const texts = Cells.parse(JSON.parse(cells ?? "[]"));
      return {
        sheetRow,
        value,
        message,
        context: context.map(({ index }) => String(texts[index] ?? "").slice(0, 40)),
        field,
        columnName: nameOf(field, matching),
      };
    }),
  };
}

/**
 * What was found in a checked file: errors first, then what most rows have.
 *
 * @param shownKey - the group of which many rows are wanted, not a few
 */
export async function problemGroups(
  uploadId: number,
  matching: Matching | null,
  shownKey: string | null,
): Promise<ProblemGroup[]> {
  const found = await db.query<Found>(
    `SELECT code, field, severity, COUNT(DISTINCT sheet_row) AS rowCount, COUNT(DISTINCT message) AS messages,
            MIN(message) AS message
       FROM upload_problem WHERE upload_id = ? GROUP BY severity, code, field
      ORDER BY severity = 'error' DESC, rowCount DESC, code, field`,
    { type: QueryTypes.SELECT, replacements: [uploadId] },
  );
  return Promise.all(
    found.map(async (group): Promise<ProblemGroup> => {
      const { code, field, severity, rowCount, messages, message } = group;
      const key = groupKey(code, field);
      // A list of names in one cell is put right in the cell.
      const sort = field === "materials" ? undefined : sortOfCode[code];
      const limit = key === shownKey ? rowsShown.many : rowsShown.few;
      const values = sort === undefined ? [] : await namesIn(uploadId, group);
      return {
        key,
        code,
        field,
        columnName: nameOf(field, matching),
        severity,
        rowCount,
        message: messages === 1 ? message : null,
        names: sort === undefined ? null : { sort, values },
        ...(await rowsIn(uploadId, group, matching, limit)),
      };
    }),
  );
}
