import type { Graph, PairEnds } from "./build-graph.ts";

/** Where a network hangs together by one person or by one pair. */
export type Articulation = {
  /** People whose removal splits their group, ascending. */
  readonly people: Int32Array;
  /** Pairs whose removal splits their group; `a[k] < b[k]`, ascending by `a`, then `b`. */
  readonly bridges: PairEnds;
};

/** The bridges in ascending order; `above[v]` is the upper end of the one over `v`, or −1. */
function bridgesOf(graph: Graph, above: Int32Array, count: number): PairEnds {
  const { n, offsets, neighbours } = graph;
  const a = new Int32Array(count);
  const b = new Int32Array(count);
  if (count === 0) return { a, b };
  const atEnd = new Uint8Array(n);
  for (let v = 0; v < n; v++) {
    if (above[v]! < 0) continue;
    atEnd[v] = 1;
    atEnd[above[v]!] = 1;
  }
  let filled = 0;
  for (let u = 0; u < n; u++) {
    if (atEnd[u] === 0) continue;
    const end = offsets[u + 1]!;
    for (let k = offsets[u]!; k < end; k++) {
      const v = neighbours[k]!;
      if (v > u && (above[v] === u || above[u] === v)) {
        a[filled] = u;
        b[filled++] = v;
      }
    }
  }
  return { a, b };
}

/**
 * Articulation people and bridges in one depth-first search. What belongs to the path walked stands
 * in arrays by depth, so only the order of discovery is looked up at random; never recursive, since
 * a long chain of contacts must not overflow the stack.
 *
 * A person below the root splits their group when some branch under them reaches no earlier person
 * (low ≥ order); a root when it has two branches; a pair when the branch under it does not even
 * reach its upper end (low > order).
 *
 * Neither count is monotone: one more pair may raise or lower it. Edge cases: no pairs, two empty
 * lists. Cost: O(n + m). Source: Tarjan 1972, *Depth-first search and linear graph algorithms*;
 * methods C.6.1.
 */
export function articulation(graph: Graph): Articulation {
  const { n, offsets, neighbours } = graph;
  // 0 = not found yet; else place in the order of discovery, from 1.
  const order = new Int32Array(n);
  const path = new Int32Array(n);
  const next = new Int32Array(n);
  const low = new Int32Array(n);
  const splits = new Uint8Array(n);
  const above = new Int32Array(n).fill(-1);
  let found = 0;
  let bridgeCount = 0;

  for (let root = 0; root < n; root++) {
    if (order[root] !== 0 || offsets[root] === offsets[root + 1]) continue;
    let depth = 0;
    let branches = 0;
    path[0] = root;
    next[0] = offsets[root]!;
    low[0] = order[root] = ++found;
    for (;;) {
      const u = path[depth]!;
      const parent = depth > 0 ? path[depth - 1]! : -1;
      const end = offsets[u + 1]!;
      let lowest = low[depth]!;
      let child = -1;
      let k = next[depth]!;
      while (k < end) {
        const v = neighbours[k++]!;
        const seen = order[v]!;
        if (seen === 0) {
          child = v;
          break;
        }
        if (seen < lowest && v !== parent) lowest = seen;
      }
      low[depth] = lowest;
      if (child >= 0) {
        next[depth] = k;
        depth++;
        path[depth] = child;
        next[depth] = offsets[child]!;
        low[depth] = order[child] = ++found;
        continue;
      }
      // The branch under u is finished: hand its reach to the person above.
      if (depth === 0) break;
      depth--;
      if (lowest < low[depth]!) low[depth] = lowest;
      const reach = order[parent]!;
      if (lowest > reach) {
        above[u] = parent;
        bridgeCount++;
      }
      if (depth === 0) branches++;
      else if (lowest >= reach) splits[parent] = 1;
    }
    if (branches > 1) splits[root] = 1;
  }

  let count = 0;
  for (let u = 0; u < n; u++) count += splits[u]!;
  const people = new Int32Array(count);
  let filled = 0;
  for (let u = 0; u < n; u++) if (splits[u] !== 0) people[filled++] = u;
  return { people, bridges: bridgesOf(graph, above, bridgeCount) };
}
