import { townActor } from "#app/context.ts";
import { csvResponse } from "#app/lib/download.server.ts";
import { fleetCsv } from "#app/services/fleet/register.server.ts";
import type { Route } from "./+types/export";

export async function loader({ context }: Route.LoaderArgs) {
  const actor = townActor(context);
  return csvResponse(`trucks-${actor.townName.toLowerCase()}.csv`, await fleetCsv(actor));
}
