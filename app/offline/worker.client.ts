/** Let the phone keep the worksheet's program. Only in the built application: in development it would keep old code. */
export function keepProgram(): void {
  if (!import.meta.env.PROD || !("serviceWorker" in navigator)) return;
  // Without it everything works but opening the page without signal; a browser that refuses is left alone.
  navigator.serviceWorker.register("/sw.js", { scope: "/fleet/worksheets" }).catch(() => undefined);
}
