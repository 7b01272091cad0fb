import { deviancePart } from "./deviance-part.ts";
import { stirlingError } from "./stirling-error.ts";

const TWO_PI = 2 * Math.PI;

/**
 * m^x e^(−m) / Γ(x + 1): the Poisson probability, for any real x >= 0 and m >= 0.
 *
 * Relative error near 1e-14 for counts from 0 to beyond 1e10, where a difference of log factorials
 * keeps no digit. Cost: O(1). Source: Loader 2000, *Fast and accurate computation of binomial
 * probabilities*.
 */
export function poissonWeight(x: number, m: number): number {
  if (m === 0) return x === 0 ? 1 : 0;
  if (x === 0) return Math.exp(-m);
  return Math.exp(-stirlingError(x) - deviancePart(x, m)) / Math.sqrt(TWO_PI * x);
}

/**
 * Γ(n + 1)/(Γ(x + 1)Γ(r + 1)) · p^x q^r with n = x + r: the binomial probability of x successes and
 * r failures, for any real x and r >= 0. Failures and q = 1 − p are given apart, because n − x and
 * 1 − p forget small ones.
 *
 * Relative error near 1e-14 for n from 0 to beyond 1e11. Cost: O(1). Source: as `poissonWeight`.
 */
export function binomialWeight(x: number, rest: number, p: number, q: number): number {
  if (p === 0) return x === 0 ? 1 : 0;
  if (q === 0) return rest === 0 ? 1 : 0;
  const n = x + rest;
  if (x === 0) return Math.exp(n * (p < 0.1 ? Math.log1p(-p) : Math.log(q)));
  if (rest === 0) return Math.exp(n * (q < 0.1 ? Math.log1p(-q) : Math.log(p)));
  const exponent =
    stirlingError(n) -
    stirlingError(x) -
    stirlingError(rest) -
    deviancePart(x, n * p) -
    deviancePart(rest, n * q);
  return Math.exp(exponent) * Math.sqrt(n / (TWO_PI * x * rest));
}
