import type { Graph } from "../graph/build-graph.ts";
import { chiSquaredUpper } from "../stats/chi-squared-law.ts";
import { possiblePairs } from "./density.ts";
import { defined, type Measured, type UndefinedReason, undefinedBecause } from "./measured.ts";

export type Dispersion = {
  /** D = Σ(k − k̄)²/k̄. */
  readonly index: Measured;
  /** D′ = D/(1 − p): the binomial law is narrower than Poisson's by that factor. */
  readonly corrected: Measured;
  /** Exact mean of D′ over all networks with as many people and pairs, n(n − 1)/(n + 1). */
  readonly expected: Measured;
  /** s²/k̄ with s² on n − 1: D/(n − 1). */
  readonly varianceToMean: Measured;
  /** Upper tail of D, and of D′, on χ² with n − 1 degrees of freedom: a guide, never the decision. */
  readonly guide: Measured;
  readonly correctedGuide: Measured;
};

/**
 * Index of dispersion of the numbers of pairs: do a few people hold many of them?
 *
 * D′ above n(n − 1)/(n + 1) and beyond the envelope of simulated networks says so. The decision is
 * by simulation with n and m kept; the χ² tails are shown as a guide only. Over-dispersion also comes
 * by design when only some people were interviewed.
 *
 * Edge cases: nobody `no_people`, one person `one_person`, no pair `no_pairs`; with all pairs D = 0
 * and everything made of D′ is undefined (`all_pairs`: 1 − p = 0).
 *
 * Cost: O(n). Source: Fisher 1950; Cochran 1954, *Some methods for strengthening the common χ²
 * tests*; expected value: own derivation from the hypergeometric variance; methods C.1.3.
 */
export function dispersion(graph: Graph): Dispersion {
  const { n, m, offsets } = graph;
  const why: UndefinedReason | null =
    n === 0 ? "no_people" : n === 1 ? "one_person" : m === 0 ? "no_pairs" : null;
  if (why) {
    const none = undefinedBecause(why);
    return {
      index: none,
      corrected: none,
      expected: none,
      varianceToMean: none,
      guide: none,
      correctedGuide: none,
    };
  }
  const mean = (2 * m) / n;
  let squares = 0;
  for (let u = 0; u < n; u++) {
    const off = offsets[u + 1]! - offsets[u]! - mean;
    squares += off * off;
  }
  const index = squares / mean;
  const pairs = possiblePairs(n);
  const complete = m === pairs;
  const corrected = (index * pairs) / (pairs - m);
  const unlessComplete = (value: () => number) =>
    complete ? undefinedBecause("all_pairs") : defined(value());
  return {
    index: defined(index),
    corrected: unlessComplete(() => corrected),
    expected: unlessComplete(() => (n * (n - 1)) / (n + 1)),
    varianceToMean: defined(index / (n - 1)),
    guide: unlessComplete(() => chiSquaredUpper(index, n - 1)),
    correctedGuide: unlessComplete(() => chiSquaredUpper(corrected, n - 1)),
  };
}
