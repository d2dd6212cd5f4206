import { QueryTypes } from "sequelize";
import type { TownActor } from "#app/context.ts";
import { db } from "#app/lib/db.server.ts";
import { notFound } from "#app/lib/errors.ts";
import { Truck } from "#app/models/truck.server.ts";
import { Upload, type UploadKind, type UploadState } from "#app/models/upload.server.ts";
import { stormKinds, stormKindWords } from "#app/domain/season/storm-kind.ts";
import { uploadKinds } from "./kinds.server.ts";
import { type NameSort, otherNames, townMaterials } from "./knowledge.server.ts";
import { matchingOf } from "./matching.server.ts";
import { type ProblemGroup, problemGroups } from "./problems.server.ts";
import { readySample, type Sample } from "./ready-sample.server.ts";

/** @throws 404 when the upload is not the town's */
export async function findUpload(actor: TownActor, uploadId: number): Promise<Upload> {
  const upload = await Upload.findOne({ where: { id: uploadId, townId: actor.townId } });
  if (!upload) throw notFound("upload");
  return upload;
}

export type UploadCounts = {
  total: number | null;
  read: number;
  ok: number;
  check: number;
  error: number;
  leftOut: number;
};
export type Choice = { value: string; label: string };
/** A file whose rows gave way, or will. */
export type Overlap = { uploadId: number; fileName: string; rowCount: number };

export type UploadView = {
  id: number;
  kind: UploadKind;
  kindLabel: string;
  things: { one: string; many: string };
  home: { to: string; words: string };
  fileName: string;
  byteCount: number;
  createdAt: string;
  settledAt: string | null;
  state: UploadState;
  failure: string | null;
  counts: UploadCounts;
  accepted: { rowCount: number; firstDay: string | null; lastDay: string | null } | null;
  canLeaveOut: boolean;
  hasColumns: boolean;
  groups: ProblemGroup[];
  /** What each sort of name can be said to mean. */
  choices: Record<NameSort, Choice[]>;
  /** Names that were explained in this file. */
  settledNames: { sort: NameSort; name: string; meaning: string }[];
  sample: Sample | null;
  /** Earlier files with rows between this one's first and last day. */
  overlaps: Overlap[];
  replaced: Overlap[];
  replacedBy: Overlap[];
};

async function choicesOf(actor: TownActor): Promise<Record<NameSort, Choice[]>> {
  const [trucks, materials] = await Promise.all([
    Truck.findAll({
      attributes: ["id", "unitNumber"],
      where: { townId: actor.townId },
      order: [["unitNumber", "ASC"]],
    }),
    townMaterials(actor),
  ]);
  return {
    truck: trucks.map(({ id, unitNumber }) => ({ value: String(id), label: `Truck ${unitNumber}` })),
    material: materials.map(({ id, name }) => ({ value: String(id), label: name })),
    "storm-kind": stormKinds.map((kind) => ({ value: kind, label: stormKindWords[kind] })),
  };
}

async function replacements(uploadId: number, side: "replaced" | "replacedBy"): Promise<Overlap[]> {
  const [own, other] = side === "replaced" ? ["upload_id", "replaced_upload_id"] : ["replaced_upload_id", "upload_id"];
  return db.query<Overlap>(
    `SELECT u.id AS uploadId, u.file_name AS fileName, r.row_count AS rowCount FROM upload_replacement r
       JOIN upload u ON u.id = r.${other} WHERE r.${own} = ? ORDER BY u.id`,
    { type: QueryTypes.SELECT, replacements: [uploadId] },
  );
}

