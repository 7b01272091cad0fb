import { binomialWeight, poissonWeight } from "../stats/law-weights.ts";
import { poissonUpper } from "../stats/poisson-law.ts";
import { checkMeanDegree, checkPeople, checkShare } from "./check-input.ts";

/** How far the Poisson law may be from the binomial law of one degree, and how far it is. */
export type PoissonError = {
  /** Total variation ½Σ|Bin − Poi|, between 0 and 1. */
  readonly totalVariation: number;
  /** Le Cam's bound on it, (n − 1)p² = c·p. */
  readonly leCam: number;
  /** Barbour and Hall's sharper bound, (1 − e^(−c))·p. */
  readonly barbourHall: number;
};

/**
 * Law of one person's number of pairs when each possible pair of n people is there with probability
 * p: Binomial(n − 1, p), for k = 0 … largest.
 *
 * @param largest last k wanted; beyond n − 1 the law is 0
 * @throws RangeError for n < 1, p outside 0 … 1, or a largest that is no whole number >= 0
 *
 * Cost: O(largest). Source: Gilbert 1959; methods C.1.2.
 */
export function binomialDegrees(n: number, p: number, largest: number): Float64Array {
  checkPeople(n, 1);
  checkShare(p);
  const law = new Float64Array(largest + 1);
  for (let k = 0; k <= Math.min(largest, n - 1); k++)
    law[k] = binomialWeight(k, n - 1 - k, p, 1 - p);
  return law;
}

/**
 * Poisson law of the number of pairs with mean c, for k = 0 … largest: what the binomial law tends
 * to. Cost: O(largest). Source: methods C.1.2.
 */
export function poissonDegrees(c: number, largest: number): Float64Array {
  checkMeanDegree(c);
  const law = new Float64Array(largest + 1);
  for (let k = 0; k <= largest; k++) law[k] = poissonWeight(k, c);
  return law;
}

/**
 * True total variation between Binomial(n − 1, p) and Poisson((n − 1)p), with its two bounds.
 *
 * Summed outwards from the mean until neither law has anything left, so the cost does not grow with
 * n. Rounding leaves an error near 1e-15, absolute.
 *
 * @throws RangeError for n < 1 or p outside 0 … 1
 *
 * Cost: O(c + √c·40) at most. Source: Le Cam 1960, *An approximation theorem for the Poisson
 * binomial distribution*; Barbour & Hall 1984, *On the rate of Poisson convergence*; methods C.1.2.
 */
export function poissonError(n: number, p: number): PoissonError {
  checkPeople(n, 1);
  checkShare(p);
  const trials = n - 1;
  const c = trials * p;
  const q = 1 - p;
  const middle = Math.floor(c);
  let sum = 0;
  let beyond = trials + 1;
  for (let k = middle; k <= trials; k++) {
    const poisson = poissonWeight(k, c);
    const binomial = binomialWeight(k, trials - k, p, q);
    sum += Math.abs(binomial - poisson);
    if (k > c && poisson < 1e-20 && binomial < 1e-20) {
      beyond = k + 1;
      break;
    }
  }
  // The Poisson law also gives a person more pairs than there are others.
  if (beyond > trials) sum += poissonUpper(trials, c);
  for (let k = middle - 1; k >= 0; k--) {
    const poisson = poissonWeight(k, c);
    const binomial = binomialWeight(k, trials - k, p, q);
    sum += Math.abs(binomial - poisson);
    if (poisson < 1e-20 && binomial < 1e-20) break;
  }
  return { totalVariation: sum / 2, leCam: c * p, barbourHall: -Math.expm1(-c) * p };
}
