import { poissonWeight } from "./law-weights.ts";
import { lnGamma } from "./ln-gamma.ts";

/** Shapes above this would need millions of terms. */
const LARGEST_SHAPE = 1e10;

/** Terms needed grow like a few times √a; this is above what the largest shape asks for. */
const MOST_TERMS = 5_000_000;

const EPSILON = 1e-17;

/** Both tails of the gamma law, each with its own relative precision. */
export type Tails = { readonly lower: number; readonly upper: number };

/** P(a, x) = x^a e^(−x)/Γ(a + 1) · Σ x^k / ((a + 1)…(a + k)): all terms positive. */
function lowerBySeries(a: number, x: number): number {
  let term = 1;
  let sum = 1;
  for (let k = 1; k < MOST_TERMS; k++) {
    term *= x / (a + k);
    sum += term;
    if (term < EPSILON * sum) break;
  }
  return poissonWeight(a, x) * sum;
}

/** Q(a, x) by its continued fraction, with the method of Lentz as changed by Thompson and Barnett. */
function upperByFraction(a: number, x: number): number {
  const tiny = 1e-300;
  let b = x + 1 - a;
  let c = 1 / tiny;
  let d = 1 / (b === 0 ? tiny : b);
  let fraction = d;
  for (let k = 1; k < MOST_TERMS; k++) {
    const numerator = -k * (k - a);
    b += 2;
    d = numerator * d + b;
    if (Math.abs(d) < tiny) d = tiny;
    c = b + numerator / c;
    if (Math.abs(c) < tiny) c = tiny;
    d = 1 / d;
    const factor = d * c;
    fraction *= factor;
    if (Math.abs(factor - 1) <= 2.3e-16) break;
  }
  return poissonWeight(a, x) * a * fraction;
}

/**
 * Q(a, x) for a small shape and x below 1.5, where 1 − P would forget it:
 * 1 − x^a/Γ(a + 1) − x^a/Γ(a + 1) · a · Σ_{k>=1} (−x)^k / ((a + k)k!).
 */
function upperForSmallShape(a: number, x: number): number {
  const exponent = a * Math.log(x) - lnGamma(a + 1);
  let term = 1;
  let sum = 0;
  for (let k = 1; k < 60; k++) {
    term *= -x / k;
    const next = sum + term / (a + k);
    if (next === sum) break;
    sum = next;
  }
  return -Math.expm1(exponent) - Math.exp(exponent) * a * sum;
}

/**
 * Regularised incomplete gamma functions: lower P(a, x) = ∫₀ˣ t^(a−1)e^(−t)dt / Γ(a), the share of a
 * gamma law with shape a below x, and upper Q = 1 − P. Neither tail is made from the other where it
 * is small, so both keep their digits.
 *
 * Relative error below 1e-12 for shapes up to 1e5; to be expected for large shapes: about 1e-16·√a.
 *
 * @param a shape, 0 < a <= 1e10
 * @param x >= 0; +∞ allowed
 * @throws RangeError outside these ranges
 *
 * Cost: about 6·√a terms near x = a, fewer elsewhere. Source: Abramowitz & Stegun 1964, 6.5.29 and
 * 6.5.31 (DLMF 8.7.1, 8.9.2).
 */
export function incompleteGamma(a: number, x: number): Tails {
  if (!(a > 0 && a <= LARGEST_SHAPE)) throw new RangeError("shape must lie in (0, 1e10]");
  if (!(x >= 0)) throw new RangeError("x must be a number >= 0");
  if (x === 0) return { lower: 0, upper: 1 };
  if (x === Number.POSITIVE_INFINITY) return { lower: 1, upper: 0 };
  if (a < 1 && x < 1.5) {
    const lower = lowerBySeries(a, x);
    return { lower, upper: lower < 0.5 ? 1 - lower : upperForSmallShape(a, x) };
  }
  if (x < a + 1) {
    const lower = Math.min(1, lowerBySeries(a, x));
    return { lower, upper: 1 - lower };
  }
  const upper = Math.min(1, upperByFraction(a, x));
  return { lower: 1 - upper, upper };
}
