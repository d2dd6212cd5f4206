import { redirect } from "react-router";
import { notFound } from "#app/lib/errors.ts";
import { workingSeason } from "#app/services/season-figures.server.ts";

/** The season that is asked for now. */
export async function loader() {
  const seasonStartYear = await workingSeason();
  if (seasonStartYear === null) throw notFound("season: the coordinator opens the first one");
  return redirect(`/season/${seasonStartYear}`);
}
