import { createHash, randomBytes } from "node:crypto";
import { readFileSync } from "node:fs";
import autocannon from "autocannon";
import { connect } from "../migrate.js";
import { startPassingSystem } from "../passing-system.js";
import { middleOf, short } from "./measure.js";

const connections = 10;
const rounds = 3;
const secondsEach = 5;
/** Peers may cost at most so much more than the least page there can be, in the same server. */
const leastPeersRatio = 0.35;

/**
 * A session of a demo person, written straight into the database.
 *
 * @param {Awaited<ReturnType<typeof startPassingSystem>>} system
 * @param {string} subject
 * @returns {Promise<string>} the cookie header
 */
async function sessionOf(system, subject) {
  const token = randomBytes(32).toString("base64url");
  const connection = await connect(system.migrator);
  await connection.query(
    `INSERT INTO session (token_hash, user_id, created_at, last_seen_at, expires_at, authenticated_at)
     SELECT ?, id, UTC_TIMESTAMP(3), UTC_TIMESTAMP(3), UTC_TIMESTAMP(3) + INTERVAL 1 HOUR, UTC_TIMESTAMP(3)
       FROM user_account WHERE subject = ?`,
    [createHash("sha256").update(token).digest("hex"), subject],
  );
  await connection.end();
  // The cookie as the application itself writes it: its value is JSON in base64.
  const value = encodeURIComponent(Buffer.from(JSON.stringify(token)).toString("base64"));
  return `sid=${value}`;
}

/** @param {string} url @param {string} cookie @param {number} duration in s @returns {Promise<number>} requests a second */
async function throughput(url, cookie, duration) {
  const headers = cookie === "" ? {} : { cookie };
  const result = await autocannon({ url, connections, duration, headers });
  if (result.errors > 0 || result.non2xx > 0 || result.timeouts > 0) {
    throw new Error(`${url}: ${result.errors} errors, ${result.non2xx} answers other than 2xx`);
  }
  return result.requests.average;
}

/** @param {number} pid @returns {number} resident memory in MB, from the kernel's own account */
function residentMb(pid) {
  const line = /^VmRSS:\s+(\d+) kB$/m.exec(readFileSync(`/proc/${pid}/status`, "utf8"));
  return line ? Number(line[1]) / 1024 : Number.NaN;
}

/** Pages of the built application against the bare page of the same server, turn about. */
export async function measurePages() {
  const system = await startPassingSystem({ logLevel: "warn", say: () => undefined });
  try {
    const cookie = await sessionOf(system, "maren.oake");
    const pages = [
      { name: "bare", path: "/bare", cookie: "" },
      { name: "peers", path: "/peers", cookie },
      { name: "peers in a group", path: "/peers?group=size-50-149", cookie },
      { name: "today", path: "/today", cookie },
    ];
    const marker = await fetch(`${system.origin}/peers`, { headers: { cookie } }).then((answer) => answer.text());
    if (!marker.includes("<svg")) throw new Error("The Peers page that is measured shows no strip.");
    const rates = new Map(pages.map(({ name }) => [name, []]));
    for (const page of pages) await throughput(system.origin + page.path, page.cookie, secondsEach);
    for (let round = 0; round < rounds; round++) {
      for (const { name, path, cookie: own } of pages) {
        rates.get(name).push(await throughput(system.origin + path, own, secondsEach));
      }
    }
    const bare = middleOf(rates.get("bare"));
    const ratios = pages.slice(1).map(({ name }) => {
      const rate = middleOf(rates.get(name));
      const ratio = rate / bare;
      const isLimited = name.startsWith("peers");
      return {
        name: `throughput of ${name} against the bare page`,
        value: short(ratio),
        unit: "ratio",
        limit: isLimited ? `at least ${leastPeersRatio}` : null,
        isMet: !isLimited || ratio >= leastPeersRatio,
        detail: `${short(rate)} against ${short(bare)} requests a second`,
      };
    });
    const memory = residentMb(system.appPid);
    return [
      ...ratios,
      {
        name: "memory of the server after the load",
        value: short(memory),
        unit: "MB",
        limit: null,
        isMet: true,
        detail: "",
      },
    ];
  } finally {
    await system.stop();
  }
}
