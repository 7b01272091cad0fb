import type { Measured } from "../measures/measured.ts";
import { modularity } from "../measures/modularity.ts";
import { createStream } from "../random/random-stream.ts";
import type { Graph } from "./build-graph.ts";
import { firstLevel, searchSpace } from "./community-level.ts";
import { communityRound } from "./community-round.ts";
import { connectedParts } from "./components.ts";

/** The search depends on chance: fewer starts say little about what could be reached (convention). */
export const FEWEST_STARTS = 20;

/** Up to this many people a start goes on until nothing moves, or `MOST_ROUNDS`; above, two rounds. */
const SETTLED_UP_TO = 20_000;
const MOST_ROUNDS = 10;
const ROUNDS_ABOVE = 2;

/** What one start found. Every community is connected. */
export type CommunityStart = {
  /** Label of each person's community: 0, 1, 2, … by size descending, then smallest person. */
  readonly membership: Int32Array;
  /** People in each community, by label. */
  readonly sizes: Int32Array;
  readonly modularity: Measured;
};

export type Communities = CommunityStart & {
  readonly count: number;
  /** Modularity reached by each start, in order of starts; empty without pairs. */
  readonly reached: Float64Array;
  /** Lowest, mean and highest of `reached`; null without pairs. */
  readonly spread: { readonly low: number; readonly mean: number; readonly high: number } | null;
};

/**
 * A search for communities on one graph, to be started any number of times; starts share what does
 * not change between them. Start *i* draws from the stream (seed, i), so it gives the same bytes
 * whoever runs it and in whichever order.
 *
 * @returns a function of seed and number of the start
 *
 * Edge cases: no pair → everyone alone, modularity undefined (`no_pairs`); a person without pair is
 * always alone. Cost: of one start near O(n + m). Source: Traag, Waltman & van Eck 2019, *From
 * Louvain to Leiden: guaranteeing well-connected communities*; methods C.6.4.
 */
export function communitySearch(graph: Graph): (seed: number, start: number) => CommunityStart {
  const { n, m } = graph;
  const first = firstLevel(graph);
  const space = searchSpace(n);
  const rounds = n <= SETTLED_UP_TO ? MOST_ROUNDS : ROUNDS_ABOVE;
  return (seed, start) => {
    const stream = createStream(seed, start);
    const membership = new Int32Array(n);
    for (let u = 0; u < n; u++) membership[u] = u;
    if (m > 0) {
      for (let round = 0; round < rounds; round++) {
        if (!communityRound(first, membership, 2 * m, stream, space)) break;
      }
    }
    // The method leaves communities connected once it has settled; after a fixed number of rounds
    // that is made sure of. Taking apart what no pair joins can only raise modularity.
    const { component, sizes } = connectedParts(graph, membership);
    return { membership: component, sizes, modularity: modularity(graph, component) };
  };
}

/**
 * Communities: groups with more pairs inside them than their people's numbers of pairs would lead
 * one to expect, by maximising modularity from several starts. The best start is given, the first
 * one of equals, with what the others reached: the maximum itself is out of reach of any fast
 * method, and a wide spread says that the groups are not to be leaned on.
 *
 * @param options.seed whole number 0 … 2^53 − 1
 * @param options.starts at least 1; show nothing that comes from fewer than `FEWEST_STARTS`
 * @throws RangeError for another seed or number of starts
 *
 * Edge cases and source: `communitySearch`. Cost: that of its starts.
 */
export function communities(
  graph: Graph,
  options: { readonly seed: number; readonly starts: number },
): Communities {
  const { seed, starts } = options;
  if (!Number.isSafeInteger(starts) || starts < 1) throw new RangeError("starts: at least 1");
  const search = communitySearch(graph);
  let best = search(seed, 0);
  if (best.modularity.value === null) {
    return { ...best, count: best.sizes.length, reached: new Float64Array(0), spread: null };
  }
  const reached = new Float64Array(starts);
  let highest = best.modularity.value;
  let low = highest;
  let sum = highest;
  reached[0] = highest;
  for (let start = 1; start < starts; start++) {
    const found = search(seed, start);
    const value = found.modularity.value ?? 0;
    reached[start] = value;
    sum += value;
    if (value < low) low = value;
    if (value > highest) {
      highest = value;
      best = found;
    }
  }
  const spread = { low, mean: sum / starts, high: highest };
  return { ...best, count: best.sizes.length, reached, spread };
}
