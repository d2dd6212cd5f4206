import { z } from "zod";
import { townActor } from "#app/context.ts";
import { readStormCells } from "#app/domain/season/storm-cells.ts";
import { badRequest } from "#app/lib/errors.ts";
import { seasonParam } from "#app/lib/params.ts";
import { getStormKnowledge, saveStorms, type StormSave } from "#app/services/storms.server.ts";
import type { Route } from "./+types/storms-save";

const Line = z.object({
  ref: z.string().min(1).max(36),
  id: z.number().int().positive().nullable(),
  version: z.number().int().positive().nullable(),
  cells: z.record(z.string().max(40), z.string().max(400)),
});
const Body = z.object({ lines: z.array(Line).min(1).max(500) });

async function readBody(request: Request) {
  const body: unknown = await request.json().catch(() => null);
  const read = Body.safeParse(body);
  if (!read.success) throw badRequest("These lines did not arrive whole. Reload the page, then save them again.");
  return read.data.lines;
}

/** Takes lines of the sheet: good ones are stored, the others come back with what is wrong in each cell. */
export async function action({ context, params, request }: Route.ActionArgs) {
  const actor = townActor(context);
  const seasonStartYear = seasonParam(params.seasonStartYear);
  const lines = await readBody(request);
  const known = await getStormKnowledge(actor, seasonStartYear);
  const readings = lines.map(({ cells, ...line }) => ({ ...line, reading: readStormCells(cells, known) }));
  const wrong = readings.flatMap(({ ref, reading }) =>
    reading.ok ? [] : [{ ref, state: "wrong" as const, errors: reading.errors }],
  );
  const good = readings.flatMap(({ ref, id, version, reading }): StormSave[] =>
    reading.ok ? [{ clientRef: ref, id, version, entry: reading.entry }] : [],
  );
  const saved = await saveStorms(actor, seasonStartYear, good);
  if (!saved.ok) return Response.json({ refusal: saved.refusal, replies: [] });
  const stored = saved.outcomes.map(({ clientRef, ...outcome }) => ({ ref: clientRef, ...outcome }));
  return Response.json({ refusal: null, replies: [...stored, ...wrong] });
}
