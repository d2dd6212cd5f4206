import { readdir, readFile, writeFile } from "node:fs/promises";
import { existsSync, readdirSync } from "node:fs";
import { join } from "node:path";
import { promisify } from "node:util";
import { brotliCompress, constants, gzip } from "node:zlib";

const encodings = [
  {
    name: "br",
    suffix: ".br",
    compress: (content) =>
      promisify(brotliCompress)(content, {
        params: { [constants.BROTLI_PARAM_QUALITY]: constants.BROTLI_MAX_QUALITY },
      }),
  },
  { name: "gzip", suffix: ".gz", compress: (content) => promisify(gzip)(content, { level: 9 }) },
];
const compressible = /\.(js|css)$/;

/**
 * Writes a compressed copy beside every script and style of the build, once, so that no request waits for it.
 *
 * @returns {import("vite").Plugin}
 */
export function compressedAssets() {
  return {
    name: "compressed-assets",
    apply: "build",
    // The last build of all: the map of the routes is written among the client's assets only then.
    applyToEnvironment: (environment) => environment.name === "ssr",
    enforce: "post",
    async closeBundle() {
      const folder = join(this.environment.config.root, "build", "client", "assets");
      const names = (await readdir(folder)).filter((file) => compressible.test(file));
      await Promise.all(names.map((name) => writeCompressed(join(folder, name))));
    },
  };
}

/** @param {string} file */
async function writeCompressed(file) {
  const content = await readFile(file);
  await Promise.all(encodings.map(async ({ suffix, compress }) => writeFile(file + suffix, await compress(content))));
}

/**
 * Answers a request for a script or style with its compressed copy, when there is one that the browser takes.
 *
 * @param {string} folder with the build's assets
 * @returns {import("express").RequestHandler}
 */
export function preferCompressed(folder) {
  const names = new Set(existsSync(folder) ? readdirSync(folder) : []);
  return (request, response, next) => {
    const name = request.path.slice(1);
    if (!compressible.test(name)) return next();
    response.vary("Accept-Encoding");
    const taken = encodings.find(
      (encoding) => names.has(name + encoding.suffix) && request.acceptsEncodings(encoding.name) === encoding.name,
    );
    if (!taken) return next();
    response.type(name).set("Content-Encoding", taken.name);
    request.url = `/${name}${taken.suffix}`;
    next();
  };
}
