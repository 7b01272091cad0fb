import type { Graph } from "../graph/build-graph.ts";

/**
 * Whether the contacts of `lower` are all contacts of `upper`, the two of them aside. `marked`
 * holds `upper + 1` at the contacts of `upper`.
 */
function isNested(graph: Graph, lower: number, upper: number, marked: Int32Array): boolean {
  const end = graph.offsets[lower + 1]!;
  for (let k = graph.offsets[lower]!; k < end; k++) {
    const v = graph.neighbours[k]!;
    if (v !== upper && marked[v] !== upper + 1) return false;
  }
  return true;
}

/**
 * Whether no other graph has these degrees, so that there is nothing to compare with: no swap of
 * two pairs is possible. True of stars, complete graphs, fewer than two pairs, and all other
 * threshold graphs.
 *
 * A swap exists exactly when two people each have a contact the other lacks. With the restriction
 * that every pair keeps an interviewed end, the same holds among interviewed people and among the
 * others apart: any allowed swap can be read from two people of one kind. Being nested carries over
 * from one to the next, so it is enough to compare neighbours in the order of degrees.
 *
 * @param isInterviewed one flag per person for the restricted form, or null
 * @throws RangeError when the flags do not match the people
 *
 * Cost: O(n log n + m). Source: Chvátal & Hammer 1977, *Aggregation of inequalities in integer
 * programming* (threshold graphs; recalled); methods C.7.3; the restricted form is worked out here
 * and checked against enumeration.
 */
export function onlyGraph(graph: Graph, isInterviewed: Uint8Array | null): boolean {
  const { n, offsets, neighbours } = graph;
  if (isInterviewed && isInterviewed.length !== n) {
    throw new RangeError("isInterviewed must hold one flag per person");
  }
  const kind = (u: number) => (isInterviewed && isInterviewed[u] === 0 ? 1 : 0);
  const degree = (u: number) => offsets[u + 1]! - offsets[u]!;
  const order = Int32Array.from({ length: n }, (_, u) => u).sort(
    (u, v) => kind(u) - kind(v) || degree(u) - degree(v) || u - v,
  );
  const marked = new Int32Array(n);
  for (let at = 1; at < n; at++) {
    const lower = order[at - 1]!;
    const upper = order[at]!;
    if (kind(lower) !== kind(upper)) continue;
    const end = offsets[upper + 1]!;
    for (let k = offsets[upper]!; k < end; k++) marked[neighbours[k]!] = upper + 1;
    if (!isNested(graph, lower, upper, marked)) return false;
  }
  return true;
}
