import type { Tx } from "../../db/with-tx.ts";
import type { InvestigationKeys } from "../../identity/keys.ts";
import type { Pause } from "./pause.ts";
import { openChunk, type SealedChunk } from "./staged-chunk.ts";
import { readStage } from "./store.ts";

/** Chunks that are stored together: the database is asked some twenty times per batch. */
const CHUNKS = 3;

/** Rows of a file that are put on record together, with the chunks they stand in. */
export interface StageBatch<T> {
  chunks: readonly SealedChunk[];
  /** In the order of the chunks. */
  rows: readonly T[];
}

/**
 * Reads the staged rows of an import from the first to the last; a file is never in memory whole.
 *
 * @returns gives the next batch at each call, null after the last
 */
export function stageBatches<T>(
  tx: Tx,
  keys: InvestigationKeys,
  importId: string,
  pause: Pause,
): () => Promise<StageBatch<T> | null> {
  let after = -1;
  return async () => {
    const chunks = await readStage(tx, importId, after, CHUNKS);
    const rows: T[] = [];
    for (const chunk of chunks) {
      after = chunk.chunk;
      for (const row of openChunk<T>(keys, chunk)) rows.push(row);
      await pause();
    }
    return rows.length > 0 ? { chunks, rows } : null;
  };
}
