import { createHash, randomBytes } from "node:crypto";

/** A secret for a link or a bearer token: 256 random bits, safe in addresses (43 characters). */
export function newSecret(): string {
  return randomBytes(32).toString("base64url");
}

/**
 * What is stored of a secret. A plain SHA-256 is enough here, unlike for passwords: nobody can try
 * 2^256 values. Lookups go by this hash, so comparing takes the same time for every guess.
 */
export function secretHash(secret: string): string {
  return createHash("sha256").update(secret).digest("hex");
}
