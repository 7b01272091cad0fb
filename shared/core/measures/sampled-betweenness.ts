import type { Graph } from "../graph/build-graph.ts";
import { DependencySearch } from "../graph/dependency-search.ts";
import { allChunks, checkParts, chunkRange } from "../graph/source-chunks.ts";
import { drawPeople } from "../random/draw-people.ts";
import type { RandomStream } from "../random/random-stream.ts";
import { type BetweennessPlan, betweennessPlan } from "./betweenness.ts";
import { checkedSources, type EstimatePerPerson, totalOf } from "./estimate.ts";

/** The people drawn as sources, as the search sees them. */
export type DrawnSources = {
  /** People drawn, those in groups that are trees included. */
  readonly drawn: number;
  /** Their stand-ins in the core, ascending, each once. */
  readonly core: Int32Array;
  /** How many of those drawn each stand-in stands for. */
  readonly times: Float64Array;
};

/** Over a chunk's sources, by number in the core: Σx and Σx² of the halved dependencies x. */
export type SampledChunk = { readonly sum: Float64Array; readonly squares: Float64Array };

/**
 * Draws sources without replacement.
 *
 * @throws RangeError for fewer than 2 sources
 */
export function drawSources(
  plan: BetweennessPlan,
  sources: number,
  stream: RandomStream,
): DrawnSources {
  const people = drawPeople(plan.n, checkedSources(plan.n, sources), stream);
  const timesOf = new Float64Array(plan.core.n);
  for (const person of people) if (plan.coreOf[person]! >= 0) timesOf[plan.coreOf[person]!]!++;
  const core = Int32Array.from(timesOf.keys()).filter((u) => timesOf[u]! > 0);
  return { drawn: people.length, core, times: Float64Array.from(core, (u) => timesOf[u]!) };
}

/** One of the `SOURCE_CHUNKS` parts of the drawn sources; see `betweennessChunk`. */
export function sampledBetweennessChunk(
  plan: BetweennessPlan,
  drawn: DrawnSources,
  chunk: number,
): SampledChunk {
  const sum = new Float64Array(plan.core.n);
  const squares = new Float64Array(plan.core.n);
  const search = new DependencySearch(plan.core, plan.weight);
  const { order, dependency } = search;
  const [from, to] = chunkRange(drawn.core.length, chunk);
  for (let s = from; s < to; s++) {
    const times = drawn.times[s]!;
    const reached = search.run(drawn.core[s]!);
    for (let at = 1; at < reached; at++) {
      const u = order[at]!;
      const half = dependency[at]! / 2;
      sum[u]! += times * half;
      squares[u]! += times * half * half;
    }
  }
  return { sum, squares };
}

/**
 * The estimates from all chunks, added in the order of their numbers.
 *
 * @throws RangeError unless every chunk is there
 */
export function addSampledChunks(
  plan: BetweennessPlan,
  drawn: DrawnSources,
  parts: readonly SampledChunk[],
): EstimatePerPerson {
  checkParts(parts);
  const value = plan.throughTrees.slice();
  const standardError = new Float64Array(plan.n);
  for (let u = 0; u < plan.core.n; u++) {
    let sum = 0;
    let squares = 0;
    for (const part of parts) {
      sum += part.sum[u]!;
      squares += part.squares[u]!;
    }
    const total = totalOf(plan.n, drawn.drawn, sum, squares);
    const person = plan.original[u]!;
    value[person]! += total.value;
    standardError[person] = total.standardError;
  }
  return { sources: drawn.drawn, value, standardError };
}

/**
 * Betweenness of each person (raw, each pair once) estimated from the paths of some people, drawn
 * without replacement, with its standard error. What hanging trees add is counted exactly, so only
 * the rest is estimated.
 *
 * The error is that of a sum over drawn people; where a person lies on the paths of very few, a
 * small sample may miss them and give both value and error too low.
 *
 * @param sources people to draw, at least 2; everyone, when there are no more, which is exact
 * @throws RangeError for fewer than 2 sources
 *
 * Cost: O(n + m) per source. Source: Brandes & Pich 2007, *Centrality estimation in large networks*;
 * methods C.6.2.
 */
export function sampledBetweenness(
  graph: Graph,
  sources: number,
  stream: RandomStream,
): EstimatePerPerson {
  const plan = betweennessPlan(graph);
  const drawn = drawSources(plan, sources, stream);
  return addSampledChunks(
    plan,
    drawn,
    allChunks((chunk) => sampledBetweennessChunk(plan, drawn, chunk)),
  );
}
