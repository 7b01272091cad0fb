import type { Graph } from "../graph/build-graph.ts";

/**
 * Number of 2-paths: choices of one person in the middle and two of their contacts, Σ k(k − 1)/2.
 *
 * Edge cases: 0 without two pairs at one person. Cost: O(n). Source: methods C.5.1.
 */
export function twoPaths(graph: Graph): number {
  const { n, offsets } = graph;
  let total = 0;
  for (let u = 0; u < n; u++) {
    const degree = offsets[u + 1]! - offsets[u]!;
    total += (degree * (degree - 1)) / 2;
  }
  return total;
}
