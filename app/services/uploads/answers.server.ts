import { QueryTypes, type Transaction } from "sequelize";
import { z } from "zod";
import type { TownActor } from "#app/context.ts";
import type { FileProblem } from "#app/domain/file-problem.ts";
import { stormKinds } from "#app/domain/season/storm-kind.ts";
import { db, inTransaction } from "#app/lib/db.server.ts";
import { conflict, notFound } from "#app/lib/errors.ts";
import { Material } from "#app/models/material.server.ts";
import { Truck } from "#app/models/truck.server.ts";
import { Upload } from "#app/models/upload.server.ts";
import { recordAudit } from "../audit.server.ts";
import { lookedAt } from "./check-step.server.ts";
import { uploadHandlers } from "./handlers.server.ts";
import { uploadKinds } from "./kinds.server.ts";
import type { NameSort } from "./knowledge.server.ts";
import { matchingOf } from "./matching.server.ts";
import { fileRows } from "./rows.server.ts";
import { answersOf, keepRows } from "./staging.server.ts";
import { queueStep, startNow } from "./steps.server.ts";

/** A kind of problem on the page: its code and its field, "" for the row as a whole. */
export type ProblemKind = { code: string; field: string };

export type Answer =
  | { type: "names"; sort: NameSort; names: readonly { name: string; meaning: string }[]; kind: ProblemKind }
  | { type: "cells"; cells: readonly { sheetRow: number; field: string; text: string }[] }
  | { type: "as-pounds" | "stands" | "left-out"; kind: ProblemKind }
  | { type: "bring-back" };

/** More rows than this are looked at by the worker, from the file. */
const rowsAtOnce = 3000;
const Cells = z.array(z.union([z.string(), z.number()]));

async function rowsOfKind({ code, field }: ProblemKind, uploadId: number, transaction: Transaction) {
  const rows = await db.query<{ sheetRow: number }>(
    "SELECT DISTINCT sheet_row AS sheetRow FROM upload_problem WHERE upload_id = ? AND code = ? AND field = ?",
    { type: QueryTypes.SELECT, replacements: [uploadId, code, field], transaction },
  );
  return rows.map(({ sheetRow }) => sheetRow);
}

async function write(sql: string, replacements: (string | number | null)[], transaction: Transaction) {
  await db.query(sql, { type: QueryTypes.INSERT, replacements, transaction });
}

/** What a name may mean: a truck or material of this town, or a kind of storm. */
async function assertMeanings(actor: TownActor, { sort, names }: Answer & { type: "names" }, transaction: Transaction) {
  const where = { townId: actor.townId };
  const own =
    sort === "storm-kind"
      ? stormKinds
      : sort === "truck"
        ? (await Truck.findAll({ attributes: ["id"], where, transaction })).map(({ id }) => String(id))
        : (await Material.findAll({ attributes: ["id"], where, transaction })).map(({ id }) => String(id));
  const isOwn = (meaning: string) => own.some((known) => known === meaning);
  if (!names.every(({ meaning }) => isOwn(meaning))) throw notFound(sort === "storm-kind" ? "kind of storm" : sort);
}

async function keepNames(
  actor: TownActor,
  uploadId: number,
  answer: Answer & { type: "names" },
  transaction: Transaction,
) {
  await assertMeanings(actor, answer, transaction);
  for (const { name, meaning } of answer.names) {
    await write(
      `INSERT INTO other_name (town_id, sort, name, meaning, upload_id) VALUES (?, ?, ?, ?, ?)
        ON DUPLICATE KEY UPDATE meaning = VALUES(meaning), upload_id = VALUES(upload_id)`,
      [actor.townId, answer.sort, name.toLowerCase(), meaning, uploadId],
      transaction,
    );
  }
  return rowsOfKind(answer.kind, uploadId, transaction);
}

/** Write down what was answered. @returns the rows that have to be looked at again */
async function keepAnswer(
  actor: TownActor,
  uploadId: number,
  answer: Answer,
  transaction: Transaction,
): Promise<number[]> {
  switch (answer.type) {
    case "names":
      return keepNames(actor, uploadId, answer, transaction);
    case "cells":
      for (const { sheetRow, field, text } of answer.cells) {
        await write("REPLACE INTO upload_answer VALUES (?, ?, ?, ?)", [uploadId, sheetRow, field, text], transaction);
      }
      return [...new Set(answer.cells.map(({ sheetRow }) => sheetRow))];
    case "as-pounds":
    case "stands":
    case "left-out": {
      const { code, field } = answer.kind;
      const rows = await rowsOfKind(answer.kind, uploadId, transaction);
      const subject = { "as-pounds": field, stands: `stands:${code}`, "left-out": "left-out" }[answer.type];
      const text = answer.type === "as-pounds" ? "CONCAT(COALESCE(value, ''), ' lb')" : "''";
      await write(
        `REPLACE INTO upload_answer SELECT upload_id, sheet_row, ?, MAX(${text}) FROM upload_problem
          WHERE upload_id = ? AND code = ? AND field = ? GROUP BY upload_id, sheet_row`,
        [subject, uploadId, code, field],
        transaction,
      );
      return rows;
    }
    case "bring-back": {
      const rows = await db.query<{ sheetRow: number }>(
        "SELECT sheet_row AS sheetRow FROM upload_answer WHERE upload_id = ? AND subject = 'left-out'",
        { type: QueryTypes.SELECT, replacements: [uploadId], transaction },
      );
      await db.query("DELETE FROM upload_answer WHERE upload_id = ? AND subject = 'left-out'", {
        type: QueryTypes.DELETE,
        replacements: [uploadId],
        transaction,
      });
      return rows.map(({ sheetRow }) => sheetRow);
    }
  }
}

