import { discreteQuantile, nearMean } from "./discrete-quantile.ts";
import { incompleteBeta } from "./incomplete-beta.ts";
import { binomialWeight } from "./law-weights.ts";

function check(mean: number, dispersion: number): void {
  if (!(mean >= 0 && mean < Number.POSITIVE_INFINITY)) throw new RangeError("mean must be >= 0");
  if (!(dispersion > 0 && dispersion < Number.POSITIVE_INFINITY)) {
    throw new RangeError("dispersion must be > 0");
  }
}

/**
 * Probability of z under the negative binomial law with a mean and a **dispersion** (R's `size`, not
 * its reciprocal); variance mean·(1 + mean/dispersion). 0 for a z that is no whole number >= 0.
 *
 * Written as a binomial weight, so that it keeps its digits for any size of either parameter.
 * Cost: O(1). Source: Lloyd-Smith et al. 2005; methods C.9.4.
 */
export function negativeBinomialPmf(z: number, mean: number, dispersion: number): number {
  check(mean, dispersion);
  if (!Number.isInteger(z) || z < 0) return 0;
  if (mean === 0) return z === 0 ? 1 : 0;
  if (z === 0) return Math.exp(-dispersion * Math.log1p(mean / dispersion));
  const all = mean + dispersion;
  const weight = binomialWeight(dispersion, z, dispersion / all, mean / all);
  return (weight * dispersion) / (z + dispersion);
}

/** Probability of z or fewer. Cost: as `incompleteBeta`. */
export function negativeBinomialCdf(z: number, mean: number, dispersion: number): number {
  check(mean, dispersion);
  if (z < 0) return 0;
  const all = mean + dispersion;
  return incompleteBeta(dispersion / all, dispersion, Math.floor(z) + 1, mean / all).lower;
}

/** Probability of more than z, with the digits of a small one. */
export function negativeBinomialUpper(z: number, mean: number, dispersion: number): number {
  check(mean, dispersion);
  if (z < 0) return 1;
  const all = mean + dispersion;
  return incompleteBeta(dispersion / all, dispersion, Math.floor(z) + 1, mean / all).upper;
}

/** Smallest z with probability of z or fewer >= p; p = 1 gives +∞. */
export function negativeBinomialQuantile(p: number, mean: number, dispersion: number): number {
  check(mean, dispersion);
  if (mean === 0) return 0;
  const start = nearMean(mean, Math.sqrt(mean * (1 + mean / dispersion)), p);
  const cdf = (z: number) => negativeBinomialCdf(z, mean, dispersion);
  return discreteQuantile(p, cdf, start, Number.POSITIVE_INFINITY);
}
