import type { Graph } from "../graph/build-graph.ts";

/**
 * Distinct pairs with at least one interviewed end: the pairs an interview could have reported
 * (m_obs). Pairs between two people who were never interviewed are left out.
 *
 * @param isInterviewed one flag per person, non-zero = interviewed
 * @throws RangeError when the flags do not match the people
 *
 * Cost: O(n + m). Source: methods, box at the head of C.8.
 */
export function countedPairs(graph: Graph, isInterviewed: Uint8Array): number {
  if (isInterviewed.length !== graph.n) {
    throw new RangeError("isInterviewed must hold one flag per person");
  }
  const { n, offsets, neighbours } = graph;
  let count = 0;
  for (let u = 0; u < n; u++) {
    if (isInterviewed[u] === 0) continue;
    const end = offsets[u + 1]!;
    for (let k = offsets[u]!; k < end; k++) {
      const v = neighbours[k]!;
      // A pair of two interviewed people is met from both rows; count it in the lower one.
      if (u < v || isInterviewed[v] === 0) count++;
    }
  }
  return count;
}
