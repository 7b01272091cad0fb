import type { Graph } from "./build-graph.ts";

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
  let largest = 0;
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
    if (tail > largest) largest = tail;
  }

  // Groups were found by smallest person; a stable counting sort by size keeps that as the tie.
  const starts = new Int32Array(largest + 2);
  for (let g = 0; g < found; g++) starts[largest - foundSizes[g]! + 1]!++;
  for (let s = 1; s < starts.length; s++) starts[s]! += starts[s - 1]!;
  const label = new Int32Array(found);
  const sizes = new Int32Array(found);
  for (let g = 0; g < found; g++) {
    const size = foundSizes[g]!;
    const place = starts[largest - size]!++;
    label[g] = place;
    sizes[place] = size;
  }
  for (let u = 0; u < n; u++) component[u] = label[component[u]!]!;
  return { component, sizes };
}
