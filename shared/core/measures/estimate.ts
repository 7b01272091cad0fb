/** A value estimated from some of the people, to be shown as an estimate with its error. */
export type Estimate = {
  readonly value: number;
  /** Standard error of the value under the drawing of people; 0 when everyone was drawn. */
  readonly standardError: number;
};

/** Estimates for each person, by number. */
export type EstimatePerPerson = {
  /** People whose paths were followed. */
  readonly sources: number;
  readonly value: Float64Array;
  readonly standardError: Float64Array;
};

/**
 * The number of sources to draw.
 *
 * @throws RangeError unless it is a whole number >= 2: one source tells nothing about its error
 */
export function checkedSources(n: number, sources: number): number {
  if (!Number.isSafeInteger(sources) || sources < 2) {
    throw new RangeError(`sources: whole number of at least 2, got ${sources}`);
  }
  return Math.min(n, sources);
}

/**
 * Total of x over n people and its standard error, from k of them drawn without replacement.
 *
 * @param sum Σx over those drawn
 * @param squares Σx² over those drawn
 *
 * Source: simple random sampling with the finite-population factor 1 − k/n (Cochran 1977,
 * *Sampling techniques*, recalled).
 */
export function totalOf(n: number, k: number, sum: number, squares: number): Estimate {
  if (k >= n) return { value: sum, standardError: 0 };
  const variance = Math.max(0, (squares - (sum * sum) / k) / (k - 1));
  return { value: (n / k) * sum, standardError: n * Math.sqrt(((1 - k / n) * variance) / k) };
}
