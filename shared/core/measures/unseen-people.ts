import { type Interval, Z_95 } from "../stats/wilson-interval.ts";
import { checkCount } from "./check-count.ts";

export type NamingCounts = {
  /** Distinct people named at least once. */
  readonly observed: number;
  /** f₁ and f₂: people named by exactly one and exactly two interviewed people. */
  readonly once: number;
  readonly twice: number;
  /** Interviews in which they were named; null when the counts are not by interview (Chao1). */
  readonly interviews: number | null;
};

export type UnseenPeople = {
  /** Lower bound for the people who can be named at all, seen and unseen. */
  readonly estimate: number;
  /** The bias-corrected form, which also stands without anyone named twice. */
  readonly corrected: number;
  /** Of `estimate`; null where no interval is given. */
  readonly variance: number | null;
  readonly standardError: number | null;
  readonly interval: Interval | null;
};

/**
 * "People in the nameable population not yet named": how many there are at least, from how many
 * were named once and twice. With A = (i − 1)/i for i interviews (incidence data, Chao2), A = 1
 * without (abundance data, Chao1), g = f₁/f₂:
 *
 *     estimate  = observed + A f₁²/(2 f₂),        f₂ = 0: observed + A f₁(f₁ − 1)/2
 *     corrected = observed + A f₁(f₁ − 1)/(2(f₂ + 1))
 *     variance  = f₂ (A g²/2 + A² g³ + A² g⁴/4)
 *     interval  = observed + T/C … observed + T·C,
 *                 T = estimate − observed, C = exp(z √ln(1 + variance/T²))
 *
 * A lower bound, for people reachable by naming; group exposures are not in it. It is not the
 * number of contacts that were forgotten: with perfect recall it is large all the same.
 *
 * @throws RangeError for counts that are none, once + twice > observed, people named without an
 *   interview, or named twice in one
 *
 * Edge cases: T = 0 → observed, no interval; f₂ = 0 → no interval. Cost: O(1). Source: Chao 1984
 * and 1987 (log interval); variance of the incidence form as in Chao 1987 and Colwell et al. 2012,
 * *Models and estimators linking individual-based and sample-based rarefaction*, from memory;
 * methods C.8.3.
 */
export function unseenPeople(counts: NamingCounts): UnseenPeople {
  const { observed, once, twice, interviews } = counts;
  checkCount("observed", observed);
  checkCount("once", once);
  checkCount("twice", twice);
  if (once + twice > observed) throw new RangeError("more people named once or twice than named");
  if (interviews !== null) {
    checkCount("interviews", interviews);
    if (observed > 0 && interviews === 0) throw new RangeError("people named without an interview");
    if (observed > once && interviews < 2) throw new RangeError("named twice in one interview");
  }
  const factor = interviews === null || interviews === 0 ? 1 : (interviews - 1) / interviews;
  const fewPairs = (factor * once * (once - 1)) / 2;
  const added = twice > 0 ? (factor * once * once) / (2 * twice) : fewPairs;
  const corrected = observed + fewPairs / (twice + 1);
  const estimate = observed + added;
  if (twice === 0 || added === 0) {
    return { estimate, corrected, variance: null, standardError: null, interval: null };
  }
  const g = once / twice;
  const variance =
    twice * ((factor * g ** 2) / 2 + factor ** 2 * g ** 3 + (factor ** 2 * g ** 4) / 4);
  const spread = Math.exp(Z_95 * Math.sqrt(Math.log1p(variance / added ** 2)));
  return {
    estimate,
    corrected,
    variance,
    standardError: Math.sqrt(variance),
    interval: [observed + added / spread, observed + added * spread],
  };
}
