import type { TownActor } from "#app/context.ts";
import { missingFields, type UploadField } from "#app/domain/upload/field.ts";
import { notFound } from "#app/lib/errors.ts";
import { uploadKinds } from "./kinds.server.ts";
import { type Matching, matchingOf } from "./matching.server.ts";
import { findUpload } from "./read.server.ts";

export type ColumnsView = {
  id: number;
  fileName: string;
  kindLabel: string;
  /** Whether the columns can still be changed. */
  isOpen: boolean;
  fields: readonly UploadField[];
  columns: Matching["columns"];
  samples: Matching["samples"];
  /** Needed fields that no column is taken for. */
  missing: string[];
  sheetNames: string[];
  sheetName: string | null;
  headRow: number;
  /** Rows in which the heads could stand. */
  headRows: number[];
  decimalMark: { value: Matching["decimalMark"]; isCertain: boolean };
  dateOrder: { value: Matching["dateOrder"]; isCertain: boolean };
  hasCubicYards: boolean;
};

/** What the columns of an upload are taken for. @throws 404 when it is not the town's, or its columns need no matching */
export async function getColumns(actor: TownActor, uploadId: number): Promise<ColumnsView> {
  const upload = await findUpload(actor, uploadId);
  const kind = uploadKinds[upload.kind];
  const matching = matchingOf(upload);
  if (matching === null) throw notFound("upload with columns to match");
  const fields = await kind.fields(actor);
  const matched = new Set(matching.columns.flatMap(({ field }) => field ?? []));
  const before = Array.from({ length: Math.min(matching.headRow, 20) }, (_, place) => place + 1);
  const after = matching.samples.slice(0, 3).map(({ row }) => row);
  return {
    id: upload.id,
    fileName: upload.fileName,
    kindLabel: kind.label,
    isOpen: ["matching", "checked", "failed"].includes(upload.state),
    fields,
    columns: matching.columns,
    samples: matching.samples,
    missing: missingFields(fields, matched),
    sheetNames: matching.sheetNames,
    sheetName: matching.sheetName,
    headRow: matching.headRow,
    headRows: [...new Set([...before, matching.headRow, ...after])].sort((a, b) => a - b),
    decimalMark: { value: matching.decimalMark, isCertain: matching.isDecimalMarkCertain },
    dateOrder: { value: matching.dateOrder, isCertain: matching.isDateOrderCertain },
    hasCubicYards: fields.some(({ dimensions }) => dimensions?.includes("weight")),
  };
}
