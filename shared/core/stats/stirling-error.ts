import { lnGamma, STIRLING_FROM, stirlingSeries } from "./ln-gamma.ts";

const LN_TWO_PI = 1.8378770664093453;

/**
 * What Stirling's formula leaves out: ln Γ(x + 1) − (x + ½) ln x + x − ½ ln 2π.
 *
 * Between 0 and about 1/(12x). Probabilities of large counts are built from it, because the
 * logarithms of their factorials are so large that their difference would keep no digit.
 *
 * @param x > 0, finite. Cost: O(1). Source: Loader 2000, *Fast and accurate computation of binomial
 * probabilities*.
 */
export function stirlingError(x: number): number {
  if (x >= STIRLING_FROM) return stirlingSeries(x);
  return lnGamma(x + 1) - (x + 0.5) * Math.log(x) + x - LN_TWO_PI / 2;
}
