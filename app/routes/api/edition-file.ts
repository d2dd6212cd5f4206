import { personActor } from "#app/context.ts";
import { downloadResponse } from "#app/lib/download.server.ts";
import { forbidden } from "#app/lib/errors.ts";
import { idParam } from "#app/lib/params.ts";
import { getDatasetFile, hasAcceptedTerms } from "#app/services/dataset.server.ts";
import type { Route } from "./+types/edition-file";

/** One file of an edition, for programs. The same bytes as by hand. */
export async function loader({ context, params }: Route.LoaderArgs) {
  if (!(await hasAcceptedTerms(personActor(context))))
    throw forbidden("Accept the terms of use on the Dataset page first.");
  return downloadResponse(await getDatasetFile(idParam(params.editionId, "edition"), params.file));
}
