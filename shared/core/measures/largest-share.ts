import { defined, type Measured, undefinedBecause } from "./measured.ts";

/**
 * Share of all people who are in the largest connected group, L1 / n, between 0 and 1.
 *
 * @param n people, isolates included
 * @param sizes group sizes, descending (as `components` gives them)
 *
 * Edge cases: n = 0 undefined (`no_people`). Cost: O(1). Source: methods C.2.4.
 */
export function largestShare(n: number, sizes: Int32Array): Measured {
  if (n === 0) return undefinedBecause("no_people");
  return defined((sizes[0] ?? 0) / n);
}
