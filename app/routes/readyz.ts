import { isReady } from "#app/services/readiness.server.ts";

/** The program can serve: the database answers and is migrated. */
export async function loader() {
  const ready = await isReady();
  return new Response(ready ? "ready\n" : "not ready\n", {
    status: ready ? 200 : 503,
    headers: { "Content-Type": "text/plain; charset=utf-8" },
  });
}
