import { QueryTypes } from "sequelize";
import { z } from "zod";
import type { TownActor } from "#app/context.ts";
import { writeCsv } from "#app/lib/csv.server.ts";
import { db } from "#app/lib/db.server.ts";
import type { UploadKind } from "#app/models/upload.server.ts";
import { uploadKinds } from "./kinds.server.ts";
import { matchingOf } from "./matching.server.ts";
import { findUpload } from "./read.server.ts";
import { storedPieces } from "./stored-file.server.ts";

const Cells = z.array(z.union([z.string(), z.number()]));
const rowsAtATime = 1000;

/** The file as it came. @throws 404 when the upload is not the town's */
export async function originalFile(actor: TownActor, uploadId: number) {
  const upload = await findUpload(actor, uploadId);
  return { fileName: upload.fileName, format: upload.format, pieces: storedPieces(upload.id) };
}

async function rowsWithProblems(uploadId: number, after: number) {
  return db.query<{ sheetRow: number; state: string; cells: string | null; reasons: string | null }>(
    `SELECT r.sheet_row AS sheetRow, r.state, r.cells,
            (SELECT GROUP_CONCAT(CONCAT(IF(p.field = '', '', CONCAT(p.field, ': ')), p.message) ORDER BY p.position SEPARATOR ' ')
               FROM upload_problem p WHERE p.upload_id = r.upload_id AND p.sheet_row = r.sheet_row) AS reasons
       FROM upload_row r WHERE r.upload_id = ? AND r.sheet_row > ? AND r.state IN ('error', 'left-out', 'check')
      ORDER BY r.sheet_row LIMIT ${rowsAtATime}`,
    { type: QueryTypes.SELECT, replacements: [uploadId, after] },
  );
}

const stateWords: Record<string, string> = { error: "not taken", check: "to look at", "left-out": "left out" };

/**
 * The rows that are not ready as they stand, with the file's own columns and why: to be put right in a spreadsheet and
 * uploaded again.
 *
 * @returns pieces of a CSV file, so that however many rows there are, few are in memory
 * @throws 404 when the upload is not the town's
 */
export async function rejectedRowsCsv(actor: TownActor, uploadId: number): Promise<AsyncGenerator<string>> {
  const upload = await findUpload(actor, uploadId);
  const matching = matchingOf(upload);
  const heads = matching?.columns.map(({ head }) => head) ?? [];
  const headByField = new Map(matching?.columns.map(({ field, head }) => [field ?? "", head]));
  async function* lines() {
    const problems = await db.query<{ sheetRow: number; field: string; value: string | null; message: string }>(
      `SELECT sheet_row AS sheetRow, field, value, message FROM upload_problem
        WHERE upload_id = ? ORDER BY sheet_row, position`,
      { type: QueryTypes.SELECT, replacements: [upload.id] },
    );
    yield writeCsv(
      ["row_in_file", "column", "your_file_says", "reason"],
      problems.map(({ sheetRow, field, value, message }) => [sheetRow === 0 ? null : sheetRow, field, value, message]),
    );
  }
  async function* pieces() {
    yield writeCsv(["row_in_file", "state", "reason", ...heads], []);
    let after = 0;
    for (;;) {
      const rows = await rowsWithProblems(upload.id, after);
      const last = rows.at(-1);
      if (!last) return;
      after = last.sheetRow;
      const lines = rows.map(({ sheetRow, state, cells, reasons }) => {
        const reason = (reasons ?? "").replace(/(^| )([\w:]+): /g, (whole, before: string, field: string) => {
          const head = headByField.get(field);
          return head === undefined ? whole : `${before}${head}: `;
        });
        const texts = Cells.parse(JSON.parse(cells ?? "[]"));
        return [sheetRow, stateWords[state] ?? state, reason, ...heads.map((_, index) => texts[index] ?? "")];
      });
      const [first = [], ...others] = lines;
      yield writeCsv(first.map(String), others);
    }
  }
  // Without columns to match a row is not a thing of its own: the problems alone are told.
  return matching === null ? lines() : pieces();
}

/** The empty file of a kind, with example rows to write over. */
export async function uploadTemplateCsv(actor: TownActor, kind: UploadKind): Promise<string> {
  const { heads, example } = await uploadKinds[kind].template(actor);
  return writeCsv(heads, example);
}
