import type { Graph } from "../graph/build-graph.ts";
import { defined, type Measured, undefinedBecause } from "./measured.ts";

/**
 * Modularity of a partition: Q = Σ over groups of m_s/m − (K_s/2m)², with m_s pairs inside the
 * group and K_s link ends of its people; −1/2 … 1. Pairs count once, however often they were told.
 *
 * High values also occur under random mixing, and groups below about √(2m) link ends may be merged
 * by whoever maximises it: compare with simulation. Not monotone.
 *
 * @param membership label of each person's group, 0 … n − 1; labels may be left out
 * @throws RangeError when the labels do not match the people
 *
 * Edge cases: no pair → undefined (`no_pairs`). Cost: O(n + m). Source: Newman & Girvan 2004,
 * *Finding and evaluating community structure in networks*; methods C.6.4.
 */
export function modularity(graph: Graph, membership: Int32Array): Measured {
  const { n, m, offsets, neighbours } = graph;
  if (membership.length !== n) throw new RangeError("membership must hold one label per person");
  for (let u = 0; u < n; u++) {
    const label = membership[u]!;
    if (label < 0 || label >= n) throw new RangeError(`label ${label} lies outside 0 … ${n - 1}`);
  }
  if (m === 0) return undefinedBecause("no_pairs");
  const ends = new Float64Array(n);
  let inside = 0;
  for (let u = 0; u < n; u++) {
    const mine = membership[u]!;
    const end = offsets[u + 1]!;
    const begin = offsets[u]!;
    ends[mine]! += end - begin;
    for (let k = begin; k < end; k++) if (membership[neighbours[k]!] === mine) inside++;
  }
  // inside/2m − ΣK²/(2m)², each pair inside having been met from both ends.
  let squares = 0;
  for (let s = 0; s < n; s++) squares += ends[s]! * ends[s]!;
  return defined((inside - squares / (2 * m)) / (2 * m));
}
