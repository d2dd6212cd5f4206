import { townActor } from "#app/context.ts";
import { streamedResponse } from "#app/lib/download.server.ts";
import { idParam } from "#app/lib/params.ts";
import { originalFile } from "#app/services/uploads/files.server.ts";
import type { Route } from "./+types/upload-file";

/** A file as it came. */
export async function loader({ context, params }: Route.LoaderArgs) {
  const { fileName, pieces } = await originalFile(townActor(context), idParam(params.uploadId, "upload"));
  // Its type is not told, so that no browser shows what somebody has sent.
  return streamedResponse({ fileName, contentType: "application/octet-stream", pieces });
}
