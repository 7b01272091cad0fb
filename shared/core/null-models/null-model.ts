import type { PairEnds } from "../graph/build-graph.ts";
import { degreePreservingSampler } from "./degree-preserving-sampler.ts";
import { gnmSampler } from "./gnm-sampler.ts";
import { gnpSampler } from "./gnp-sampler.ts";
import { householdSampler } from "./household-sampler.ts";
import { mixingSampler } from "./mixing-sampler.ts";
import type { Sampler } from "./sampled-network.ts";
import { type TracedDesign, tracedSampler } from "./traced-sampler.ts";

/** What is held fixed while the rest falls at random, as plain data that a thread can be sent. */
export type NullModel =
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

/**
 * The sampler of a null model.
 * @throws RangeError as the sampler of its kind
 */
export function samplerOf(model: NullModel): Sampler {
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
