import type { Graph } from "../graph/build-graph.ts";

/**
 * How many people have 0, 1, 2, … contact pairs: index = number of pairs, value = people, up to the
 * largest number that occurs.
 *
 * Edge cases: n = 0 gives an empty array; without pairs `[n]`. Cost: O(n). Source: methods C.1.2.
 */
export function degreeCounts(graph: Graph): Int32Array {
  const { n, offsets } = graph;
  if (n === 0) return new Int32Array(0);
  let largest = 0;
  for (let u = 0; u < n; u++) {
    const degree = offsets[u + 1]! - offsets[u]!;
    if (degree > largest) largest = degree;
  }
  const counts = new Int32Array(largest + 1);
  for (let u = 0; u < n; u++) counts[offsets[u + 1]! - offsets[u]!]!++;
  return counts;
}
