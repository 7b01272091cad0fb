import type { Graph } from "../graph/build-graph.ts";
import { defined, type Measured, undefinedBecause } from "./measured.ts";

/**
 * Friendship paradox: mean number of contact pairs of the person at a random end of a random pair,
 * ⟨k²⟩/⟨k⟩. It is never below the mean over people: whoever is *found by tracing* has more contacts
 * than the average person, so what is seen of them must not be carried over to everyone.
 *
 * Edge cases: no pair → undefined (`no_pairs`). Cost: O(n). Source: Feld 1991, *Why your friends
 * have more friends than you do*; methods C.8.4.
 */
export function neighbourDegree(graph: Graph): Measured {
  const { n, m, offsets } = graph;
  if (m === 0) return undefinedBecause("no_pairs");
  let squares = 0;
  for (let u = 0; u < n; u++) {
    const k = offsets[u + 1]! - offsets[u]!;
    squares += k * k;
  }
  return defined(squares / (2 * m));
}
