/** Newton needs about 2·log2(1/(c − 1)) steps in the worst case; this is far above it. */
const MOST_STEPS = 100;

/** Below this excess over 1 the three-term series is exact to double precision and Newton is not. */
const SERIES_LIMIT = 1e-5;

/**
 * Share S of all people expected in the one large group when pairs fall at random with mean degree
 * c: the positive root of S = 1 − e^(−cS), in closed form S = 1 + W0(−c·e^(−c))/c with W0 the
 * principal Lambert branch. Exactly 0 for c <= 1.
 *
 * Newton from S = 1: the function is convex and positive there, so the steps fall on the root from
 * above and cannot leave for the trivial root at 0. Very near 1 the root is of the size of the
 * rounding of its own equation, and the series in c − 1 takes over.
 *
 * @param c mean degree, pairs per person, >= 0
 * @returns between 0 and 1
 * @throws RangeError for a negative or non-finite c
 *
 * Cost: O(1), at most 100 steps. Source: Erdős & Rényi 1960; Corless et al. 1996, *On the Lambert
 * W function*; methods C.2.1. Series: own inversion of c = −ln(1 − S)/S.
 */
export function lambertGiantShare(c: number): number {
  if (!Number.isFinite(c) || c < 0) throw new RangeError("c must be a finite number >= 0");
  if (c <= 1) return 0;
  const excess = c - 1;
  if (excess < SERIES_LIMIT) return excess * (2 + excess * (-8 / 3 + (28 / 9) * excess));
  let share = 1;
  for (let step = 0; step < MOST_STEPS; step++) {
    const outside = Math.exp(-c * share);
    const next = share - (share + Math.expm1(-c * share)) / (1 - c * outside);
    if (!(next < share)) return share;
    share = next;
  }
  return share;
}
