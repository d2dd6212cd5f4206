/** The process is alive. Asks nothing of anyone. */
export function loader() {
  return new Response("alive\n", { headers: { "Content-Type": "text/plain; charset=utf-8" } });
}