/** What only a look at the whole file finds is carried over when single rows are looked at again. */
async function earlierTwins(uploadId: number, rows: readonly number[], transaction: Transaction) {
  const twins = await db.query<{ sheetRow: number; message: string }>(
    "SELECT sheet_row AS sheetRow, message FROM upload_problem WHERE upload_id = ? AND code = 'twice' AND sheet_row IN (?)",
    { type: QueryTypes.SELECT, replacements: [uploadId, rows], transaction },
  );
  return new Map(
    twins.map(({ sheetRow, message }): [number, FileProblem] => [
      sheetRow,
      { row: sheetRow, column: null, value: null, code: "twice", severity: "check", message },
    ]),
  );
}

/** Look at some rows again. @returns false when the whole file has to be looked at */
async function lookAgain(
  actor: TownActor,
  upload: Upload,
  rows: readonly number[],
  transaction: Transaction,
): Promise<boolean> {
  const { reading } = uploadKinds[upload.kind];
  const matching = matchingOf(upload);
  if (rows.length === 0) return true;
  if (reading.by !== "row" || matching === null || rows.length > rowsAtOnce || rows.includes(0)) return false;
  const [read, answers, twins, kept] = await Promise.all([
    reading.reader(actor, transaction),
    answersOf(upload.id, transaction),
    earlierTwins(upload.id, rows, transaction),
    db.query<{ sheetRow: number; cells: string | null }>(
      "SELECT sheet_row AS sheetRow, cells FROM upload_row WHERE upload_id = ? AND sheet_row IN (?) ORDER BY sheet_row",
      { type: QueryTypes.SELECT, replacements: [upload.id, rows], transaction },
    ),
  ]);
  if (kept.some(({ cells }) => cells === null)) return false;
  const toFileRow = fileRows(matching);
  const lookedAtRows = kept.map(({ sheetRow, cells }) => {
    const ownCells = Cells.parse(JSON.parse(cells ?? "[]"));
    const own = answers.get(sheetRow);
    const outcome = read(toFileRow({ row: sheetRow, cells: ownCells }, own));
    const twin = twins.get(sheetRow);
    const problems = twin ? [...outcome.problems, twin] : outcome.problems;
    // Kept with its cells even when it is ready now, so that it can be looked at once more.
    return { ...lookedAt(sheetRow, ownCells, { ...outcome, problems }, own ?? new Map()), cells: ownCells };
  });
  for (const table of ["upload_problem", "upload_row"]) {
    await db.query(`DELETE FROM ${table} WHERE upload_id = ? AND sheet_row IN (?)`, {
      type: QueryTypes.DELETE,
      replacements: [upload.id, rows],
      transaction,
    });
  }
  await keepRows(upload.id, lookedAtRows, transaction);
  await recount(upload, transaction);
  return true;
}

async function recount(upload: Upload, transaction: Transaction) {
  const counts = await db.query<{ state: string; count: number }>(
    "SELECT state, COUNT(*) AS count FROM upload_row WHERE upload_id = ? GROUP BY state",
    { type: QueryTypes.SELECT, replacements: [upload.id], transaction },
  );
  const countOf = (state: string) => counts.find((entry) => entry.state === state)?.count ?? 0;
  await upload.update(
    {
      rowsOk: countOf("ok"),
      rowsCheck: countOf("check"),
      rowsError: countOf("error"),
      rowsLeftOut: countOf("left-out"),
      failure: null,
    },
    { transaction },
  );
}

/**
 * Take an answer about a checked file, and look at the rows it concerns again.
 *
 * @throws 404 when the upload is not the town's; 409 when it is not waiting for answers
 */
export async function answerUpload(actor: TownActor, uploadId: number, answer: Answer): Promise<void> {
  const dedupeKey = await inTransaction(async (transaction) => {
    const where = { id: uploadId, townId: actor.townId };
    // Without the lock first: while a file is taken in, its row is locked for as long as that takes.
    const now = await Upload.findOne({ attributes: ["state"], where, transaction });
    if (!now) throw notFound("upload");
    if (now.state !== "checked") throw notWaiting();
    const upload = await Upload.findOne({ where, lock: transaction.LOCK.UPDATE, transaction, rejectOnEmpty: true });
    if (upload.state !== "checked") throw notWaiting();
    if (answer.type === "cells") {
      const fields = new Set(matchingOf(upload)?.columns.map(({ field }) => field));
      if (!answer.cells.every(({ field }) => fields.has(field))) throw notFound("column");
    }
    const rows = await keepAnswer(actor, uploadId, answer, transaction);
    const detail = { type: answer.type, rowCount: rows.length };
    await recordAudit(actor, { action: "upload.answer", entity: "upload", entityId: uploadId, detail }, transaction);
    const isDone = await lookAgain(actor, upload, rows, transaction);
    return isDone ? null : queueStep(actor, upload, "upload-check", transaction);
  });
  if (dedupeKey !== null) await startNow(dedupeKey, uploadHandlers, actor.requestId);
}

function notWaiting() {
  return conflict("This upload has moved on meanwhile, so nothing was changed. Open it again to see where it stands.");
}
