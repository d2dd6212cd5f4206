import { z } from "zod";
import type { TownActor } from "#app/context.ts";
import type { FileProblem } from "#app/domain/file-problem.ts";
import { writeCsv } from "#app/lib/csv.server.ts";
import { notFound } from "#app/lib/errors.ts";
import { Upload, type UploadKind } from "#app/models/upload.server.ts";
import { StagedCalibrations, StagedSeasons, StagedTrucks, uploadKinds } from "./kinds.server.ts";

const Problems = z.array(
  z.object({
    row: z.number().nullable(),
    column: z.string().nullable(),
    value: z.string().nullable(),
    code: z.string(),
    severity: z.enum(["error", "check"]),
    message: z.string(),
  }),
) satisfies z.ZodType<FileProblem[]>;

/** What the checks found, as it was kept. */
export function storedProblems(upload: Upload): FileProblem[] {
  return Problems.parse(upload.problems);
}

export type UploadView = {
  id: number;
  kind: UploadKind;
  fileName: string;
  rowCount: number;
  createdAt: string;
  state: Upload["state"];
  problems: FileProblem[];
  seasons: z.infer<typeof StagedSeasons>;
  calibrations: z.infer<typeof StagedCalibrations>;
  trucks: z.infer<typeof StagedTrucks>;
};

async function findUpload(actor: TownActor, uploadId: number) {
  const upload = await Upload.findOne({
    attributes: { exclude: ["content"] },
    where: { id: uploadId, townId: actor.townId },
  });
  if (!upload) throw notFound("upload");
  return upload;
}

/** @throws 404 when the upload is not the town's */
export async function getUpload(actor: TownActor, uploadId: number): Promise<UploadView> {
  const upload = await findUpload(actor, uploadId);
  return {
    id: upload.id,
    kind: upload.kind,
    fileName: upload.fileName,
    rowCount: upload.rowCount,
    createdAt: upload.createdAt.toISOString(),
    state: upload.state,
    problems: storedProblems(upload),
    seasons: upload.kind === "season-figures" ? StagedSeasons.parse(upload.staged) : [],
    calibrations: upload.kind === "calibrations" ? StagedCalibrations.parse(upload.staged) : [],
    trucks: upload.kind === "trucks" ? StagedTrucks.parse(upload.staged) : [],
  };
}

export type UploadLine = {
  id: number;
  kind: UploadKind;
  fileName: string;
  rowCount: number;
  createdAt: string;
  state: Upload["state"];
  errorCount: number;
};

/** The town's uploads, newest first, at most 100. */
export async function listUploads(actor: TownActor): Promise<UploadLine[]> {
  const uploads = await Upload.findAll({
    attributes: ["id", "kind", "fileName", "rowCount", "createdAt", "state", "problems"],
    where: { townId: actor.townId },
    order: [["id", "DESC"]],
    limit: 100,
  });
  return uploads.map((upload) => ({
    id: upload.id,
    kind: upload.kind,
    fileName: upload.fileName,
    rowCount: upload.rowCount,
    createdAt: upload.createdAt.toISOString(),
    state: upload.state,
    errorCount: storedProblems(upload).filter((problem) => problem.severity === "error").length,
  }));
}

/** What is wrong with a file, as CSV: row, column, what it says, and what to do. @throws 404 as getUpload */
export async function uploadProblemsCsv(actor: TownActor, uploadId: number): Promise<string> {
  const upload = await findUpload(actor, uploadId);
  const rows = storedProblems(upload).map(({ row, column, value, severity, message }) => [
    row,
    column,
    value,
    severity,
    message,
  ]);
  return writeCsv(["row", "column", "your_file_says", "kind", "what_to_do"], rows);
}

/** The empty file of a kind, with example rows to write over. */
export function uploadTemplateCsv(kind: UploadKind): string {
  return writeCsv(uploadKinds[kind].columns, uploadKinds[kind].example);
}
