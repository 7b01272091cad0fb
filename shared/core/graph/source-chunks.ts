/**
 * Parts into which the sources of a search from everyone are cut, always, however many workers
 * there are: parts added in the order of their numbers give the same bytes for 1, 2 and 8 workers.
 */
export const SOURCE_CHUNKS = 32;

/**
 * The sources `[from, to)` of one part of `count` sources; parts may be empty.
 *
 * @throws RangeError for a part that does not exist
 */
export function chunkRange(count: number, chunk: number): readonly [from: number, to: number] {
  if (!Number.isInteger(chunk) || chunk < 0 || chunk >= SOURCE_CHUNKS) {
    throw new RangeError(`chunk must lie in 0 … ${SOURCE_CHUNKS - 1}, got ${chunk}`);
  }
  return [
    Math.floor((chunk * count) / SOURCE_CHUNKS),
    Math.floor(((chunk + 1) * count) / SOURCE_CHUNKS),
  ];
}

/** All parts, in order, worked out here and now. */
export function allChunks<T>(work: (chunk: number) => T): T[] {
  return Array.from({ length: SOURCE_CHUNKS }, (_, chunk) => work(chunk));
}

/** @throws RangeError unless there is one part for each chunk */
export function checkParts(parts: readonly unknown[]): void {
  if (parts.length !== SOURCE_CHUNKS) {
    throw new RangeError(`every chunk is needed: ${SOURCE_CHUNKS}, got ${parts.length}`);
  }
}
