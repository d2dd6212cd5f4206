import { open, writeFile } from "node:fs/promises";
import { QueryTypes, type Transaction } from "sequelize";
import { z } from "zod";
import { insertRows } from "#app/lib/bulk.server.ts";
import { csvRows, separatorOf } from "#app/lib/csv.server.ts";
import { db } from "#app/lib/db.server.ts";
import type { SheetRow } from "#app/lib/file-error.ts";
import { temporaryFile } from "#app/lib/temporary-file.server.ts";
import { sheetNames, workbookRows } from "#app/lib/workbook.server.ts";
import type { Upload } from "#app/models/upload.server.ts";

const chunkBytes = 1024 * 1024;
const Encoding = z.enum(["utf-8", "utf-16le", "utf-16be", "windows-1252", "none"]);

/** Keep a file that has arrived, in pieces. @param path - where it lies */
export async function storeFile(uploadId: number, path: string, transaction: Transaction): Promise<void> {
  const file = await open(path);
  const chunk = Buffer.alloc(chunkBytes);
  try {
    for (let position = 0; ; position++) {
      const { bytesRead } = await file.read(chunk, 0, chunkBytes, position * chunkBytes);
      if (bytesRead === 0) return;
      const content = chunk.subarray(0, bytesRead);
      await insertRows("INSERT INTO upload_chunk VALUES (?, ?, ?)", [[uploadId, position, content]], transaction);
    }
  } finally {
    await file.close();
  }
}

/** The bytes of a kept file in order, one piece in memory at a time. */
export async function* storedPieces(uploadId: number): AsyncGenerator<Buffer> {
  for (let position = 0; ; position++) {
    const [chunk] = await db.query<{ content: Buffer }>(
      "SELECT content FROM upload_chunk WHERE upload_id = ? AND position = ?",
      { type: QueryTypes.SELECT, replacements: [uploadId, position] },
    );
    if (!chunk) return;
    yield chunk.content;
  }
}

/** The file put together again, for readers that need to look here and there in it. */
async function withWholeFile(uploadId: number) {
  const file = await temporaryFile();
  try {
    await writeFile(file.path, storedPieces(uploadId), { flag: "wx", mode: 0o600 });
    return file;
  } catch (error) {
    await file.remove();
    throw error;
  }
}

/**
 * The rows of a kept file, blank ones passed over.
 *
 * @param sheetName - of a workbook; its first visible sheet when null
 * @throws FileError when the file as a whole cannot be read
 */
export async function* storedRows(upload: Upload, sheetName: string | null): AsyncGenerator<SheetRow[]> {
  if (upload.format === "csv") {
    yield* csvRows(storedPieces(upload.id), Encoding.parse(upload.encoding));
    return;
  }
  const file = await withWholeFile(upload.id);
  try {
    yield* workbookRows(file.path, sheetName);
  } finally {
    await file.remove();
  }
}

/** The visible sheets of a kept workbook; none of a CSV file. @throws FileError as storedRows */
export async function storedSheetNames(upload: Upload): Promise<string[]> {
  if (upload.format === "csv") return [];
  const file = await withWholeFile(upload.id);
  try {
    return await sheetNames(file.path);
  } finally {
    await file.remove();
  }
}

/** The separator between a CSV file's columns; a comma for a workbook, whose cells are apart by themselves. */
export async function storedSeparator(upload: Upload): Promise<string> {
  const encoding = Encoding.parse(upload.encoding);
  if (upload.format !== "csv" || encoding === "none") return ",";
  for await (const piece of storedPieces(upload.id)) {
    return separatorOf(new TextDecoder(encoding).decode(piece.subarray(0, 65_536)));
  }
  return ",";
}
