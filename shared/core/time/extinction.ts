import { lambertGiantShare } from "../stats/lambert-giant-share.ts";

/** Newton falls on the root from above; this is far more than it needs but very near R = 1. */
const MOST_STEPS = 200;

function check(mean: number, dispersion: number): void {
  if (!(mean >= 0 && Number.isFinite(mean))) throw new RangeError("R must be a finite number >= 0");
  if (!(dispersion > 0)) throw new RangeError("k must be > 0");
}

/**
 * Chance that transmission from a single case dies out by itself: the smallest q with
 * q = (1 + (R/k)(1 − q))^(−k); for k = Infinity (Poisson) q = e^(−R(1 − q)). Exactly 1 up to R = 1.
 * From a cases it is q^a.
 *
 * @param mean R, offspring per case, >= 0
 * @param dispersion k > 0; Infinity is the Poisson law
 * @throws RangeError outside these ranges
 *
 * Cost: O(1). Source: branching processes; Lloyd-Smith et al. 2005; methods C.9.4.
 */
export function extinctionProbability(mean: number, dispersion: number): number {
  check(mean, dispersion);
  if (mean <= 1) return 1;
  if (dispersion === Number.POSITIVE_INFINITY) return 1 - lambertGiantShare(mean);
  // Solved for s = 1 − q, on which the equation is convex and its root is met from above.
  const ratio = mean / dispersion;
  let s = 1;
  for (let step = 0; step < MOST_STEPS; step++) {
    const logQ = -dispersion * Math.log1p(ratio * s);
    const slope = 1 - (mean * Math.exp(logQ)) / (1 + ratio * s);
    const next = s - (s + Math.expm1(logQ)) / slope;
    if (!(next < s && next > 0)) break;
    s = next;
  }
  return 1 - s;
}

/** Chance that a case infects nobody, (1 + R/k)^(−k); e^(−R) for k = Infinity. Cost: O(1). */
export function noOffspringProbability(mean: number, dispersion: number): number {
  check(mean, dispersion);
  if (dispersion === Number.POSITIVE_INFINITY) return Math.exp(-mean);
  return Math.exp(-dispersion * Math.log1p(mean / dispersion));
}
