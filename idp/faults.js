import { importJWK, SignJWT, decodeJwt } from "jose";
import { newSigningKey } from "./keys.js";

/** What a test can break: each name makes the next ID tokens wrong in that way; "down" refuses every request. */
export const faultNames = ["badNonce", "badSignature", "wrongAudience", "wrongIssuer", "expired", "down"];

/**
 * An ID token like the given one but wrong in one way, signed again.
 *
 * @param {string} idToken
 * @param {string} fault one of faultNames but "down"
 * @param {import("jose").JWK} jwk the provider's own key; the fault badSignature signs with another one under the same id
 * @returns {Promise<string>}
 */
export async function spoil(idToken, fault, jwk) {
  const claims = decodeJwt(idToken);
  const changes = {
    badNonce: { nonce: "another-attempt" },
    wrongAudience: { aud: "another-application" },
    wrongIssuer: { iss: "http://127.0.0.1:1" },
    expired: { iat: claims.iat - 7_200, exp: claims.iat - 3_600 },
  };
  const key = fault === "badSignature" ? await newSigningKey() : jwk;
  return new SignJWT({ ...claims, ...changes[fault] })
    .setProtectedHeader({ alg: "RS256", kid: jwk.kid })
    .sign(await importJWK(key, "RS256"));
}