/** Earlier files that would give way. */
async function overlapsOf(actor: TownActor, upload: Upload, sample: Sample | null): Promise<Overlap[]> {
  if ((upload.kind !== "storms" && upload.kind !== "stock") || !sample?.firstDay || !sample.lastDay) return [];
  const { table, day } =
    upload.kind === "storms" ? { table: "storm", day: "started_at" } : { table: "stock_entry", day: "day" };
  return db.query<Overlap>(
    `SELECT u.id AS uploadId, u.file_name AS fileName, COUNT(*) AS rowCount FROM ${table} s JOIN upload u ON u.id = s.upload_id
      WHERE s.town_id = ? AND s.upload_id <> ? AND s.season_start_year IN (?)
        AND s.${day} >= ? AND s.${day} < DATE_ADD(?, INTERVAL 1 DAY)
      GROUP BY u.id, u.file_name ORDER BY u.id`,
    {
      type: QueryTypes.SELECT,
      replacements: [actor.townId, upload.id, sample.seasonStartYears, sample.firstDay, sample.lastDay],
    },
  );
}

/**
 * An upload with what was found in it.
 *
 * @param shownKey - the group of problems of which many rows are wanted
 * @throws 404 when the upload is not the town's
 */
export async function getUpload(actor: TownActor, uploadId: number, shownKey: string | null): Promise<UploadView> {
  const upload = await findUpload(actor, uploadId);
  const kind = uploadKinds[upload.kind];
  const isChecked = upload.state === "checked";
  const matching = matchingOf(upload);
  const [groups, choices, names, sample, replaced, replacedBy] = await Promise.all([
    isChecked ? problemGroups(upload.id, matching, shownKey) : [],
    choicesOf(actor),
    isChecked ? otherNames(actor) : [],
    isChecked ? readySample(upload) : null,
    replacements(upload.id, "replaced"),
    replacements(upload.id, "replacedBy"),
  ]);
  return {
    id: upload.id,
    kind: upload.kind,
    kindLabel: kind.label,
    things: kind.things,
    home: kind.home,
    fileName: upload.fileName,
    byteCount: upload.byteCount,
    createdAt: upload.createdAt.toISOString(),
    settledAt: upload.settledAt?.toISOString() ?? null,
    state: upload.state,
    failure: upload.failure,
    counts: {
      total: upload.rowsTotal,
      read: upload.rowsRead,
      ok: upload.rowsOk,
      check: upload.rowsCheck,
      error: upload.rowsError,
      leftOut: upload.rowsLeftOut,
    },
    accepted:
      upload.state === "accepted"
        ? { rowCount: upload.rowsAccepted ?? 0, firstDay: upload.periodStart, lastDay: upload.periodEnd }
        : null,
    canLeaveOut: kind.canLeaveOut,
    hasColumns: kind.reading.by !== "station",
    groups,
    choices,
    settledNames: names
      .filter(({ uploadId: settledIn }) => settledIn === upload.id)
      .map(({ sort, name, meaning }) => ({ sort, name, meaning })),
    sample,
    overlaps: isChecked ? await overlapsOf(actor, upload, sample) : [],
    replaced,
    replacedBy,
  };
}

export type UploadLine = {
  id: number;
  kindLabel: string;
  fileName: string;
  rowCount: number;
  createdAt: string;
  state: UploadState;
  errorCount: number;
  isReplaced: boolean;
};

/** The town's uploads, newest first, at most 100. */
export async function listUploads(actor: TownActor): Promise<UploadLine[]> {
  const [uploads, replaced] = await Promise.all([
    Upload.findAll({
      attributes: ["id", "kind", "fileName", "rowsRead", "rowsError", "createdAt", "state"],
      where: { townId: actor.townId },
      order: [
        ["createdAt", "DESC"],
        ["id", "DESC"],
      ],
      limit: 100,
    }),
    db.query<{ id: number }>(
      `SELECT DISTINCT r.replaced_upload_id AS id FROM upload_replacement r JOIN upload u ON u.id = r.replaced_upload_id
        WHERE u.town_id = ?`,
      { type: QueryTypes.SELECT, replacements: [actor.townId] },
    ),
  ]);
  const replacedIds = new Set(replaced.map(({ id }) => id));
  return uploads.map((upload) => ({
    id: upload.id,
    kindLabel: uploadKinds[upload.kind].label,
    fileName: upload.fileName,
    rowCount: upload.rowsRead,
    createdAt: upload.createdAt.toISOString(),
    state: upload.state,
    errorCount: upload.rowsError,
    isReplaced: replacedIds.has(upload.id),
  }));
}
