import { townActor } from "#app/context.ts";
import { csvResponse } from "#app/lib/download.server.ts";
import { idParam } from "#app/lib/params.ts";
import { uploadProblemsCsv } from "#app/services/uploads/read.server.ts";
import type { Route } from "./+types/upload-problems";

/** What is wrong with a file, to put right beside it. */
export async function loader({ context, params }: Route.LoaderArgs) {
  const uploadId = idParam(params.uploadId, "upload");
  return csvResponse(`upload-${uploadId}-problems.csv`, await uploadProblemsCsv(townActor(context), uploadId));
}
