import { discreteQuantile, nearMean } from "./discrete-quantile.ts";
import { incompleteGamma } from "./incomplete-gamma.ts";
import { poissonWeight } from "./law-weights.ts";

function check(mean: number): void {
  if (!(mean >= 0 && mean < Number.POSITIVE_INFINITY)) throw new RangeError("mean must be >= 0");
}

/** Probability of k under the Poisson law; 0 for a k that is no whole number >= 0. */
export function poissonPmf(k: number, mean: number): number {
  check(mean);
  return Number.isInteger(k) && k >= 0 ? poissonWeight(k, mean) : 0;
}

/** Probability of k or fewer under the Poisson law. Cost: O(√k). */
export function poissonCdf(k: number, mean: number): number {
  check(mean);
  return k < 0 ? 0 : incompleteGamma(Math.floor(k) + 1, mean).upper;
}

/** Probability of more than k under the Poisson law, with the digits of a small one. */
export function poissonUpper(k: number, mean: number): number {
  check(mean);
  return k < 0 ? 1 : incompleteGamma(Math.floor(k) + 1, mean).lower;
}

/** Smallest k with probability of k or fewer >= p; p = 1 gives +∞. */
export function poissonQuantile(p: number, mean: number): number {
  check(mean);
  if (mean === 0) return 0;
  const start = nearMean(mean, Math.sqrt(mean), p);
  return discreteQuantile(p, (k) => poissonCdf(k, mean), start, Number.POSITIVE_INFINITY);
}
