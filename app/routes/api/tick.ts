import { actorContext } from "#app/context.ts";
import { tick } from "#app/services/tick.server.ts";
import type { Route } from "./+types/tick";

/** The worker's knock: do what is due. */
export async function action({ context }: Route.ActionArgs) {
  const actor = context.get(actorContext);
  if (actor.kind !== "worker") throw new Error("Only the worker may knock here.");
  return Response.json(await tick(actor));
}
