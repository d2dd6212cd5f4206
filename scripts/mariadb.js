import { spawn, spawnSync } from "node:child_process";
import { createHash } from "node:crypto";
import { chownSync, existsSync, mkdirSync, openSync, readFileSync, rmSync, statSync, writeFileSync } from "node:fs";
import { tmpdir, userInfo } from "node:os";
import { join } from "node:path";
import { setTimeout as sleep } from "node:timers/promises";
import { Failure, sentenceForLog } from "./failures.js";
import { findProgram } from "./install.js";
import { freePort } from "./ports.js";
import { tail } from "./children.js";

/**
 * A MariaDB of our own: its data in a folder, its port on loopback, its administrator known by the system account alone.
 *
 * @typedef {object} Mariadb
 * @property {string} host
 * @property {number} port
 * @property {string} socket for the administrator
 * @property {Promise<void>} ended settles when the server is gone
 * @property {() => Promise<void>} stop ask it to end, and wait until it has
 */

// The shell waits for the server and for the end of its own input. When the launcher is gone, however it went, its end of
// the pipe closes and the server is asked to stop: nothing stays behind, not even after a kill -9.
const guard = 'exec 3<&0; "$@" 3<&- & server=$!; (cat <&3 >/dev/null; kill -TERM $server 2>/dev/null) & wait $server';

const commonOptions = [
  "--bind-address=127.0.0.1",
  "--skip-name-resolve",
  "--character-set-server=utf8mb4",
  "--collation-server=utf8mb4_unicode_ci",
  "--default-time-zone=+00:00",
  "--max-allowed-packet=64M",
  "--max-connections=200",
  "--local-infile=0",
];
const lastingOptions = ["--innodb-buffer-pool-size=256M", "--innodb-flush-log-at-trx-commit=1"];
// Data that is thrown away after the tests need not survive a power cut.
const passingOptions = [
  "--innodb-buffer-pool-size=128M",
  "--innodb-flush-log-at-trx-commit=0",
  "--innodb-doublewrite=0",
  "--innodb-flush-method=nosync",
  "--performance-schema=OFF",
];

/**
 * Start MariaDB on the data of a folder, or take over the one that runs there already.
 *
 * @param {object} given
 * @param {string} given.folder holds the data, the log and the pid file; made when missing
 * @param {boolean} [given.isPassing] true for data that is thrown away afterwards: faster, not safe against a power cut
 * @returns {Promise<Mariadb>}
 * @throws {Failure} when it cannot run, with the reason its log gives
 */
export async function startMariadb({ folder, isPassing = false }) {
  mkdirSync(folder, { recursive: true, mode: 0o711 });
  const account = serverAccount(folder);
  const files = filesOf(folder);
  const running = runningServer(folder);
  if (running !== null) return running;

  if (account.uid !== null) chownSync(folder, account.uid, account.gid);
  installData(folder, account.name);
  for (let attempt = 1; ; attempt += 1) {
    const port = await freePort();
    rmSync(files.log, { force: true });
    const server = launch({ folder, account: account.name, port, isPassing });
    if (await answers(server)) {
      writeFileSync(files.port, String(port));
      return server;
    }
    const log = tail(files.log, 20);
    // Between asking for a free port and taking it, somebody else may have taken it.
    if (attempt < 3 && /Bind on TCP\/IP port/.test(log)) continue;
    await server.stop();
    const sentence = sentenceForLog(log);
    if (sentence !== null) throw new Failure(sentence);
    throw new Failure(`MariaDB does not start. Its log says:\n${log}\nThe whole log: ${files.log}`);
  }
}

/**
 * Run statements as the administrator, over the socket.
 *
 * @param {string} socket
 * @param {string} text one or more statements
 * @returns {string[][]} the rows of all results, columns as text
 * @throws {Error} with the server's words
 */
export function administer(socket, text) {
  const args = ["--no-defaults", `--socket=${socket}`, "-u", userInfo().username, "--batch", "--skip-column-names"];
  const result = spawnSync(required("mariadb"), args, { input: text, encoding: "utf8", maxBuffer: 64_000_000 });
  if (result.status !== 0) throw new Error((result.stderr ?? String(result.error)).trim());
  return result.stdout
    .split("\n")
    .filter((line) => line !== "")
    .map((line) => line.split("\t"));
}

/** @param {{ folder: string, account: string, port: number, isPassing: boolean }} given @returns {Mariadb} */
function launch({ folder, account, port, isPassing }) {
  const files = filesOf(folder);
  const options = [
    "--no-defaults",
    `--user=${account}`,
    `--datadir=${files.data}`,
    `--socket=${files.socket}`,
    `--pid-file=${files.pid}`,
    `--log-error=${files.log}`,
    `--port=${port}`,
    ...commonOptions,
    ...(isPassing ? passingOptions : lastingOptions),
  ];
  const output = openSync(files.output, "a", 0o600);
  // A group of its own: a Ctrl-C in the terminal reaches the launcher only, which then stops everything in order.
  const shell = spawn("/bin/sh", ["-c", guard, "sh", required("mariadbd"), ...options], {
    detached: true,
    stdio: ["pipe", output, output],
  });
  const ended = new Promise((resolve) => shell.once("exit", resolve)).then(() => shell.stdin.destroy());
  shell.stdin.on("error", () => {});
  return {
    host: "127.0.0.1",
    port,
    socket: files.socket,
    ended,
    stop: () => {
      shell.stdin.end();
      return ended;
    },
  };
}

