import { personActor } from "#app/context.ts";
import { seasonLabel } from "#app/domain/dates.ts";
import { env } from "#app/lib/env.server.ts";
import { forbidden } from "#app/lib/errors.ts";
import { hasAcceptedTerms, listDatasetEditions } from "#app/services/dataset.server.ts";
import type { Route } from "./+types/editions";

/** Every edition with the addresses of its files. */
export async function loader({ context }: Route.LoaderArgs) {
  if (!(await hasAcceptedTerms(personActor(context))))
    throw forbidden("Accept the terms of use on the Dataset page first.");
  const editions = await listDatasetEditions();
  return Response.json({
    editions: editions.map(({ id, seasonStartYear, number, publishedAt, contentSha256, files }) => ({
      id,
      season: seasonLabel(seasonStartYear),
      number,
      publishedAt,
      contentSha256,
      files: files.map((file) => `${env.publicOrigin}/api/v1/editions/${id}/${file}`),
    })),
  });
}
