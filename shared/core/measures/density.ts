import { defined, type Measured, undefinedBecause } from "./measured.ts";

/**
 * Density p = 2m / (n(n − 1)): the share of possible pairs that are on record, without unit.
 *
 * Edge cases: n = 0 (`no_people`) and n = 1 (`one_person`) are undefined. "Density above 1/n" and
 * "mean degree above 1" disagree at m = n/2; the mean degree decides. Cost: O(1). Source: Gilbert
 * 1959, *Random graphs*; methods C.1.1.
 */
export function density(n: number, m: number): Measured {
  if (n === 0) return undefinedBecause("no_people");
  if (n === 1) return undefinedBecause("one_person");
  return defined(m / possiblePairs(n));
}

/** Unordered pairs of n people, n(n − 1)/2; exact up to about 9.4e7 people. */
export function possiblePairs(n: number): number {
  return (n * (n - 1)) / 2;
}
