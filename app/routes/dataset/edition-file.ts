import { redirect } from "react-router";
import { personActor } from "#app/context.ts";
import { downloadResponse } from "#app/lib/download.server.ts";
import { forbidden } from "#app/lib/errors.ts";
import { idParam } from "#app/lib/params.ts";
import { getDatasetFile, hasAcceptedTerms } from "#app/services/dataset.server.ts";
import type { Route } from "./+types/edition-file";

/** One file of an edition, for people who accepted the terms. */
export async function loader({ context, params, request }: Route.LoaderArgs) {
  if (request.headers.get("sec-fetch-site") === "cross-site") throw forbidden("Another site asked for this file.");
  if (!(await hasAcceptedTerms(personActor(context)))) return redirect("/dataset");
  return downloadResponse(await getDatasetFile(idParam(params.editionId, "edition"), params.file));
}
