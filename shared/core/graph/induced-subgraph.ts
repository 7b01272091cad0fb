import type { Graph } from "./build-graph.ts";

/** A subgraph and, for each of its people, the number they had in the graph it came from. */
export type InducedSubgraph = { readonly graph: Graph; readonly original: Int32Array };

/**
 * The subgraph induced on the people with `keep[u] !== 0`: those people, in the same order, and
 * every pair with both ends among them.
 *
 * @throws RangeError when `keep` does not hold one flag per person
 *
 * Cost: O(n + m). Source: methods, box at the head of C.8 ("measures of a chosen population use
 * the subgraph induced on it").
 */
export function inducedSubgraph(graph: Graph, keep: Uint8Array): InducedSubgraph {
  if (keep.length !== graph.n) throw new RangeError("keep must hold one flag per person");
  const { n, offsets, neighbours } = graph;
  const renumbered = new Int32Array(n).fill(-1);
  let count = 0;
  for (let u = 0; u < n; u++) if (keep[u] !== 0) renumbered[u] = count++;

  const original = new Int32Array(count);
  const newOffsets = new Int32Array(count + 1);
  const newNeighbours = new Int32Array(neighbours.length);
  let kept = 0;
  for (let u = 0; u < n; u++) {
    const label = renumbered[u]!;
    if (label < 0) continue;
    original[label] = u;
    const end = offsets[u + 1]!;
    for (let k = offsets[u]!; k < end; k++) {
      const v = renumbered[neighbours[k]!]!;
      // Renumbering keeps the order, so rows stay sorted.
      if (v >= 0) newNeighbours[kept++] = v;
    }
    newOffsets[label + 1] = kept;
  }
  return {
    graph: {
      n: count,
      m: kept / 2,
      offsets: newOffsets,
      neighbours: newNeighbours.slice(0, kept),
    },
    original,
  };
}
