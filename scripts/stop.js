/**
 * End a program when it is asked to, or when the launcher that started it is gone: take no new request, let those under way
 * finish for up to ten seconds, release what it holds, and leave.
 *
 * @param {import("node:net").Server} server
 * @param {() => unknown} [release] called once no request is under way
 */
export function stopOnRequest(server, release = () => {}) {
  let isStopping = false;
  const stop = async () => {
    if (isStopping) return;
    isStopping = true;
    const closed = new Promise((resolve) => server.close(resolve));
    server.closeIdleConnections?.();
    const limit = setTimeout(() => server.closeAllConnections?.(), 10_000);
    // A connection that turns idle after its last answer would hold the server open until its keep-alive time is over.
    const sweep = setInterval(() => server.closeIdleConnections?.(), 100);
    await closed;
    clearTimeout(limit);
    clearInterval(sweep);
    await release();
    process.exit(0);
  };
  for (const signal of ["SIGTERM", "SIGINT", "disconnect"]) process.on(signal, stop);
}
