import type { Graph } from "../graph/build-graph.ts";
import { bitCount, ManySourceSearch, SOURCES_PER_PASS } from "../graph/many-source-search.ts";
import { searchOrder } from "../graph/search-order.ts";
import { drawPeople } from "../random/draw-people.ts";
import type { RandomStream } from "../random/random-stream.ts";
import { checkedSources, type EstimatePerPerson, totalOf } from "./estimate.ts";
import { defined, type Measured, undefinedBecause } from "./measured.ts";

/**
 * Harmonic closeness of each person estimated from their distances to some people, drawn without
 * replacement, with its standard error. A person drawn is at no distance from themselves and adds
 * nothing to their own sum.
 *
 * The other two forms of closeness divide by a sum of distances that a sample may miss altogether in
 * a small group; they are worked out exactly or not at all.
 *
 * @param sources people to draw, at least 2; everyone, when there are no more
 * @throws RangeError for fewer than 2 sources
 *
 * Edge cases: nobody or one person → undefined. The error of a person whom no source reaches is
 * given as 0: the sample has nothing to tell it by. Cost: sources/32 passes. Source: Eppstein & Wang
 * 2004, *Fast approximation of centrality* (recalled); methods C.6.3.
 */
export function sampledCloseness(
  graph: Graph,
  sources: number,
  stream: RandomStream,
): Measured<EstimatePerPerson> {
  const { n } = graph;
  const k = checkedSources(n, sources);
  if (n < 2) return undefinedBecause(n === 0 ? "no_people" : "one_person");
  const ordered = searchOrder(graph);
  const drawn = drawPeople(n, k, stream);
  const sum = new Float64Array(n);
  const squares = new Float64Array(n);
  const search = new ManySourceSearch(ordered.graph);
  const visit = (distance: number, people: Int32Array, count: number, fresh: Int32Array) => {
    const share = 1 / distance;
    for (let at = 0; at < count; at++) {
      const u = people[at]!;
      const here = bitCount(fresh[u]!);
      sum[u]! += here * share;
      squares[u]! += here * share * share;
    }
  };
  for (let s = 0; s < k; s += SOURCES_PER_PASS) {
    search.run(drawn, s, Math.min(s + SOURCES_PER_PASS, k), visit);
  }
  const value = new Float64Array(n);
  const standardError = new Float64Array(n);
  for (let u = 0; u < n; u++) {
    const total = totalOf(n, k, sum[u]!, squares[u]!);
    value[ordered.original[u]!] = total.value / (n - 1);
    standardError[ordered.original[u]!] = total.standardError / (n - 1);
  }
  return defined({ sources: k, value, standardError });
}
