import { createHash, randomBytes } from "node:crypto";

/** A fresh token for a link: 32 random bytes. */
export function freshToken(): string {
  return randomBytes(32).toString("base64url");
}

/** What is stored of a token. It is random, so a plain SHA-256 cannot be guessed back. */
export function tokenHash(token: string): string {
  return createHash("sha256").update(token).digest("base64url");
}
