import { createHash, randomBytes, timingSafeEqual } from "node:crypto";

/** A random secret of 256 bits, safe in addresses and headers. */
export function newSecret(): string {
  return randomBytes(32).toString("base64url");
}

/** SHA-256 as 64 hexadecimal digits. Enough for secrets of 256 bits; never for passwords. */
export function sha256(content: string | Uint8Array): string {
  return createHash("sha256").update(content).digest("hex");
}

/** Whether two texts are equal, in a time that does not tell where they differ. */
export function equalSecrets(a: string, b: string): boolean {
  return timingSafeEqual(Buffer.from(sha256(a)), Buffer.from(sha256(b)));
}
