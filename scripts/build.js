import { spawnSync } from "node:child_process";
import { createHash } from "node:crypto";
import { existsSync, readdirSync, readFileSync, rmSync, statSync, writeFileSync } from "node:fs";
import { join } from "node:path";
import { Failure } from "./failures.js";
import { plainEnvironment } from "./settings.js";

const sources = [
  "app",
  "public",
  "react-router.config.ts",
  "scripts/compressed-assets.js",
  "scripts/worker-build.js",
  "vite.config.ts",
  "tsconfig.json",
  "package.json",
  "package-lock.json",
];

/**
 * One fingerprint of everything that the build is made from: names and contents, in a fixed order.
 *
 * @param {string} root the checkout
 * @returns {string} SHA-256 in hex; another one as soon as a byte or a name changes
 */
export function sourceHash(root) {
  const hash = createHash("sha256");
  for (const file of sources.flatMap((source) => filesUnder(root, source))) {
    const content = readFileSync(join(root, file));
    hash.update(`${file}\0${content.length}\0`).update(content);
  }
  return hash.digest("hex");
}

/** @param {string} root @returns {boolean} whether build/ was made from other sources than those at hand */
export function isBuildStale(root) {
  const stamp = join(root, "build", ".source-hash");
  if (!existsSync(stamp) || !existsSync(join(root, "build", "server", "index.js"))) return true;
  return readFileSync(stamp, "utf8").trim() !== sourceHash(root);
}

/**
 * Build the application when its sources have changed since the last build.
 *
 * @param {string} root the checkout
 * @param {(line: string) => void} say
 * @throws {Failure} when the build does not succeed; its own words are printed first
 */
export function ensureBuild(root, say) {
  if (!isBuildStale(root)) return;
  say("Building the application …");
  const hash = sourceHash(root);
  const stamp = join(root, "build", ".source-hash");
  rmSync(stamp, { force: true });
  const builder = join(root, "node_modules", "@react-router", "dev", "bin.js");
  // A clean environment: the test runner's own variables would switch the build's plugins off.
  const env = { ...plainEnvironment(), NODE_ENV: "production" };
  const result = spawnSync(process.execPath, [builder, "build"], { cwd: root, env, encoding: "utf8" });
  if (result.status === 0) {
    writeFileSync(stamp, `${hash}\n`);
    return;
  }
  const output = `${result.stdout ?? ""}${result.stderr ?? ""}`;
  process.stderr.write(output);
  if (/ENOSPC|no space left/i.test(output)) throw new Failure("The disk is full. Free some space, then start again.");
  throw new Failure("The application does not build; the reason stands above. Cure it, then start again.");
}

/** @param {string} root @param {string} path @returns {string[]} files relative to root, sorted; none when absent */
function filesUnder(root, path) {
  const found = statSync(join(root, path), { throwIfNoEntry: false });
  if (!found) return [];
  if (!found.isDirectory()) return [path];
  return readdirSync(join(root, path))
    .sort()
    .flatMap((name) => filesUnder(root, join(path, name)));
}
