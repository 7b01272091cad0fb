import type { ReplicatePlan } from "../../../shared/core/index.ts";

/** A stream to draw people from. */
export type DrawnFrom = {
  readonly sources: number;
  readonly seed: number;
  readonly stream: number;
};

/** A calculation on one graph that is done in numbered parts; plain data that a thread can be sent. */
export type ChunkTask =
  | { readonly kind: "paths" }
  | { readonly kind: "closeness" }
  | { readonly kind: "betweenness" }
  | ({ readonly kind: "sampledBetweenness" } & DrawnFrom)
  /** One part per start. */
  | { readonly kind: "communities"; readonly seed: number; readonly starts: number }
  /** One part per replicate. */
  | { readonly kind: "replicates"; readonly plan: ReplicatePlan; readonly replicates: number };
