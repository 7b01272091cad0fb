import { checkShare } from "./check-input.ts";
import type { DegreeLaw } from "./degree-generating.ts";
import { defined, type Measured, undefinedBecause } from "./measured.ts";

/** Newton closes in from below; near the threshold it halves the distance only. */
const MOST_STEPS = 200;

/** What a chosen transmissibility would do on a random network with given degrees. */
export type Percolation = {
  /** T_c = ⟨k⟩/(⟨k²⟩ − ⟨k⟩); above 1 no transmissibility suffices. */
  readonly critical: Measured;
  /** R = T·⟨k(k − 1)⟩/⟨k⟩ of the model. Never an estimate of R. */
  readonly reproduction: number;
  /** u, probability that a given pair does not lead into the epidemic; 1 up to the threshold. */
  readonly unreached: number;
  /** S, share infected given an epidemic, and probability of one; 0 up to the threshold. */
  readonly share: number;
  /** ⟨s⟩, mean size of an outbreak, in people; below the threshold only. */
  readonly meanOutbreak: Measured;
};

/** Smallest root of u = 1 − T + T·G₁(u), by Newton from 0: the right side is convex in u. */
function smallestRoot(law: DegreeLaw, transmissibility: number): number {
  let u = 0;
  for (let step = 0; step < MOST_STEPS; step++) {
    const gap = 1 - transmissibility + transmissibility * law.reached(u) - u;
    const slope = 1 - transmissibility * law.reachedSlope(u);
    const next = u + gap / slope;
    if (!(next > u) || !(slope > 0)) return u;
    u = Math.min(1, next);
  }
  return u;
}

/**
 * Bond percolation: each pair passes infection on with probability T, once and for all.
 *
 * A what-if with a T that the epidemiologist chooses, and never an estimate: it takes recorded
 * degrees for true ones, everyone for equally infectious and the network for tree-like. Clustering,
 * which real networks have, lowers spread. The share given here is among runs that take off; over
 * all runs it is about S².
 *
 * Edge cases: `critical` is undefined when nobody reached has a further pair (`no_pairs`,
 * `no_further_pairs`); `meanOutbreak` from the threshold on (`not_below_threshold`).
 * @throws RangeError for T outside 0 … 1
 *
 * Cost: some ten evaluations of the law, more near the threshold. Source: Newman 2002, *Spread of
 * epidemic disease on networks*, PRE 66:016128; limits: Kenah & Robins 2007, Miller 2007; methods
 * C.4.2, C.4.3.
 */
export function percolation(law: DegreeLaw, transmissibility: number): Percolation {
  checkShare(transmissibility, "transmissibility");
  const reproduction = transmissibility * law.excess;
  const above = reproduction > 1;
  const unreached = above ? smallestRoot(law, transmissibility) : 1;
  const without = law.mean === 0 ? "no_pairs" : "no_further_pairs";
  return {
    critical: law.excess === 0 ? undefinedBecause(without) : defined(1 / law.excess),
    reproduction,
    unreached,
    share: above ? 1 - law.whole(unreached) : 0,
    meanOutbreak:
      reproduction >= 1
        ? undefinedBecause("not_below_threshold")
        : defined(1 + (transmissibility * law.mean) / (1 - reproduction)),
  };
}

/**
 * T = 1 − e^(−βτ) for a contact of duration τ at rate β, in the same unit of time.
 *
 * @throws RangeError for a negative or non-finite rate or duration. Source: methods C.4.2.
 */
export function transmissibility(rate: number, duration: number): number {
  if (!(rate >= 0 && duration >= 0 && Number.isFinite(rate * duration))) {
    throw new RangeError("rate and duration must be finite numbers >= 0");
  }
  return -Math.expm1(-rate * duration);
}
