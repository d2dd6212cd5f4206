import { readFileSync } from "node:fs";
import { setTimeout as sleep } from "node:timers/promises";
import autocannon from "autocannon";
import { Failure } from "../failures.js";

const connections = 10;
const warmUpSeconds = 4;
const seconds = 8;
const rounds = 3;

/**
 * Requests a second of the pages worth watching, each measured several times in turn with the others, so that whatever
 * else the machine does falls on all of them.
 *
 * @param {object} given
 * @param {import("../passing-system.js").PassingSystem} given.system
 * @param {(line: string) => void} given.say
 * @returns {Promise<{ requestsPerSecond: Record<string, number>, p99Ms: Record<string, number>, failedRequests: number,
 *   ratios: Record<string, number>, rssMb: number }>} medians of the rounds
 */
export async function pageRates({ system, say }) {
  const cookie = await signIn(system, "maren.oake");
  await editionsOut(system, cookie);
  const targets = {
    bare: { path: "/bare", headers: {} },
    peers: { path: "/peers", headers: { cookie } },
    peersOfGroup: { path: "/peers?group=size-50-149", headers: { cookie } },
    healthz: { path: "/healthz", headers: {} },
  };
  const run = (name, duration) =>
    autocannon({ url: `${system.origin}${targets[name].path}`, headers: targets[name].headers, connections, duration });

  say("Warming up …");
  for (const name of Object.keys(targets)) await run(name, warmUpSeconds);
  const found = Object.fromEntries(Object.keys(targets).map((name) => [name, []]));
  for (let round = 1; round <= rounds; round += 1) {
    say(`Round ${round} of ${rounds} …`);
    for (const name of Object.keys(targets)) found[name].push(await run(name, seconds));
  }

  const requestsPerSecond = mapped(found, (runs) => Math.round(median(runs.map((each) => each.requests.average))));
  const p99Ms = mapped(found, (runs) => median(runs.map((each) => each.latency.p99)));
  const failedRequests = Object.values(found)
    .flat()
    .reduce((sum, each) => sum + each.errors + each.timeouts + each.non2xx, 0);
  const perBare = (name) => Number((requestsPerSecond[name] / requestsPerSecond.bare).toFixed(3));
  return {
    requestsPerSecond,
    p99Ms,
    failedRequests,
    ratios: {
      peersPerBare: perBare("peers"),
      peersOfGroupPerBare: perBare("peersOfGroup"),
      healthzPerBare: perBare("healthz"),
    },
    rssMb: residentMb(system.appPid),
  };
}

/** Sign in by link, as a browser would. @returns {Promise<string>} the session's cookie */
async function signIn(system, subject) {
  const jars = new Map([system.origin, system.idpOrigin].map((origin) => [origin, new Map()]));
  let address = new URL(`/auth/start?hint=${subject}`, system.origin);
  for (let step = 0; step < 12; step += 1) {
    const jar = jars.get(address.origin) ?? new Map();
    const cookie = [...jar].map(([name, value]) => `${name}=${value}`).join("; ");
    const response = await fetch(address, { redirect: "manual", headers: cookie === "" ? {} : { cookie } });
    await response.arrayBuffer();
    for (const line of response.headers.getSetCookie()) {
      const [pair = ""] = line.split(";");
      jar.set(pair.slice(0, pair.indexOf("=")), pair.slice(pair.indexOf("=") + 1));
    }
    const next = response.headers.get("location");
    if (next === null)
      return [...(jars.get(system.origin) ?? [])].map(([name, value]) => `${name}=${value}`).join("; ");
    address = new URL(next, address);
  }
  throw new Failure("Signing in for the measurement does not come to an end.");
}

/** The demo's editions are published by its worker, one after the other. */
async function editionsOut(system, cookie) {
  for (let attempt = 0; attempt < 240; attempt += 1) {
    const page = await (await fetch(`${system.origin}/peers`, { headers: { cookie } })).text();
    const others = page.match(/href="\/peers\?edition=\d+"/g) ?? [];
    if (page.includes("above the band") && others.length >= 3) return;
    await sleep(250);
  }
  throw new Failure("The demo's editions are not published within a minute.");
}

function residentMb(pid) {
  const line = readFileSync(`/proc/${pid}/status`, "utf8").match(/^VmRSS:\s+(\d+) kB$/m);
  return Math.round(Number(line?.[1] ?? 0) / 1024);
}

/** @template Value @template Result @param {Record<string, Value>} record @param {(value: Value) => Result} change */
function mapped(record, change) {
  return Object.fromEntries(Object.entries(record).map(([name, value]) => [name, change(value)]));
}

/** @param {number[]} values */
export function median(values) {
  const sorted = values.toSorted((one, other) => one - other);
  const middle = sorted.length / 2;
  return ((sorted[Math.ceil(middle) - 1] ?? NaN) + (sorted[Math.floor(middle)] ?? NaN)) / 2;
}
