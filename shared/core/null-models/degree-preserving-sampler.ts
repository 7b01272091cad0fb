import type { PairEnds } from "../graph/build-graph.ts";
import type { RandomStream } from "../random/random-stream.ts";
import { checkPeople, type SampledNetwork, type Sampler } from "./sampled-network.ts";
import { SwapChain } from "./swap-chain.ts";

/** Proposals per pair before a draw: enough to forget the start (Milo et al. 2003, recalled). */
export const BURN_IN_PER_PAIR = 100;

/**
 * Random graphs in which everybody keeps their number of contact pairs. Each draw starts afresh
 * from the observed network and makes `proposalsPerPair`·m swap proposals, so draws are
 * independent of each other and of how they are shared among workers.
 *
 * Where `onlyGraph` says so there is no other graph, and every draw is the observed one.
 *
 * @param n people
 * @param ends distinct pairs of the observed network
 * @param length pairs to use
 * @param isInterviewed one flag per person: every pair keeps an interviewed end (traced networks);
 *   null for complete networks
 * @throws RangeError as `SwapChain`, or for a count of proposals that is not whole and positive
 *
 * Cost: O(proposalsPerPair·m) a draw. Source: Milo et al. 2003, *On the uniform generation of random
 * graphs with prescribed degree sequences*; methods C.7.3, C.8.5.
 */
export function degreePreservingSampler(
  n: number,
  ends: PairEnds,
  length: number,
  isInterviewed: Uint8Array | null,
  proposalsPerPair = BURN_IN_PER_PAIR,
): Sampler {
  checkPeople(n);
  if (!Number.isSafeInteger(proposalsPerPair) || proposalsPerPair < 1) {
    throw new RangeError("proposalsPerPair must be a whole number >= 1");
  }
  const chain = new SwapChain(n, ends, length, isInterviewed);
  return {
    sample(random: RandomStream): SampledNetwork {
      chain.reset();
      chain.run(proposalsPerPair * chain.length, random);
      return { people: n, ...chain.pairs(), isInterviewed };
    },
  };
}