/** @param {Mariadb} server */
async function answers(server) {
  let isEnded = false;
  void server.ended.then(() => (isEnded = true));
  for (const deadline = Date.now() + 90_000; Date.now() < deadline && !isEnded; await sleep(50)) {
    if (isAnswering(server.socket)) return true;
  }
  return false;
}

/** @param {string} socket */
function isAnswering(socket) {
  if (!existsSync(socket)) return false;
  try {
    administer(socket, "SELECT 1");
    return true;
  } catch {
    return false;
  }
}

/** A server left over from a launcher that was killed together with its guard. @param {string} folder @returns {Mariadb | null} */
function runningServer(folder) {
  const files = filesOf(folder);
  const pid = existsSync(files.pid) ? Number(readFileSync(files.pid, "utf8")) : 0;
  if (!isServerProcess(pid, files.data) || !isAnswering(files.socket)) return null;
  const [[port] = []] = administer(files.socket, "SELECT @@port");
  const ended = (async () => {
    while (isServerProcess(pid, files.data)) await sleep(100);
  })();
  return {
    host: "127.0.0.1",
    port: Number(port),
    socket: files.socket,
    ended,
    stop: () => {
      if (isServerProcess(pid, files.data)) process.kill(pid, "SIGTERM");
      return ended;
    },
  };
}

/** Whether that number still belongs to the server of this folder, and not to some later program. @param {number} pid @param {string} data */
function isServerProcess(pid, data) {
  try {
    return pid > 0 && readFileSync(`/proc/${pid}/cmdline`, "utf8").includes(`--datadir=${data}`);
  } catch {
    return false;
  }
}

/** @param {string} folder @param {string} account */
function installData(folder, account) {
  const files = filesOf(folder);
  if (existsSync(files.installed)) return;
  // Without the mark an earlier attempt was cut short; nothing can have been stored in it yet.
  rmSync(files.data, { recursive: true, force: true });
  const result = spawnSync(
    required("mariadb-install-db"),
    [
      "--no-defaults",
      `--user=${account}`,
      `--datadir=${files.data}`,
      "--auth-root-authentication-method=socket",
      `--auth-root-socket-user=${userInfo().username}`,
      "--skip-test-db",
    ],
    { encoding: "utf8" },
  );
  const output = `${result.stdout ?? ""}${result.stderr ?? ""}`;
  if (result.status !== 0) {
    throw new Failure(
      sentenceForLog(output) ?? `MariaDB cannot prepare its data folder ${files.data}. It says:\n${output.trim()}`,
    );
  }
  writeFileSync(files.installed, "");
}

/**
 * The system account that the server runs as. Root starts it as mysql where that account exists and can reach the folder;
 * a checkout under /root it cannot reach, and there the server stays root's. Existing data keep their owner.
 *
 * @param {string} folder
 * @returns {{ name: string, uid: number | null, gid: number }} uid null: the present account, nothing to hand over
 */
function serverAccount(folder) {
  const self = userInfo();
  const present = { name: self.username, uid: null, gid: self.gid };
  if (self.uid !== 0) return present;
  const passwd = readFileSync("/etc/passwd", "utf8")
    .split("\n")
    .map((line) => line.split(":"));
  const mysql = passwd.find(([name]) => name === "mysql");
  if (!mysql) return present;
  const [uid, gid] = [Number(mysql[2]), Number(mysql[3])];
  const data = filesOf(folder).data;
  if (existsSync(data)) return statSync(data).uid === uid ? { name: "mysql", uid, gid } : present;
  const canReach = spawnSync("test", ["-x", folder], { uid, gid }).status === 0;
  return canReach ? { name: "mysql", uid, gid } : present;
}

/** @param {string} folder */
function filesOf(folder) {
  const near = join(folder, "server.sock");
  // The kernel allows 107 bytes for a socket's path; a deep folder gets one in the system's temporary folder.
  const digest = createHash("sha256").update(folder).digest("hex").slice(0, 16);
  return {
    data: join(folder, "data"),
    installed: join(folder, "installed"),
    socket: Buffer.byteLength(near) <= 100 ? near : join(tmpdir(), `commonweigh-${digest}.sock`),
    pid: join(folder, "server.pid"),
    port: join(folder, "port"),
    log: join(folder, "error.log"),
    output: join(folder, "output.log"),
  };
}

/** @param {string} name */
function required(name) {
  const path = findProgram(name);
  if (path === null)
    throw new Failure(
      `${name} is not installed. Run: apt-get install -y --no-install-recommends mariadb-server-core mariadb-client-core`,
    );
  return path;
}
