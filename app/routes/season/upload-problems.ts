import { townActor } from "#app/context.ts";
import { streamedResponse } from "#app/lib/download.server.ts";
import { idParam } from "#app/lib/params.ts";
import { rejectedRowsCsv } from "#app/services/uploads/files.server.ts";
import type { Route } from "./+types/upload-problems";

/** The rows of a file that are not ready, with the reasons, to put right in a spreadsheet. */
export async function loader({ context, params }: Route.LoaderArgs) {
  const uploadId = idParam(params.uploadId, "upload");
  const pieces = await rejectedRowsCsv(townActor(context), uploadId);
  const fileName = `upload-${uploadId}-rows-to-look-at.csv`;
  return streamedResponse({ fileName, contentType: "text/csv; charset=utf-8", pieces });
}
