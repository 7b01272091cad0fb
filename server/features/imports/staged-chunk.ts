import { open, seal } from "../../identity/cipher.ts";
import type { InvestigationKeys } from "../../identity/keys.ts";

/** Some checked rows of a file, encrypted as one piece and bound to their place in the file. */
export interface SealedChunk {
  importId: string;
  chunk: number;
  body: Uint8Array;
}

const place = (importId: string, chunk: number) =>
  `identity.import_stage|body_cipher|${importId}|${chunk}`;

/** Seals checked rows. */
export function sealChunk(
  keys: InvestigationKeys,
  importId: string,
  chunk: number,
  rows: readonly unknown[],
): Buffer {
  return seal(keys.seal, place(importId, chunk), JSON.stringify(rows));
}

/** Opens what `sealChunk` made. @throws Error when it is not the chunk it is said to be */
export function openChunk<T>(keys: InvestigationKeys, { importId, chunk, body }: SealedChunk): T[] {
  const sealed = Buffer.from(body.buffer, body.byteOffset, body.byteLength);
  return JSON.parse(open(keys.seal, place(importId, chunk), sealed).toString()) as T[];
}
