import { createCipheriv, createDecipheriv, hkdfSync, randomBytes } from "node:crypto";

const VERSION = 1;
const IV_BYTES = 12;
const TAG_BYTES = 16;

/** Derives a 32-byte key for one purpose (HKDF-SHA-256, RFC 5869). */
export function subkey(key: Buffer, purpose: string): Buffer {
  return Buffer.from(hkdfSync("sha256", key, Buffer.alloc(0), `strandline/${purpose}`, 32));
}

/**
 * Encrypts with AES-256-GCM. `place` (table, column and row) is bound in, so that a ciphertext
 * moved to another row or column no longer opens. Layout: version, iv, ciphertext, tag.
 */
export function seal(key: Buffer, place: string, plain: Buffer | string): Buffer {
  const iv = randomBytes(IV_BYTES);
  const cipher = createCipheriv("aes-256-gcm", key, iv, { authTagLength: TAG_BYTES });
  cipher.setAAD(Buffer.from(place));
  const body = Buffer.concat([
    typeof plain === "string" ? cipher.update(plain, "utf8") : cipher.update(plain),
    cipher.final(),
  ]);
  return Buffer.concat([Buffer.from([VERSION]), iv, body, cipher.getAuthTag()]);
}

/**
 * Opens what `seal` made.
 *
 * @throws Error when the key, the place or a byte is not the one it was sealed with
 */
export function open(key: Buffer, place: string, sealed: Buffer): Buffer {
  if (sealed.length < 1 + IV_BYTES + TAG_BYTES || sealed[0] !== VERSION) {
    throw new Error("not a sealed value of a known version");
  }
  const decipher = createDecipheriv("aes-256-gcm", key, sealed.subarray(1, 1 + IV_BYTES), {
    authTagLength: TAG_BYTES,
  });
  decipher.setAAD(Buffer.from(place));
  decipher.setAuthTag(sealed.subarray(-TAG_BYTES));
  return Buffer.concat([
    decipher.update(sealed.subarray(1 + IV_BYTES, -TAG_BYTES)),
    decipher.final(),
  ]);
}
