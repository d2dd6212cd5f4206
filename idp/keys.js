import { randomBytes } from "node:crypto";
import { existsSync, readFileSync, renameSync, writeFileSync } from "node:fs";
import { join } from "node:path";
import { exportJWK, generateKeyPair } from "jose";

/**
 * The provider's signing key and cookie secret: made once, then read from the state folder.
 *
 * @param {string} folder
 * @returns {Promise<{ jwk: import("jose").JWK, cookieKey: string }>} jwk: an RS256 private key
 */
export async function loadKeys(folder) {
  const file = join(folder, "idp-keys.json");
  if (existsSync(file)) return JSON.parse(readFileSync(file, "utf8"));
  const keys = { jwk: await newSigningKey(), cookieKey: randomBytes(32).toString("base64url") };
  writeFileSync(`${file}.new`, JSON.stringify(keys), { mode: 0o600 });
  renameSync(`${file}.new`, file);
  return keys;
}

/** @returns {Promise<import("jose").JWK>} a fresh RS256 private key with an id of its own */
export async function newSigningKey() {
  const { privateKey } = await generateKeyPair("RS256", { extractable: true });
  return { ...(await exportJWK(privateKey)), alg: "RS256", use: "sig", kid: randomBytes(8).toString("hex") };
}
