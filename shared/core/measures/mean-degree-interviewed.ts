import type { Graph } from "../graph/build-graph.ts";
import { defined, type Measured, undefinedBecause } from "./measured.ts";

/**
 * Mean number of recorded contact pairs of an interviewed person, in pairs per person. A pair of
 * two interviewed people counts for each of them.
 *
 * Among people found by tracing it runs about 1 above the true mean degree, because the tracing
 * tree is counted from both ends: it is shown under its own name and never meets the threshold.
 *
 * @param isInterviewed one flag per person, non-zero = interviewed
 * @throws RangeError when the flags do not match the people
 *
 * Edge cases: nobody interviewed → undefined (`no_one_interviewed`). Cost: O(n). Source: methods,
 * box at the head of C.8, and C.8.5.
 */
export function meanDegreeInterviewed(graph: Graph, isInterviewed: Uint8Array): Measured {
  if (isInterviewed.length !== graph.n) {
    throw new RangeError("isInterviewed must hold one flag per person");
  }
  let people = 0;
  let total = 0;
  for (let u = 0; u < graph.n; u++) {
    if (isInterviewed[u] === 0) continue;
    people++;
    total += graph.offsets[u + 1]! - graph.offsets[u]!;
  }
  return people === 0 ? undefinedBecause("no_one_interviewed") : defined(total / people);
}
