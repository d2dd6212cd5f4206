import { csvResponse } from "#app/lib/download.server.ts";
import { notFound } from "#app/lib/errors.ts";
import { isUploadKind } from "#app/services/uploads/kinds.server.ts";
import { uploadTemplateCsv } from "#app/services/uploads/read.server.ts";
import type { Route } from "./+types/upload-template";

/** A template to fill in, with example rows to write over. */
export function loader({ params }: Route.LoaderArgs) {
  if (!isUploadKind(params.kind)) throw notFound("template");
  return csvResponse(`commonweigh-${params.kind}-template.csv`, uploadTemplateCsv(params.kind));
}
