import type { Graph } from "./build-graph.ts";

/**
 * Core number of each person: the largest k for which they belong to a set of people who each have
 * at least k contacts within the set. It never exceeds the person's number of contacts.
 *
 * People are taken away level by level. Level k holds those with k contacts left: they go first,
 * and whoever falls to k by it goes with them. Each level looks only at people still there, and
 * their number summed over levels is the sum of core numbers, at most 2m; so the bound is that of
 * the bucket method, without keeping the buckets sorted.
 *
 * Core numbers are monotone: a further pair never lowers one. Edge cases: 0 for a person without
 * pair. Cost: O(n + m). Source: Batagelj & Zaveršnik 2003, *An O(m) algorithm for cores
 * decomposition of networks*; methods C.6.1.
 */
export function coreNumbers(graph: Graph): Int32Array {
  const { n, offsets, neighbours } = graph;
  // Contacts left while a person is there; their core number once they are gone.
  const left = new Int32Array(n);
  for (let u = 0; u < n; u++) left[u] = offsets[u + 1]! - offsets[u]!;
  const there = new Int32Array(n);
  for (let u = 0; u < n; u++) there[u] = u;
  const queue = new Int32Array(n);

  let remaining = n;
  for (let level = 0; remaining > 0; level++) {
    let tail = 0;
    let stay = 0;
    let least = n;
    for (let at = 0; at < remaining; at++) {
      const u = there[at]!;
      const degree = left[u]!;
      if (degree < level) continue; // went with an earlier level
      if (degree === level) queue[tail++] = u;
      else {
        there[stay++] = u;
        if (degree < least) least = degree;
      }
    }
    remaining = stay;
    // Nobody here: the next level that somebody has.
    if (tail === 0 && stay > 0) level = least - 1;
    for (let head = 0; head < tail; head++) {
      const u = queue[head]!;
      const end = offsets[u + 1]!;
      for (let k = offsets[u]!; k < end; k++) {
        const v = neighbours[k]!;
        // People of this level and earlier ones stay at their core number.
        if (left[v]! > level && --left[v]! === level) queue[tail++] = v;
      }
    }
  }
  return left;
}
