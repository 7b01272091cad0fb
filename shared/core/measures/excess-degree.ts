import { defined, type Measured, undefinedBecause } from "./measured.ts";

/** Σk and Σk² over people, from how many have 0, 1, 2, … pairs. */
function moments(counts: ArrayLike<number>): { first: number; second: number } {
  let first = 0;
  let second = 0;
  for (let k = 1; k < counts.length; k++) {
    const people = counts[k]!;
    if (!(people >= 0)) throw new RangeError("counts must be numbers >= 0");
    first += k * people;
    second += k * k * people;
  }
  return { first, second };
}

/**
 * κ = ⟨k²⟩/⟨k⟩, the mean number of pairs of a person reached along a pair (the friend's own pair back
 * included). Molloy and Reed: a random network with these degrees has a giant group if and only if
 * κ > 2. Under random mixing κ = c + 1.
 *
 * It speaks of random networks with these degrees, not of the recorded arrangement: separate
 * triangles have κ = 2 and no giant group.
 *
 * @param counts how many people have 0, 1, 2, … pairs (as `degreeCounts` gives them)
 * @throws RangeError for a negative count
 *
 * Edge cases: no pair undefined (`no_pairs`). Cost: O(largest degree). Source: Molloy & Reed 1995, *A
 * critical point for random graphs with a given degree sequence*; Feld 1991; methods C.4.1, C.8.4.
 */
export function excessDegreeRatio(counts: ArrayLike<number>): Measured {
  const { first, second } = moments(counts);
  return first === 0 ? undefinedBecause("no_pairs") : defined(second / first);
}

/**
 * Mean excess degree κ − 1 = ⟨k(k − 1)⟩/⟨k⟩: the *other* pairs of a person reached along a pair. Else as
 * `excessDegreeRatio`.
 */
export function meanExcessDegree(counts: ArrayLike<number>): Measured {
  const { first, second } = moments(counts);
  return first === 0 ? undefinedBecause("no_pairs") : defined((second - first) / first);
}
