import { incompleteGamma } from "./incomplete-gamma.ts";
import { inverseGammaLower, inverseGammaUpper } from "./inverse-gamma.ts";

/**
 * Φ(z), the share of the standard normal law below z.
 *
 * Relative error near 1e-14 in the lower tail, down to z = −37. NaN is refused. Cost: O(1). Source:
 * Φ(−z) = ½Q(½, z²/2).
 */
export function normalCdf(z: number): number {
  if (Number.isNaN(z)) throw new RangeError("z must be a number");
  const half = incompleteGamma(0.5, (z * z) / 2).upper / 2;
  return z < 0 ? half : 1 - half;
}

/** 1 − Φ(z), with the digits of a small upper tail. */
export function normalUpper(z: number): number {
  return normalCdf(-z);
}

/**
 * z with Φ(z) = p. p = 0 and 1 give −∞ and +∞.
 *
 * @throws RangeError for p outside 0 … 1
 *
 * Relative error near 1e-15. Cost: as `inverseGammaLower`.
 */
export function normalQuantile(p: number): number {
  if (!(p >= 0 && p <= 1)) throw new RangeError("a probability must lie in 0 … 1");
  if (p === 0.5) return 0;
  if (p > 0.5) return -normalQuantile(1 - p);
  // Near the middle the distance from ½ is exact in doubles, so the lower function keeps it.
  const square = p > 0.25 ? inverseGammaLower(0.5, 1 - 2 * p) : inverseGammaUpper(0.5, 2 * p);
  return -Math.sqrt(2 * square);
}
