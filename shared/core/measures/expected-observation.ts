import { checkCount } from "./check-count.ts";
import { possiblePairs } from "./density.ts";
import { defined, type Measured, undefinedBecause } from "./measured.ts";

export type ObservationDesign = {
  /** People of the whole population. */
  readonly n: number;
  /** Chance that two of them are a contact pair. */
  readonly p: number;
  /** i, people interviewed, chosen independently of the network. */
  readonly interviewed: number;
  /** q, chance that an interviewed person names a contact of theirs. */
  readonly recall: number;
};

export type ExpectedObservation = {
  /** Pairs on record, E[m_obs]. */
  readonly pairs: number;
  /** People on record: the interviewed and whoever was named, E[n_obs]. */
  readonly people: number;
  /** 2 E[m_obs] / E[n_obs], what the recorded graph shows; it estimates nothing of the population. */
  readonly recordedMeanDegree: Measured;
  /** Pairs on record of an interviewed person. */
  readonly meanDegreeInterviewed: Measured;
  /** Share of the population's pairs that come on record. */
  readonly shareOfPairs: Measured;
};

/**
 * What interviews can be expected to bring on record under random mixing. A pair of two interviewed
 * people is told with chance q2 = 1 − (1 − q)², one with one interviewed end with chance q, one
 * with none never:
 *
 *     E[m_obs] = p (C(i,2) q2 + i (n − i) q)
 *     E[n_obs] = i + (n − i)(1 − (1 − p q)^i)
 *     E[pairs of an interviewed person] = (i − 1) p q2 + (n − i) p q
 *
 * Holds for interviewees chosen at random; people found by tracing have about one pair more.
 *
 * @throws RangeError for counts that are none, i > n, or p or q outside 0 … 1
 *
 * Edge cases: nobody interviewed → no mean degree among them (`no_one_interviewed`); nobody on
 * record (`no_people`); no pair to be seen (`no_pairs`). Cost: O(1). Source: methods C.8.1 (exact
 * expectations).
 */
export function expectedObservation(design: ObservationDesign): ExpectedObservation {
  const { n, p, interviewed: i, recall: q } = design;
  checkCount("n", n);
  checkCount("interviewed", i);
  if (i > n) throw new RangeError("interviewed cannot exceed n");
  for (const chance of [p, q]) {
    if (!(chance >= 0 && chance <= 1)) throw new RangeError("p and recall must lie in 0 … 1");
  }
  const both = 1 - (1 - q) ** 2;
  const pairs = p * (possiblePairs(i) * both + i * (n - i) * q);
  // 1 − (1 − pq)^i without losing the digits of a small pq; i = 0 must not meet log 0.
  const named = i === 0 ? 0 : -Math.expm1(i * Math.log1p(-p * q));
  const people = i + (n - i) * named;
  const possible = p * possiblePairs(n);
  return {
    pairs,
    people,
    recordedMeanDegree:
      people === 0 ? undefinedBecause("no_people") : defined((2 * pairs) / people),
    meanDegreeInterviewed:
      i === 0
        ? undefinedBecause("no_one_interviewed")
        : defined((i - 1) * p * both + (n - i) * p * q),
    shareOfPairs: possible === 0 ? undefinedBecause("no_pairs") : defined(pairs / possible),
  };
}
