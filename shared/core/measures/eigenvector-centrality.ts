import type { Graph } from "../graph/build-graph.ts";
import { components } from "../graph/components.ts";
import { inducedSubgraph } from "../graph/induced-subgraph.ts";
import { searchOrder } from "../graph/search-order.ts";
import { defined, type Measured, undefinedBecause } from "./measured.ts";

/** The iteration stops once what is left to go is estimated to be shorter than this. */
export const EIGENVECTOR_TOLERANCE = 1e-12;
/** Steps after which the iteration gives up. */
export const EIGENVECTOR_STEPS = 10_000;

export type EigenvectorCentrality = {
  /** People of the largest group, ascending. */
  readonly people: Int32Array;
  /** Their centralities in the same order: positive, of unit length (Σ x² = 1). */
  readonly centrality: Float64Array;
  /** The largest eigenvalue of the group's pairs. */
  readonly eigenvalue: number;
  readonly steps: number;
};

/** y = (A + I) x. */
function step({ n, offsets, neighbours }: Graph, x: Float64Array, y: Float64Array): void {
  for (let u = 0; u < n; u++) {
    let sum = x[u]!;
    const end = offsets[u + 1]!;
    for (let k = offsets[u]!; k < end; k++) sum += x[neighbours[k]!]!;
    y[u] = sum;
  }
}

/**
 * Eigenvector centrality in the largest group (equal sizes: the one with the smallest number): a
 * person counts by how much their contacts count.
 *
 * Power iteration on A + I from equal values. The added I leaves the vectors as they are and keeps
 * a group without odd circles (people × events) from swinging for ever. Each step shrinks what is
 * left by a factor that approaches ρ = (λ₂ + 1)/(λ₁ + 1), read off the steps themselves; the
 * iteration ends when length of step · ρ/(1 − ρ) falls below `EIGENVECTOR_TOLERANCE` (or below what
 * doubles can tell, when ρ is small), and gives up after `EIGENVECTOR_STEPS`.
 *
 * Edge cases: nobody → `no_people`; no pair → `no_pairs`; two parts joined by a thread, or long
 * chains, may not settle in time → `not_converged`, never a half-settled vector. Cost: O(n + m) a
 * step. Source: Bonacich 1972, *Factoring and weighting approaches to status scores* (recalled).
 */
export function eigenvectorCentrality(
  graph: Graph,
  mostSteps = EIGENVECTOR_STEPS,
): Measured<EigenvectorCentrality> {
  if (graph.n === 0) return undefinedBecause("no_people");
  if (graph.m === 0) return undefinedBecause("no_pairs");
  const { component } = components(graph);
  const group = inducedSubgraph(
    graph,
    Uint8Array.from(component, (label) => (label === 0 ? 1 : 0)),
  );
  const ordered = searchOrder(group.graph);
  const { n } = ordered.graph;
  let x = new Float64Array(n).fill(1 / Math.sqrt(n));
  let y = new Float64Array(n);
  let before = Number.POSITIVE_INFINITY;
  let ratio = 0;
  for (let steps = 1; steps <= mostSteps; steps++) {
    step(ordered.graph, x, y);
    let squares = 0;
    let along = 0;
    for (let u = 0; u < n; u++) {
      squares += y[u]! * y[u]!;
      along += x[u]! * y[u]!;
    }
    const length = Math.sqrt(squares);
    let moved = 0;
    for (let u = 0; u < n; u++) {
      y[u]! /= length;
      moved += (y[u]! - x[u]!) ** 2;
    }
    moved = Math.sqrt(moved);
    // Below 1e-13 a step is mostly rounding and its ratio to the last one means nothing.
    if (moved > 1e-13 && steps > 1) ratio = Math.min(moved / before, 1 - Number.EPSILON);
    before = moved;
    [x, y] = [y, x];
    if (moved < 1e-13 || steps > 2) {
      const toGo = (Math.max(moved, 1e-16) * Math.max(ratio, 0.5)) / (1 - ratio);
      if (toGo < EIGENVECTOR_TOLERANCE) {
        const centrality = new Float64Array(n);
        for (let u = 0; u < n; u++) centrality[ordered.original[u]!] = x[u]!;
        return defined({ people: group.original, centrality, eigenvalue: along - 1, steps });
      }
    }
  }
  return undefinedBecause("not_converged");
}
