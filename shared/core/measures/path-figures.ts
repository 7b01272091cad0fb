import type { Graph } from "../graph/build-graph.ts";
import { bitCount, ManySourceSearch, SOURCES_PER_PASS } from "../graph/many-source-search.ts";
import { searchOrder } from "../graph/search-order.ts";
import { possiblePairs } from "./density.ts";
import { defined, type Measured, undefinedBecause } from "./measured.ts";

/** Up to this many people every path, closeness and betweenness value is exact by default. */
export const EXACT_UP_TO_PEOPLE = 20_000;

export type PathFigures = {
  /** Mean distance over the pairs that reach each other, in contacts; read with `reachableShare`. */
  readonly meanPath: Measured;
  /** Longest finite distance, in contacts. */
  readonly diameter: Measured;
  /** Pairs of people joined by some path ÷ all pairs. */
  readonly reachableShare: Measured;
  /** Mean of 1/distance over all pairs, 0 for a pair without a path. */
  readonly efficiency: Measured;
  /** Index = distance, value = unordered pairs at that distance; [0] is 0. */
  readonly distanceCounts: Float64Array;
};

/**
 * Adds to `counts[d]` the people at distance `d` from each of the sources `from … to - 1`: whole
 * numbers, so parts worked out apart may be added in any order.
 *
 * @param ordered a graph as `searchOrder` numbers it (any graph is right, that one is fast)
 * @param counts one place per person
 * @throws RangeError when the sources do not lie in the graph
 */
export function addDistances(
  ordered: Graph,
  from: number,
  to: number,
  counts: Float64Array,
): Float64Array {
  if (from < 0 || to > ordered.n || counts.length < ordered.n) {
    throw new RangeError("sources must lie in the graph and counts hold one place per person");
  }
  const search = new ManySourceSearch(ordered);
  const sources = Int32Array.from({ length: to - from }, (_, k) => from + k);
  const count = (distance: number, people: Int32Array, reached: number, fresh: Int32Array) => {
    let pairs = 0;
    for (let k = 0; k < reached; k++) pairs += bitCount(fresh[people[k]!]!);
    counts[distance]! += pairs;
  };
  for (let s = 0; s < sources.length; s += SOURCES_PER_PASS) {
    search.run(sources, s, Math.min(s + SOURCES_PER_PASS, sources.length), count);
  }
  return counts;
}

/**
 * The path figures from how many ordered pairs stand at each distance.
 *
 * @param n people
 * @param ordered sum of `addDistances` over all n sources, so each pair twice
 */
export function pathFiguresOf(n: number, ordered: Float64Array): PathFigures {
  let longest = 0;
  let pairs = 0;
  let steps = 0;
  let inverse = 0;
  for (let d = 1; d < ordered.length; d++) {
    const here = ordered[d]! / 2;
    if (here === 0) continue;
    longest = d;
    pairs += here;
    steps += d * here;
    inverse += here / d;
  }
  const distanceCounts = ordered.slice(0, longest + 1).map((count) => count / 2);
  if (n < 2) {
    const none = undefinedBecause(n === 0 ? "no_people" : "one_person");
    return {
      meanPath: none,
      diameter: none,
      reachableShare: none,
      efficiency: none,
      distanceCounts,
    };
  }
  const unreachable = undefinedBecause("no_reachable_pairs");
  return {
    meanPath: pairs === 0 ? unreachable : defined(steps / pairs),
    diameter: pairs === 0 ? unreachable : defined(longest),
    reachableShare: defined(pairs / possiblePairs(n)),
    efficiency: defined(inverse / possiblePairs(n)),
    distanceCounts,
  };
}

/**
 * Mean path, diameter, share of reachable pairs and efficiency, exact, from one search from
 * everyone that advances 32 people at a time.
 *
 * In a disconnected network the mean path and the diameter see only pairs that reach each other
 * and may fall when groups come apart: print the share of reachable pairs beside them, or use the
 * efficiency. Neither is monotone when a pair is added.
 *
 * Edge cases: nobody or one person → undefined (`no_people`, `one_person`); no pair at all → mean
 * path and diameter undefined (`no_reachable_pairs`), share and efficiency 0. Cost: n/32 passes of
 * at most O((n + m) · levels); meant for up to 20,000 people, above that see
 * `sampledPathFigures`. Source: Latora & Marchiori 2001 (efficiency); methods C.3.2 and C.6.3.
 */
export function pathFigures(graph: Graph): PathFigures {
  const { n } = graph;
  return pathFiguresOf(n, addDistances(searchOrder(graph).graph, 0, n, new Float64Array(n)));
}
