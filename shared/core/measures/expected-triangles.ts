import { checkPairs, checkPeople, checkShare } from "./check-input.ts";
import { possiblePairs } from "./density.ts";

/** Sets of three of n people. */
function triples(n: number): number {
  return (n * (n - 1) * (n - 2)) / 6;
}

/**
 * Triangles expected when each possible pair is there with probability p, C(n,3)·p³.
 * @throws RangeError for n no whole number >= 0 or p outside 0 … 1. Source: methods C.3.3.
 */
export function expectedTrianglesGnp(n: number, p: number): number {
  checkPeople(n);
  checkShare(p);
  return triples(n) * p * p * p;
}

/**
 * Triangles expected over all networks with exactly m pairs,
 * C(n,3)·m(m − 1)(m − 2)/(N(N − 1)(N − 2)), N = n(n − 1)/2; 0 for fewer than three people.
 * @throws RangeError for an impossible n or m. Source: methods C.3.3.
 */
export function expectedTrianglesGnm(n: number, m: number): number {
  checkPairs(n, m);
  if (n < 3 || m < 3) return 0;
  const pairs = possiblePairs(n);
  const first = m / pairs;
  // Factor by factor, so that a million people do not overflow; N = 3 and m <= 3 divide by 1.
  return triples(n) * first * ((m - 1) / (pairs - 1)) * ((m - 2) / (pairs - 2));
}

/**
 * 2-paths expected when each possible pair is there with probability p, 3C(n,3)·p².
 * @throws RangeError for n no whole number >= 0 or p outside 0 … 1. Source: methods C.3.3.
 */
export function expectedTwoPathsGnp(n: number, p: number): number {
  checkPeople(n);
  checkShare(p);
  return 3 * triples(n) * p * p;
}

/**
 * 2-paths expected over all networks with exactly m pairs, 3C(n,3)·m(m − 1)/(N(N − 1)); 0 for fewer
 * than three people. @throws RangeError for an impossible n or m. Source: methods C.3.3.
 */
export function expectedTwoPathsGnm(n: number, m: number): number {
  checkPairs(n, m);
  if (n < 3 || m < 2) return 0;
  const pairs = possiblePairs(n);
  return 3 * triples(n) * (m / pairs) * ((m - 1) / (pairs - 1));
}
