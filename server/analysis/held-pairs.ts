import type { GraphStore } from "./graph-store.ts";

/** Pairs that stand now, and the order in which they came to be known. */
export type HeldPairs = {
  /** One flag per pair. */
  readonly held: Uint8Array;
  /** Pairs that stand, in steps of one instant of entry each, ascending. */
  batches(): Generator<number[]>;
};

/**
 * Pairs of the current record with the time of their earliest standing telling. One transaction
 * enters its rows at one instant, so a step here is a step of the live graph.
 *
 * Cost: a pass over the tellings and a sort of the pairs, skipped when they are in order already.
 */
export function heldPairsByEntry(store: GraphStore): HeldPairs {
  const count = store.pairs.length;
  const first = new Float64Array(count).fill(Number.POSITIVE_INFINITY);
  const { pair, recordedAt, withdrawnAt } = store.exposures.columns;
  for (let k = 0; k < store.exposures.length; k++) {
    if (withdrawnAt[k] !== Number.POSITIVE_INFINITY) continue;
    const p = pair[k] as number;
    if ((recordedAt[k] as number) < (first[p] as number)) first[p] = recordedAt[k] as number;
  }
  const held = new Uint8Array(count);
  const order = new Int32Array(count);
  let length = 0;
  let sorted = true;
  const { a, b } = store.pairs;
  for (let p = 0; p < count; p++) {
    if (first[p] === Number.POSITIVE_INFINITY) continue;
    if (!store.isOnRecord(a[p] as number) || !store.isOnRecord(b[p] as number)) continue;
    held[p] = 1;
    if (length > 0 && (first[order[length - 1] as number] as number) > (first[p] as number)) {
      sorted = false;
    }
    order[length++] = p;
  }
  const standing = order.subarray(0, length);
  if (!sorted) standing.sort((p, q) => (first[p] as number) - (first[q] as number));

  function* batches(): Generator<number[]> {
    let step: number[] = [];
    let at = Number.NaN;
    for (const p of standing) {
      if (first[p] !== at && step.length > 0) {
        yield step;
        step = [];
      }
      at = first[p] as number;
      step.push(p);
    }
    if (step.length > 0) yield step;
  }
  return { held, batches };
}
