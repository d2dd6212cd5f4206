import { townActor } from "#app/context.ts";
import { csvResponse } from "#app/lib/download.server.ts";
import { notFound } from "#app/lib/errors.ts";
import { uploadTemplateCsv } from "#app/services/uploads/files.server.ts";
import { isUploadKind } from "#app/services/uploads/kinds.server.ts";
import type { Route } from "./+types/upload-template";

/** A template to fill in, with example rows to write over. */
export async function loader({ context, params }: Route.LoaderArgs) {
  if (!isUploadKind(params.kind)) throw notFound("template");
  return csvResponse(
    `commonweigh-${params.kind}-template.csv`,
    await uploadTemplateCsv(townActor(context), params.kind),
  );
}
