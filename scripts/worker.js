/* global AbortController */
import { setTimeout as sleep } from "node:timers/promises";

const usualPauseMs = 2_000;
const longestPauseMs = 10_000;
const stopping = new AbortController();

/**
 * The pause before the next turn: two seconds while all is well, growing to ten while the application does not answer.
 *
 * @param {number} lastPauseMs
 * @param {boolean} isAnswered
 * @returns {number} milliseconds
 */
function nextPauseMs(lastPauseMs, isAnswered) {
  return isAnswered ? usualPauseMs : Math.min(lastPauseMs * 1.5, longestPauseMs);
}

/** One turn of the work that waits in the database: mail, editions. @returns {Promise<boolean>} whether it was done */
async function tick() {
  try {
    const response = await fetch(new URL("/internal/tick", process.env.PUBLIC_ORIGIN), {
      method: "POST",
      headers: { authorization: `Bearer ${process.env.WORKER_TOKEN}` },
      redirect: "error",
      signal: AbortSignal.any([stopping.signal, AbortSignal.timeout(120_000)]),
    });
    await response.arrayBuffer();
    if (!response.ok) console.error(`The application answered ${response.status} to the worker.`);
    return response.ok;
  } catch (error) {
    if (!stopping.signal.aborted)
      console.error(`The application does not answer the worker: ${error.cause?.code ?? error.message}`);
    return false;
  }
}

for (const signal of ["SIGTERM", "SIGINT", "disconnect"]) process.on(signal, () => stopping.abort());

let pauseMs = usualPauseMs;
let isAnnounced = false;
while (!stopping.signal.aborted) {
  const isAnswered = await tick();
  if (isAnswered && !isAnnounced) {
    process.send?.("ready");
    isAnnounced = true;
  }
  pauseMs = nextPauseMs(pauseMs, isAnswered);
  // The first success is waited for by the launcher: until then the turns follow quickly.
  await sleep(isAnnounced ? pauseMs : 200, undefined, { signal: stopping.signal }).catch(() => {});
}
process.exit(0);
