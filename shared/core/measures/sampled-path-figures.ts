import type { Graph } from "../graph/build-graph.ts";
import { components } from "../graph/components.ts";
import { ManySourceSearch, SOURCES_PER_PASS } from "../graph/many-source-search.ts";
import { searchOrder } from "../graph/search-order.ts";
import { drawPeople } from "../random/draw-people.ts";
import type { RandomStream } from "../random/random-stream.ts";
import { possiblePairs } from "./density.ts";
import { checkedSources, type Estimate, totalOf } from "./estimate.ts";
import { defined, type Measured, undefinedBecause } from "./measured.ts";

export type SampledPathFigures = {
  /** People drawn, whose distances to everyone were followed. */
  readonly sources: number;
  /** Estimated mean distance over pairs that reach each other. */
  readonly meanPath: Measured<Estimate>;
  /** The longest distance met: the diameter is at least this. Exact when everyone was drawn. */
  readonly diameterAtLeast: Measured;
  /** Exact: it follows from the group sizes. */
  readonly reachableShare: Measured;
  /** Estimated mean of 1/distance over all pairs. */
  readonly efficiency: Measured<Estimate>;
};

/** Per source: people reached, sum of their distances, sum of 1/distance. */
type SourceSums = { reached: Float64Array; steps: Float64Array; inverse: Float64Array };

/** Follows the drawn sources; answers with their sums and the longest distance met. */
function follow(ordered: Graph, drawn: Int32Array, sums: SourceSums): number {
  const { reached, steps, inverse } = sums;
  const search = new ManySourceSearch(ordered);
  const farAway = new Set<number>();
  let longest = 0;
  let farthest = -1;
  let first = 0;
  const visit = (distance: number, people: Int32Array, count: number, fresh: Int32Array) => {
    for (let k = 0; k < count; k++) {
      let word = fresh[people[k]!]!;
      while (word !== 0) {
        const source = first + 31 - Math.clz32(word & -word);
        reached[source]!++;
        steps[source]! += distance;
        inverse[source]! += 1 / distance;
        word &= word - 1;
      }
    }
    farthest = people[0]!;
    if (distance > longest) longest = distance;
  };
  for (; first < drawn.length; first += SOURCES_PER_PASS) {
    farthest = -1;
    search.run(drawn, first, Math.min(first + SOURCES_PER_PASS, drawn.length), visit);
    if (farthest >= 0 && farAway.size < SOURCES_PER_PASS) farAway.add(farthest);
  }
  // Whoever is far from somebody is likely an end of a longest path: one more pass from them.
  if (farAway.size > 0 && drawn.length < ordered.n) {
    search.run(Int32Array.from(farAway), 0, farAway.size, (distance) => {
      if (distance > longest) longest = distance;
    });
  }
  return longest;
}

/**
 * Path figures from the distances of some people to everyone: estimates with their standard error,
 * for networks too big to follow everyone. The people are drawn without replacement.
 *
 * The mean path is the ratio of the drawn people's distances to the number of people they reach,
 * with the error of a ratio (its bias is of order 1/sources). The diameter is only bounded from
 * below.
 *
 * @param sources people to draw, at least 2; everyone, when there are no more
 * @throws RangeError for fewer than 2 sources
 *
 * Edge cases: as `pathFigures`; pairs exist but no drawn person has one → `sample_too_small`.
 * Cost: sources/32 passes and O(n) per source. Source: Eppstein & Wang 2004, *Fast approximation of
 * centrality* (recalled); Cochran 1977 (error of a ratio, recalled); methods C.6.
 */
export function sampledPathFigures(
  graph: Graph,
  sources: number,
  stream: RandomStream,
): SampledPathFigures {
  const { n } = graph;
  const k = checkedSources(n, sources);
  if (n < 2) {
    const none = undefinedBecause(n === 0 ? "no_people" : "one_person");
    return {
      sources: k,
      meanPath: none,
      diameterAtLeast: none,
      reachableShare: none,
      efficiency: none,
    };
  }
  const sums = {
    reached: new Float64Array(k),
    steps: new Float64Array(k),
    inverse: new Float64Array(k),
  };
  const longest = follow(searchOrder(graph).graph, drawPeople(n, k, stream), sums);
  const reachable = components(graph).sizes.reduce((sum, size) => sum + possiblePairs(size), 0);
  const unreachable = undefinedBecause(reachable === 0 ? "no_reachable_pairs" : "sample_too_small");

  let reached = 0;
  let steps = 0;
  let inverse = 0;
  let inverseSquares = 0;
  for (let s = 0; s < k; s++) {
    reached += sums.reached[s]!;
    steps += sums.steps[s]!;
    inverse += sums.inverse[s]!;
    inverseSquares += sums.inverse[s]! ** 2;
  }
  let residuals = 0;
  for (let s = 0; s < k; s++) {
    residuals += (sums.steps[s]! - (steps / reached) * sums.reached[s]!) ** 2;
  }
  const ends = n * (n - 1);
  const total = totalOf(n, k, inverse, inverseSquares);
  return {
    sources: k,
    meanPath:
      reached === 0
        ? unreachable
        : defined({
            value: steps / reached,
            standardError: totalOf(n, k, 0, residuals).standardError / ((n / k) * reached),
          }),
    diameterAtLeast: reached === 0 ? unreachable : defined(longest),
    reachableShare: defined(reachable / possiblePairs(n)),
    efficiency: defined({ value: total.value / ends, standardError: total.standardError / ends }),
  };
}
