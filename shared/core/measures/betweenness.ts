import type { Graph } from "../graph/build-graph.ts";
import { DependencySearch } from "../graph/dependency-search.ts";
import { foldLeaves } from "../graph/fold-leaves.ts";
import { inducedSubgraph } from "../graph/induced-subgraph.ts";
import { searchOrder } from "../graph/search-order.ts";
import { allChunks, checkParts, chunkRange } from "../graph/source-chunks.ts";
import { possiblePairs } from "./density.ts";
import { defined, type Measured, undefinedBecause } from "./measured.ts";

/** What every worker needs to know to work out its chunks. */
export type BetweennessPlan = {
  readonly n: number;
  /** The graph without its hanging trees, in search order. */
  readonly core: Graph;
  /** Person behind each number of `core`. */
  readonly original: Int32Array;
  /** People each person of `core` stands for. */
  readonly weight: Float64Array;
  /** The part of the answer that is known without a search, by person. */
  readonly throughTrees: Float64Array;
  /** Number in `core` of each person or their stand-in; −1 in a group that is a tree. */
  readonly coreOf: Int32Array;
};

/** Folds and orders the graph. Cost: O(n + m). */
export function betweennessPlan(graph: Graph): BetweennessPlan {
  const { n, offsets, neighbours } = graph;
  const { folded, standIn, weight, throughTrees } = foldLeaves(graph);
  const keep = new Uint8Array(n);
  for (let u = 0; u < n; u++) {
    if (folded[u] !== 0) continue;
    const end = offsets[u + 1]!;
    for (let k = offsets[u]!; k < end && keep[u] === 0; k++) {
      if (folded[neighbours[k]!] === 0) keep[u] = 1;
    }
  }
  const induced = inducedSubgraph(graph, keep);
  const ordered = searchOrder(induced.graph);
  const original = ordered.original.map((u) => induced.original[u]!);
  const numberOf = new Int32Array(n).fill(-1);
  original.forEach((person, u) => {
    numberOf[person] = u;
  });
  return {
    n,
    core: ordered.graph,
    original,
    weight: Float64Array.from(original, (person) => weight[person]!),
    throughTrees,
    coreOf: standIn.map((person) => numberOf[person]!),
  };
}

/**
 * One of the `SOURCE_CHUNKS` parts, by number in the core. Workers may take the chunks in any
 * order and share; `addChunks` brings them together.
 *
 * @throws RangeError for a chunk that does not exist
 */
export function betweennessChunk(plan: BetweennessPlan, chunk: number): Float64Array {
  const { core, weight } = plan;
  const part = new Float64Array(core.n);
  const search = new DependencySearch(core, weight);
  const { order, dependency } = search;
  const [from, to] = chunkRange(core.n, chunk);
  for (let s = from; s < to; s++) {
    const reached = search.run(s);
    // Each unordered pair is met from both of its ends.
    const half = weight[s]! / 2;
    for (let at = 1; at < reached; at++) part[order[at]!]! += half * dependency[at]!;
  }
  return part;
}

/**
 * Betweenness from all chunks, added in the order of their numbers, so that the bytes of the answer
 * do not depend on the number of workers.
 *
 * @throws RangeError unless every chunk is there
 */
export function addChunks(plan: BetweennessPlan, parts: readonly Float64Array[]): Float64Array {
  checkParts(parts);
  const core = new Float64Array(plan.core.n);
  for (const part of parts) for (let u = 0; u < core.length; u++) core[u]! += part[u]!;
  const answer = plan.throughTrees.slice();
  for (let u = 0; u < core.length; u++) answer[plan.original[u]!]! += core[u]!;
  return answer;
}

/**
 * Betweenness of each person: over all unordered pairs of other people, the share of the shortest
 * paths between the two that lead through the person; in pairs, each pair once, not normalised.
 *
 * Hanging trees are counted without search (`foldLeaves`); the rest is searched from each person.
 *
 * Edge cases: unreachable pairs add nothing; an isolate and a person with one pair have 0. Not
 * monotone when a pair is added. Cost: O(n · m) on what folding leaves; meant for up to 20,000
 * people, above that see `sampledBetweenness`. Source: Freeman 1977; Brandes 2001; methods C.6.2.
 */
export function betweenness(graph: Graph): Float64Array {
  const plan = betweennessPlan(graph);
  return addChunks(
    plan,
    allChunks((chunk) => betweennessChunk(plan, chunk)),
  );
}

/**
 * Betweenness divided by the pairs of other people, (n − 1)(n − 2)/2: between 0 and 1.
 *
 * Edge cases: fewer than three people → undefined (`fewer_than_three_people`).
 */
export function normalisedBetweenness(raw: Float64Array): Measured<Float64Array> {
  if (raw.length < 3) return undefinedBecause("fewer_than_three_people");
  const pairs = possiblePairs(raw.length - 1);
  return defined(raw.map((value) => value / pairs));
}
