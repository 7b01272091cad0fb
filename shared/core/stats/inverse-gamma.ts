import { incompleteGamma } from "./incomplete-gamma.ts";
import { poissonWeight } from "./law-weights.ts";
import { lnGamma } from "./ln-gamma.ts";
import { logConcaveRoot } from "./log-concave-root.ts";

/** Rough point of the normal law with upper tail q <= 1/2 (error below 5e-4). */
function roughNormal(q: number): number {
  const t = Math.sqrt(-2 * Math.log(q));
  const above = 2.515517 + t * (0.802853 + t * 0.010328);
  return t - above / (1 + t * (1.432788 + t * (0.189269 + t * 0.001308)));
}

/** ln x to begin with: Wilson and Hilferty's cube, or the first term of the series. */
function startFor(a: number, p: number, q: number): number {
  const small = (Math.log(p) + lnGamma(a + 1)) / a;
  if (a < 0.5 || small < Math.log(a + 1) - 3) return Math.min(small, Math.log(a - Math.log(q) + 1));
  const z = q < 0.5 ? roughNormal(q) : -roughNormal(p);
  const cube = 1 - 1 / (9 * a) + z / (3 * Math.sqrt(a));
  return cube > 0.05 ? Math.log(a) + 3 * Math.log(cube) : small;
}

/** Solves on ln x, on which the gamma law has the log-concave density e^(at − e^t). */
function solve(a: number, p: number, q: number): number {
  const lower = p <= 0.5;
  const at = (t: number) => {
    const x = Math.exp(t);
    const tails = incompleteGamma(a, x);
    return { tail: lower ? tails.lower : tails.upper, density: a * poissonWeight(a, x) };
  };
  // Below the range of doubles in x there is nothing to refine.
  const start = startFor(a, p, q);
  if (start < -740) return 0;
  const longest = 2 + 8 / Math.sqrt(a);
  return Math.exp(logConcaveRoot(lower ? p : q, lower, start, at, longest));
}

function check(a: number, p: number): void {
  if (!(a > 0)) throw new RangeError("shape must be > 0");
  if (!(p >= 0 && p <= 1)) throw new RangeError("a probability must lie in 0 … 1");
}

/**
 * The x with P(a, x) = p: the p-quantile of a gamma law with shape a and scale 1.
 *
 * Relative error near 1e-14. p = 0 gives 0, p = 1 gives +∞; a quantile below the smallest double
 * (tiny shapes) gives 0.
 *
 * @throws RangeError for a <= 0 or p outside 0 … 1
 *
 * Cost: 4 to 8 incomplete gamma functions. Source: as `logConcaveRoot`; start by Wilson & Hilferty
 * 1931.
 */
export function inverseGammaLower(a: number, p: number): number {
  check(a, p);
  if (p === 0) return 0;
  return p === 1 ? Number.POSITIVE_INFINITY : solve(a, p, 1 - p);
}

/** The x with Q(a, x) = q; keeps the digits of a small q. Else as `inverseGammaLower`. */
export function inverseGammaUpper(a: number, q: number): number {
  check(a, q);
  if (q === 0) return Number.POSITIVE_INFINITY;
  return q === 1 ? 0 : solve(a, 1 - q, q);
}
