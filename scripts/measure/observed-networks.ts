import type { Graph, PairEnds, SampledNetwork } from "../../shared/core/index.ts";

/** The pairs of a graph, each once, as the baselines read them. */
export function wholeNetwork(graph: Graph): SampledNetwork {
  const { n, m, offsets, neighbours } = graph;
  const a = new Int32Array(m);
  const b = new Int32Array(m);
  let length = 0;
  for (let u = 0; u < n; u++) {
    for (let k = offsets[u] ?? 0; k < (offsets[u + 1] ?? 0); k++) {
      const v = neighbours[k] ?? u;
      if (v <= u) continue;
      a[length] = u;
      b[length++] = v;
    }
  }
  return { people: n, a, b, length, isInterviewed: null };
}

/** What the interviews recorded, people numbered anew. */
export type SeenNetwork = SampledNetwork & {
  readonly isInterviewed: Uint8Array;
  /** The person behind each number. */
  readonly original: Int32Array;
};

/**
 * Interviewed people, whoever shares a pair with one of them, and the pairs with an interviewed
 * end: what interviews can have seen. Others on record are not part of it.
 */
export function seenNetwork(whole: SampledNetwork, isInterviewed: Uint8Array): SeenNetwork {
  const kept = isInterviewed.slice();
  const pairs: number[] = [];
  const seen = (person: number) => isInterviewed[person] !== 0;
  const end = (ends: PairEnds["a"], k: number) => ends[k] ?? 0;
  for (let k = 0; k < whole.length; k++) {
    const [u, v] = [end(whole.a, k), end(whole.b, k)];
    if (!seen(u) && !seen(v)) continue;
    kept[u] = 1;
    kept[v] = 1;
    pairs.push(k);
  }
  const original = Int32Array.from(kept.keys()).filter((person) => kept[person] !== 0);
  const numbers = new Int32Array(whole.people);
  original.forEach((person, number) => {
    numbers[person] = number;
  });
  return {
    people: original.length,
    a: Int32Array.from(pairs, (k) => numbers[end(whole.a, k)] ?? 0),
    b: Int32Array.from(pairs, (k) => numbers[end(whole.b, k)] ?? 0),
    length: pairs.length,
    isInterviewed: Uint8Array.from(original, (person) => isInterviewed[person] ?? 0),
    original,
  };
}
