import type { PairEnds } from "../graph/build-graph.ts";
import { degreePreservingSampler } from "./degree-preserving-sampler.ts";
import { gnmSampler } from "./gnm-sampler.ts";
import { gnpSampler } from "./gnp-sampler.ts";
import { householdSampler } from "./household-sampler.ts";
import { mixingSampler } from "./mixing-sampler.ts";
import type { Sampler } from "./sampled-network.ts";
import { type TracedDesign, tracedSampler } from "./traced-sampler.ts";

/** Whose degrees are counted: one flag per person; absent or null = everyone's, or the sampler's own. */
type Seen = { readonly seen?: Uint8Array | null };

/** What is held fixed while the rest falls at random, as plain data that a thread can be sent. */
export type NullModel = Seen & KeptFixed;

type KeptFixed =
  | { readonly kind: "gnp"; readonly n: number; readonly p: number }
  | { readonly kind: "gnm"; readonly n: number; readonly m: number }
  | {
      readonly kind: "degreePreserving";
      readonly n: number;
      /** Distinct observed pairs. */
      readonly pairs: PairEnds;
      /** Every pair keeps an interviewed end; null = no such rule. */
      readonly isInterviewed: Uint8Array | null;
      readonly proposalsPerPair: number;
    }
  | { readonly kind: "mixing"; readonly pairs: PairEnds; readonly classOf: Int32Array }
  | { readonly kind: "household"; readonly pairs: PairEnds; readonly householdOf: Int32Array }
  | { readonly kind: "traced"; readonly design: TracedDesign };

function plainSampler(model: NullModel): Sampler {
  switch (model.kind) {
    case "gnp":
      return gnpSampler(model.n, model.p);
    case "gnm":
      return gnmSampler(model.n, model.m);
    case "degreePreserving": {
      const { n, pairs, isInterviewed, proposalsPerPair } = model;
      return degreePreservingSampler(n, pairs, pairs.a.length, isInterviewed, proposalsPerPair);
    }
    case "mixing":
      return mixingSampler(model.pairs, model.pairs.a.length, model.classOf);
    case "household":
      return householdSampler(model.pairs, model.pairs.a.length, model.householdOf);
    case "traced":
      return tracedSampler(model.design);
  }
}

/**
 * The sampler of a null model. With `seen`, what it draws carries these flags as those of people who
 * were interviewed, so that degrees are counted as they are on the observed record.
 *
 * @throws RangeError as the sampler of its kind, or when there are flags for fewer people than drawn
 */
export function samplerOf(model: NullModel): Sampler {
  const sampler = plainSampler(model);
  const { seen = null } = model;
  if (seen === null) return sampler;
  return {
    sample(random) {
      const drawn = sampler.sample(random);
      if (seen.length < drawn.people) throw new RangeError("seen must hold one flag per person");
      return { ...drawn, isInterviewed: seen };
    },
  };
}
