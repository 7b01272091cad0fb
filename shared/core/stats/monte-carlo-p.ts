/** How an observed value stands among its replicates. */
export type MonteCarloP = {
  /** Chance under the null model of a value this high or higher, this low or lower, or either. */
  readonly upper: number;
  readonly lower: number;
  readonly twoSided: number;
  /** Replicates at or above the observed value, and at or below; ties count in both. */
  readonly atLeast: number;
  readonly atMost: number;
  /** N. */
  readonly replicates: number;
};

/** Values closer than this, relative to the larger above 1, are ties: they differ by rounding. */
export const TIE_TOLERANCE = 1e-12;

/**
 * Monte Carlo p-values: (r + 1)/(N + 1) with r replicates at least as extreme, never 0. Two-sided:
 * twice the smaller, at most 1. Print "p ≤ 0.001 (0 of 999)".
 *
 * A replicate on which the figure is undefined (NaN) counts as extreme on both sides: it can only
 * make a p-value larger.
 *
 * @returns null when the observed value is undefined (NaN) or there is no replicate
 *
 * Cost: O(N). Source: Barnard 1963; Davison & Hinkley 1997; Phipson & Smyth 2010, *Permutation
 * p-values should never be zero*; methods C.7.4.
 */
export function monteCarloP(observed: number, replicates: ArrayLike<number>): MonteCarloP | null {
  const { length } = replicates;
  if (Number.isNaN(observed) || length === 0) return null;
  const tolerance = TIE_TOLERANCE * Math.max(1, Math.abs(observed));
  let atLeast = 0;
  let atMost = 0;
  for (let k = 0; k < length; k++) {
    const value = replicates[k]!;
    if (!(value < observed - tolerance)) atLeast++;
    if (!(value > observed + tolerance)) atMost++;
  }
  const upper = (atLeast + 1) / (length + 1);
  const lower = (atMost + 1) / (length + 1);
  const twoSided = Math.min(1, 2 * Math.min(upper, lower));
  return { upper, lower, twoSided, atLeast, atMost, replicates: length };
}
