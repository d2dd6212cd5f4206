import { townActor } from "#app/context.ts";
import { forbidden, notFound } from "#app/lib/errors.ts";
import { receiveWorksheet } from "#app/services/worksheets/sync.server.ts";
import { SyncRequest } from "#app/services/worksheets/sheet-schema.server.ts";
import type { Route } from "./+types/worksheet-sync";

const mostBytes = 200_000;

export function loader() {
  throw notFound("page");
}

/** Takes one worksheet from a phone. */
export async function action({ context, request }: Route.ActionArgs) {
  if (Number(request.headers.get("content-length") ?? Number.POSITIVE_INFINITY) > mostBytes) {
    return Response.json({ outcome: "refused", message: "This worksheet is too large to be one." }, { status: 413 });
  }
  const parsed = SyncRequest.safeParse(await request.json().catch(() => null));
  if (!parsed.success) {
    return Response.json(
      { outcome: "refused", message: "This is not a worksheet as this page sends it." },
      { status: 400 },
    );
  }
  const actor = townActor(context);
  if (parsed.data.owner !== `${actor.userId}:${actor.townId}`) {
    throw forbidden("This worksheet is another person’s. It stays on the phone until that person signs in.");
  }
  const { status, body } = await receiveWorksheet(actor, parsed.data);
  return Response.json(body, { status });
}
