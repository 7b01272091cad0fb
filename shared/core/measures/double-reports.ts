import { checkCount } from "./check-count.ts";
import { defined, type Measured, undefinedBecause } from "./measured.ts";
import { recall } from "./recall.ts";

export type DoubleReports = {
  /** q, chance that one side names the other. */
  readonly recall: Measured;
  /** M, pairs there must have been, told or not. */
  readonly pairs: Measured;
};

/**
 * Recall and true number of pairs from pairs whose two ends were both interviewed: a named by both,
 * b by one, q = 2a/(2a + b), M = (2a + b)²/(4a).
 *
 * Assumes that both sides recall independently and equally well, and that both recall windows cover
 * the contact. Dependence between the reports makes M a lower bound; sides of unequal recall make
 * it too high (`equalRecallExcess`). Household pairs are recalled better: stratify.
 *
 * @param namedByBoth a
 * @param namedByOne b
 * @throws RangeError for counts that are not whole numbers >= 0
 *
 * Edge cases: a = 0 undefined (`no_double_reports`). Cost: O(1). Source: two-occasion
 * capture–recapture; methods C.8.2.
 */
export function doubleReports(namedByBoth: number, namedByOne: number): DoubleReports {
  const q = recall(namedByBoth, namedByOne);
  const told = 2 * namedByBoth + namedByOne;
  return {
    recall: q,
    pairs:
      namedByBoth === 0
        ? undefinedBecause("no_double_reports")
        : defined((told * told) / (4 * namedByBoth)),
  };
}

export type SidedReports = {
  /** Recall of the first side (say the cases): a / (pairs named by the second). */
  readonly recallFirst: Measured;
  readonly recallSecond: Measured;
  readonly pairs: Measured;
};

/**
 * The same where the two sides have roles (case and contact) and may recall unequally well: the
 * first side named n₁ pairs, the second n₂, both a of them; M = n₁n₂/a, recall of the first a/n₂.
 *
 * @param byFirst n₁, the pairs named by both included
 * @param bySecond n₂, likewise
 * @param byBoth a
 * @throws RangeError for counts that are none, or a above n₁ or n₂
 *
 * Edge cases: a = 0 undefined (`no_double_reports`). Cost: O(1). Source: Lincoln–Petersen; methods
 * C.8.2.
 */
export function sidedReports(byFirst: number, bySecond: number, byBoth: number): SidedReports {
  checkCount("byFirst", byFirst);
  checkCount("bySecond", bySecond);
  checkCount("byBoth", byBoth);
  if (byBoth > Math.min(byFirst, bySecond)) throw new RangeError("byBoth exceeds one of the sides");
  if (byBoth === 0) {
    const none = undefinedBecause("no_double_reports");
    return { recallFirst: none, recallSecond: none, pairs: none };
  }
  return {
    recallFirst: defined(byBoth / bySecond),
    recallSecond: defined(byBoth / byFirst),
    pairs: defined((byFirst * bySecond) / byBoth),
  };
}

/**
 * By what factor `doubleReports` overstates the number of pairs when the sides recall with q₁ and
 * q₂: (q₁ + q₂)²/(4q₁q₂), 1 when they are equal.
 *
 * @throws RangeError for a recall outside (0, 1]
 *
 * Cost: O(1). Source: methods C.8.2.
 */
export function equalRecallExcess(q1: number, q2: number): number {
  for (const q of [q1, q2]) {
    if (!(q > 0 && q <= 1)) throw new RangeError("recall must lie in (0, 1]");
  }
  return (q1 + q2) ** 2 / (4 * q1 * q2);
}
