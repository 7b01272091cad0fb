import type { Graph } from "../graph/build-graph.ts";

/**
 * People with no contact pair in the graph.
 *
 * Edge cases: n = 0 gives 0. Cost: O(n). Source: methods C (isolates count in n), C.3.1.
 */
export function isolates(graph: Graph): number {
  const { n, offsets } = graph;
  let count = 0;
  for (let u = 0; u < n; u++) if (offsets[u + 1] === offsets[u]) count++;
  return count;
}
