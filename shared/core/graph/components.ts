import type { Graph } from "./build-graph.ts";
import { labelsBySize } from "./labels-by-size.ts";

/** Connected groups of a graph. Labels run 0, 1, 2, … by size descending, then smallest person. */
export type Components = {
  /** Label of each person's group. */
  readonly component: Int32Array;
  /** People in each group, by label; so descending. A person with no pair is a group of one. */
  readonly sizes: Int32Array;
};

/**
 * Connected components by breadth-first search with a flat queue (never recursive: a long chain of
 * contacts must not overflow the stack).
 *
 * Edge cases: n = 0 gives two empty arrays. Cost: O(n + m). Source: methods C.6.1 (order of
 * groups).
 */
export function components(graph: Graph): Components {
  const { n, offsets, neighbours } = graph;
  const component = new Int32Array(n).fill(-1);
  const queue = new Int32Array(n);
  const foundSizes = new Int32Array(n);
  let found = 0;
  for (let seed = 0; seed < n; seed++) {
    if (component[seed]! >= 0) continue;
    component[seed] = found;
    queue[0] = seed;
    let head = 0;
    let tail = 1;
    while (head < tail) {
      const u = queue[head++]!;
      const end = offsets[u + 1]!;
      for (let k = offsets[u]!; k < end; k++) {
        const v = neighbours[k]!;
        if (component[v]! < 0) {
          component[v] = found;
          queue[tail++] = v;
        }
      }
    }
    foundSizes[found++] = tail;
  }
  return labelsBySize(component, foundSizes, found);
}

/**
 * The connected parts of each group of a partition: people are in one part when a chain of contacts
 * within their group joins them. A partition whose groups are connected comes back as it was, with
 * its labels in order.
 *
 * @param membership label of each person's group; any whole numbers
 * @throws RangeError when the labels do not match the people
 *
 * Cost: O(n + m).
 */
export function connectedParts(graph: Graph, membership: Int32Array): Components {
  const { n, offsets, neighbours } = graph;
  if (membership.length !== n) throw new RangeError("membership must hold one label per person");
  const component = new Int32Array(n).fill(-1);
  const queue = new Int32Array(n);
  const foundSizes = new Int32Array(n);
  let found = 0;
  for (let seed = 0; seed < n; seed++) {
    if (component[seed]! >= 0) continue;
    const group = membership[seed]!;
    component[seed] = found;
    queue[0] = seed;
    let head = 0;
    let tail = 1;
    while (head < tail) {
      const u = queue[head++]!;
      const end = offsets[u + 1]!;
      for (let k = offsets[u]!; k < end; k++) {
        const v = neighbours[k]!;
        if (component[v]! < 0 && membership[v] === group) {
          component[v] = found;
          queue[tail++] = v;
        }
      }
    }
    foundSizes[found++] = tail;
  }
  return labelsBySize(component, foundSizes, found);
}
