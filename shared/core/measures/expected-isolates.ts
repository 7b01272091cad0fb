import { hypergeometricPmf } from "../stats/hypergeometric-law.ts";
import { checkPairs, checkPeople, checkShare } from "./check-input.ts";
import { possiblePairs } from "./density.ts";

/**
 * People expected without a pair when each possible pair is there with probability p: n(1 − p)^(n−1).
 *
 * @throws RangeError for n no whole number >= 0 or p outside 0 … 1. Cost: O(1). Source: methods C.3.1.
 */
export function expectedIsolatesGnp(n: number, p: number): number {
  checkPeople(n);
  checkShare(p);
  if (n <= 1) return n;
  return n * Math.exp((n - 1) * Math.log1p(-p));
}

/**
 * People expected without a pair over all networks with exactly m pairs: n·C(N − n + 1, m)/C(N, m),
 * N = n(n − 1)/2, which is n times the hypergeometric probability of no pair.
 *
 * @throws RangeError for an impossible n or m. Cost: O(1). Source: methods C.3.1.
 */
export function expectedIsolatesGnm(n: number, m: number): number {
  checkPairs(n, m);
  if (n <= 1) return n;
  return n * hypergeometricPmf(0, { total: possiblePairs(n), marked: n - 1, drawn: m });
}
