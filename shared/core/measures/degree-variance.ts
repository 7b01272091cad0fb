import { hypergeometricVariance } from "../stats/hypergeometric-law.ts";
import { checkPairs } from "./check-input.ts";
import { possiblePairs } from "./density.ts";
import { defined, type Measured, undefinedBecause } from "./measured.ts";

/**
 * Variance of one person's number of pairs over all networks with n people and exactly m pairs,
 * c(1 − 2/n)(N − m)/(N − 1) with N = n(n − 1)/2: the degree is hypergeometric.
 *
 * Edge cases: n = 0 undefined (`no_people`); one or two people give 0 (the degree is m).
 * @throws RangeError for an impossible n or m
 *
 * Cost: O(1). Source: methods C.1.2.
 */
export function degreeVariance(n: number, m: number): Measured {
  checkPairs(n, m);
  if (n === 0) return undefinedBecause("no_people");
  return defined(hypergeometricVariance({ total: possiblePairs(n), marked: n - 1, drawn: m }));
}
