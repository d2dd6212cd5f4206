import { spawnSync } from "node:child_process";
import { accessSync, constants, existsSync, lstatSync, readFileSync, statfsSync } from "node:fs";
import { join } from "node:path";
import { Failure } from "./failures.js";

// The -core packages hold the programs alone: no system service is set up, so none is started or touched.
const mariadbPackages = ["mariadb-server-core", "mariadb-client-core"];
const systemFolders = ["/usr/local/sbin", "/usr/local/bin", "/usr/sbin", "/usr/bin", "/sbin", "/bin"];

/**
 * The full path of a program, or null. Looks in the system's folders too: an ordinary account's PATH often lacks them.
 *
 * @param {string} name
 * @returns {string | null}
 */
export function findProgram(name) {
  const folders = [...(process.env.PATH ?? "").split(":"), ...systemFolders];
  return (
    folders
      .filter(Boolean)
      .map((folder) => join(folder, name))
      .find((path) => existsSync(path)) ?? null
  );
}

/**
 * The names of packages that the lock file asks for and node_modules lacks or holds in another version.
 *
 * @param {{ packages?: Record<string, LockedPackage> }} lock package-lock.json
 * @param {{ packages?: Record<string, LockedPackage> }} installed node_modules/.package-lock.json
 * @returns {string[]} paths such as "node_modules/react"; empty when all is in place
 *
 * @typedef {{ version?: string, optional?: boolean, devOptional?: boolean }} LockedPackage
 */
export function missingPackages(lock, installed) {
  const present = installed.packages ?? {};
  return (
    Object.entries(lock.packages ?? {})
      // An optional package may rightly be absent: it is meant for another kind of machine.
      .filter(([path, wanted]) => path !== "" && !wanted.optional && present[path]?.version !== wanted.version)
      .map(([path]) => path)
  );
}

/**
 * Install the node modules when they do not match the lock file. Compares contents, not dates: a checkout changes dates.
 *
 * @param {string} root the checkout
 * @param {(line: string) => void} say
 */
export function ensureNodeModules(root, say) {
  const folder = join(root, "node_modules");
  const state = join(folder, ".package-lock.json");
  const lock = JSON.parse(readFileSync(join(root, "package-lock.json"), "utf8"));
  const installed = existsSync(state) ? JSON.parse(readFileSync(state, "utf8")) : {};
  if (missingPackages(lock, installed).length === 0) return;
  if (lstatSync(folder, { throwIfNoEntry: false })?.isSymbolicLink()) {
    throw new Failure(
      "node_modules is a link to another checkout and does not match package-lock.json. Run npm ci there.",
    );
  }
  say("Installing the node modules (npm ci); the first time takes a minute …");
  // npm names itself when it runs a script; started by hand, the one on the PATH is taken.
  const npm = process.env.npm_execpath;
  const [program, first] = npm?.endsWith(".js") ? [process.execPath, [npm]] : ["npm", []];
  const result = spawnSync(program, [...first, "ci", "--no-progress"], {
    cwd: root,
    stdio: ["ignore", "inherit", "pipe"],
    encoding: "utf8",
  });
  if (result.status === 0) return;
  process.stderr.write(result.stderr ?? "");
  throw new Failure(npmSentence(result.stderr ?? String(result.error)));
}

/**
 * @param {string} output what npm wrote to its error stream
 * @returns {string}
 */
export function npmSentence(output) {
  if (/ENOSPC/.test(output)) return "The disk is full. Free some space, then start again.";
  if (/EACCES|EPERM|EROFS/.test(output)) {
    return 'npm may not write node_modules here. Give the folder to this account (chown -R "$(id -un)" .) and start again.';
  }
  if (/ENOTFOUND|EAI_AGAIN|ECONNREFUSED|ECONNRESET|ETIMEDOUT|network/i.test(output)) {
    return "npm cannot reach its registry. Check the network connection, then start again.";
  }
  return "npm ci did not succeed; its own words stand above. Cure that, then start again.";
}

/** @param {(line: string) => void} say */
export function ensureMariadb(say) {
  ensureDebianPackages("MariaDB", ["mariadbd", "mariadb-install-db", "mariadb"], mariadbPackages, say);
}

/** @param {(line: string) => void} say */
export function ensureChromium(say) {
  ensureDebianPackages("Chromium", ["chromium"], ["chromium"], say);
}

/**
 * @param {string} title what a person calls it
 * @param {string[]} programs all must be there
 * @param {string[]} packages Debian packages that bring them
 * @param {(line: string) => void} say
 */
function ensureDebianPackages(title, programs, packages, say) {
  if (programs.every((program) => findProgram(program) !== null)) return;
  const command = `apt-get update && apt-get install -y --no-install-recommends ${packages.join(" ")}`;
  if (findProgram("apt-get") === null) {
    throw new Failure(
      `${title} is not installed, and this is no Debian system. Install ${programs.join(", ")}, then start again.`,
    );
  }
  if (process.getuid?.() !== 0) {
    throw new Failure(
      `${title} is not installed, and this account may not install it. Run once: sudo sh -c '${command}'`,
    );
  }
  say(`Installing ${title} from Debian's packages …`);
  const wait = ["-o", "DPkg::Lock::Timeout=900", "-qq"];
  apt([...wait, "update"], title, command);
  apt([...wait, "install", "-y", "--no-install-recommends", ...packages], title, command);
  if (programs.every((program) => findProgram(program) !== null)) return;
  throw new Failure(`${title} was installed, yet ${programs.join(", ")} cannot be found. Run: ${command}`);
}

/** @param {string[]} args @param {string} title @param {string} command */
function apt(args, title, command) {
  const env = { ...process.env, DEBIAN_FRONTEND: "noninteractive" };
  const result = spawnSync("apt-get", args, { env, stdio: ["ignore", "pipe", "pipe"], encoding: "utf8" });
  if (result.status === 0) return;
  process.stderr.write(`${result.stdout ?? ""}${result.stderr ?? ""}`);
  if (/No space left|not enough free space/i.test(`${result.stdout}${result.stderr}`)) {
    throw new Failure("The disk is full. Free some space, then start again.");
  }
  throw new Failure(`${title} could not be installed; apt-get's own words stand above. Cure that, or run: ${command}`);
}

/**
 * Refuse to begin in a folder that cannot be written to, or on a disk that would fill up half way.
 *
 * @param {string} folder the checkout
 * @param {number} neededMb megabytes that must be free
 */
export function assertRoom(folder, neededMb) {
  accessSync(folder, constants.W_OK);
  const { bavail, bsize } = statfsSync(folder);
  const freeMb = Math.floor((bavail * bsize) / 1_000_000);
  if (freeMb >= neededMb) return;
  throw new Failure(
    `Only ${freeMb} MB are free on the disk of ${folder}, and ${neededMb} MB are needed. Free some space, then start again.`,
  );
}

/** Refuse a Node that lacks what the project uses. @param {string} version such as "20.19.0" */
export function assertNodeVersion(version) {
  const [major = 0, minor = 0] = version.split(".").map(Number);
  if (major > 20 || (major === 20 && minor >= 19)) return;
  throw new Failure(`Node ${version} is too old. Install Node 20.19 or later, then start again.`);
}
