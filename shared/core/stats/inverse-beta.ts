import { incompleteBeta } from "./incomplete-beta.ts";
import { binomialWeight } from "./law-weights.ts";
import { logConcaveRoot } from "./log-concave-root.ts";

/** x and 1 − x from the logit t = ln(x/(1 − x)), neither by subtraction. */
function sharesOf(t: number): { x: number; y: number } {
  const small = Math.exp(-Math.abs(t));
  const minor = small / (1 + small);
  const major = 1 / (1 + small);
  return t < 0 ? { x: minor, y: major } : { x: major, y: minor };
}

/**
 * Logit ln(x/(1 − x)) of the x at which a tail of the beta law is `wanted`. The logit keeps what a
 * double near 0 or 1 cannot. On it the beta law has a log-concave density.
 *
 * @param wanted in (0, 1)
 * @param rising true: I_x(a, b) = wanted; false: 1 − I_x(a, b) = wanted
 */
function solve(wanted: number, rising: boolean, a: number, b: number): number {
  const at = (t: number) => {
    const { x, y } = sharesOf(t);
    const tails = incompleteBeta(x, a, b, y);
    return {
      tail: rising ? tails.lower : tails.upper,
      density: (binomialWeight(a, b, x, y) * a * b) / (a + b),
    };
  };
  const longest = 2 + 8 / Math.sqrt(Math.min(a, b));
  return logConcaveRoot(wanted, rising, Math.log(a / b), at, longest);
}

/** Logit of the x with I_x(a, b) = p or, for `upper`, 1 − I_x(a, b) = p; p in (0, 1), unchecked. */
export function betaLogit(p: number, a: number, b: number, upper = false): number {
  return p <= 0.5 ? solve(p, !upper, a, b) : solve(1 - p, upper, a, b);
}

function shareAt(p: number, a: number, b: number, upper: boolean): number {
  if (!(a > 0 && b > 0 && Number.isFinite(a + b))) throw new RangeError("a and b must be > 0");
  if (!(p >= 0 && p <= 1)) throw new RangeError("a probability must lie in 0 … 1");
  if (p === 0 || p === 1) return (p === 1) === upper ? 0 : 1;
  return sharesOf(betaLogit(p, a, b, upper)).x;
}

/**
 * The x with I_x(a, b) = p: the p-quantile of a beta law, between 0 and 1.
 *
 * Relative error near 1e-14, also for x as small as one pair in 1e11.
 *
 * @throws RangeError for a or b <= 0, or p outside 0 … 1
 *
 * Cost: 4 to 10 incomplete beta functions. Source: as `logConcaveRoot`.
 */
export function inverseBetaLower(p: number, a: number, b: number): number {
  return shareAt(p, a, b, false);
}

/** The x with 1 − I_x(a, b) = q; keeps the digits of a small q. Else as `inverseBetaLower`. */
export function inverseBetaUpper(q: number, a: number, b: number): number {
  return shareAt(q, a, b, true);
}
