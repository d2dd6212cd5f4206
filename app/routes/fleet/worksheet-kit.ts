import { z } from "zod";
import { townActor } from "#app/context.ts";
import { findWorksheetCopy, yardKit } from "#app/services/worksheets/kit.server.ts";
import type { Route } from "./+types/worksheet-kit";

/** What a phone takes along into the yard, with the server's copy of the worksheet it has open. */
export async function loader({ context, url }: Route.LoaderArgs) {
  const actor = townActor(context);
  const clientRef = z.uuid().safeParse(url.searchParams.get("worksheet"));
  const [kit, copy] = await Promise.all([
    yardKit(actor),
    clientRef.success ? findWorksheetCopy(actor, clientRef.data) : null,
  ]);
  return Response.json({ kit, copy });
}
