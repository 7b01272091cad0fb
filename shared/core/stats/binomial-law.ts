import { discreteQuantile, nearMean } from "./discrete-quantile.ts";
import { incompleteBeta } from "./incomplete-beta.ts";
import { binomialWeight } from "./law-weights.ts";

function check(trials: number, p: number): void {
  if (!Number.isSafeInteger(trials) || trials < 0) {
    throw new RangeError("trials must be a whole number >= 0");
  }
  if (!(p >= 0 && p <= 1)) throw new RangeError("p must lie in 0 … 1");
}

/** Probability of k successes; 0 for a k that is no whole number from 0 to the trials. */
export function binomialPmf(k: number, trials: number, p: number): number {
  check(trials, p);
  return Number.isInteger(k) && k >= 0 && k <= trials ? binomialWeight(k, trials - k, p, 1 - p) : 0;
}

/** Probability of k or fewer successes. Cost: as `incompleteBeta`. */
export function binomialCdf(k: number, trials: number, p: number): number {
  check(trials, p);
  const whole = Math.floor(k);
  if (whole < 0) return 0;
  return whole >= trials ? 1 : incompleteBeta(p, whole + 1, trials - whole).upper;
}

/** Probability of more than k successes, with the digits of a small one. */
export function binomialUpper(k: number, trials: number, p: number): number {
  check(trials, p);
  const whole = Math.floor(k);
  if (whole < 0) return 1;
  return whole >= trials ? 0 : incompleteBeta(p, whole + 1, trials - whole).lower;
}

/** Smallest k with probability of k or fewer successes >= `share`; share = 1 gives the trials. */
export function binomialQuantile(share: number, trials: number, p: number): number {
  check(trials, p);
  const start = nearMean(trials * p, Math.sqrt(trials * p * (1 - p)), share);
  return discreteQuantile(share, (k) => binomialCdf(k, trials, p), start, trials);
}
