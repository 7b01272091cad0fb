import { incompleteGamma } from "./incomplete-gamma.ts";
import { inverseGammaLower, inverseGammaUpper } from "./inverse-gamma.ts";
import { poissonWeight } from "./law-weights.ts";

function checkScale(scale: number): void {
  if (!(scale > 0 && scale < Number.POSITIVE_INFINITY)) throw new RangeError("scale must be > 0");
}

/**
 * Density at x of the gamma law with a shape and a **scale** (mean = shape · scale; a rate is
 * 1/scale). 0 below 0; at 0 it is +∞ for a shape below 1.
 *
 * @throws RangeError for a shape or scale <= 0. Cost: O(1).
 */
export function gammaPdf(x: number, shape: number, scale: number): number {
  checkScale(scale);
  if (!(shape > 0)) throw new RangeError("shape must be > 0");
  if (x < 0) return 0;
  if (x === 0) return shape < 1 ? Number.POSITIVE_INFINITY : shape === 1 ? 1 / scale : 0;
  return (poissonWeight(shape, x / scale) * shape) / x;
}

/** Share of the gamma law with a shape and a **scale** at or below x. See `incompleteGamma`. */
export function gammaCdf(x: number, shape: number, scale: number): number {
  checkScale(scale);
  return incompleteGamma(shape, Math.max(0, x / scale)).lower;
}

/** Share of the gamma law above x, with the digits of a small one. */
export function gammaUpper(x: number, shape: number, scale: number): number {
  checkScale(scale);
  return incompleteGamma(shape, Math.max(0, x / scale)).upper;
}

/** p-quantile of the gamma law with a shape and a **scale**. See `inverseGammaLower`. */
export function gammaQuantile(p: number, shape: number, scale: number): number {
  checkScale(scale);
  return scale * inverseGammaLower(shape, p);
}

/** Point of the gamma law with the share q above it. */
export function gammaUpperQuantile(q: number, shape: number, scale: number): number {
  checkScale(scale);
  return scale * inverseGammaUpper(shape, q);
}
