import { binomialUpper } from "../stats/binomial-law.ts";
import { chiSquaredUpper } from "../stats/chi-squared-law.ts";
import { binomialWeight } from "../stats/law-weights.ts";
import { possiblePairs } from "./density.ts";
import { defined, type Measured, type UndefinedReason, undefinedBecause } from "./measured.ts";

/** A bin is closed as soon as it is expected to hold this many people (convention, fixed). */
export const FEWEST_EXPECTED = 5;

/** People with `from` to `to` pairs, both included. */
export type DegreeBin = {
  readonly from: number;
  readonly to: number;
  readonly expected: number;
  readonly observed: number;
};

export type DegreeFit = {
  /** Empty when there is nothing to pool (no people, no pairs, all pairs). */
  readonly bins: readonly DegreeBin[];
  /** X² = Σ(observed − expected)²/expected. */
  readonly statistic: Measured;
  /** bins − 1 − 1, since p is estimated. */
  readonly degreesOfFreedom: number | null;
  readonly pValue: Measured;
  /** p-value with one degree more: estimated from ungrouped data, the truth lies between the two. */
  readonly pValueUpper: Measured;
};

/** Closes bins from 0 upwards; what is left over at the end goes to the last one. */
function pooled(counts: ArrayLike<number>, n: number, p: number): DegreeBin[] {
  const most = n - 1;
  const bins: DegreeBin[] = [];
  const observedIn = (from: number, to: number) => {
    let people = 0;
    for (let k = from; k <= Math.min(to, counts.length - 1); k++) people += counts[k]!;
    return people;
  };
  let from = 0;
  let expected = 0;
  let left = n;
  for (let k = 0; k <= most; k++) {
    const here = n * binomialWeight(k, most - k, p, 1 - p);
    expected += here;
    if (expected < FEWEST_EXPECTED) continue;
    bins.push({ from, to: k, expected, observed: observedIn(from, k) });
    from = k + 1;
    expected = 0;
    // No further bin can close once fewer than that are expected in all that is left.
    left = n * binomialUpper(k, most, p);
    if (left < FEWEST_EXPECTED) break;
  }
  const last = bins.pop();
  if (last === undefined)
    return [{ from: 0, to: most, expected: n, observed: observedIn(0, most) }];
  bins.push({
    from: last.from,
    to: most,
    expected: last.expected + (from > most ? 0 : left),
    observed: observedIn(last.from, most),
  });
  return bins;
}

/**
 * χ² goodness of fit of the numbers of pairs to Binomial(n − 1, p) with p = 2m/(n(n − 1)).
 *
 * Pooling rule, fixed so that the same data give the same bins: scan k = 0, 1, …, close a bin as soon
 * as its expected count reaches 5, add what is left to the last bin. df = bins − 2; below 1 there is
 * no test (`too_few_people`).
 *
 * Cautions: degrees of one network depend on one another, so a simulated p-value is to be preferred;
 * with p estimated from ungrouped data the law of X² lies between χ² with df and df + 1.
 *
 * @param counts how many people have 0, 1, 2, … pairs (as `degreeCounts` gives them)
 * @throws RangeError when the counts are not whole, more than n − 1 pairs occur, or their sum is odd
 *
 * Edge cases: nobody `no_people`, one person `one_person`, no pair `no_pairs`, all pairs `all_pairs`.
 * Cost: O(k̄ + √k̄) weights. Source: Chernoff & Lehmann 1954; methods C.1.4.
 */
export function degreeFit(counts: ArrayLike<number>): DegreeFit {
  let n = 0;
  let ends = 0;
  for (let k = 0; k < counts.length; k++) {
    const people = counts[k]!;
    if (!Number.isSafeInteger(people) || people < 0) {
      throw new RangeError("counts must be whole numbers >= 0");
    }
    n += people;
    ends += k * people;
  }
  if (ends % 2 !== 0) throw new RangeError("each pair must be counted at both of its people");
  const none = (reason: UndefinedReason, bins: readonly DegreeBin[] = []): DegreeFit => ({
    bins,
    statistic: undefinedBecause(reason),
    degreesOfFreedom: null,
    pValue: undefinedBecause(reason),
    pValueUpper: undefinedBecause(reason),
  });
  if (n === 0) return none("no_people");
  for (let k = n; k < counts.length; k++) {
    if (counts[k]! > 0) throw new RangeError("nobody can have more than n − 1 pairs");
  }
  if (n === 1) return none("one_person");
  if (ends === 0) return none("no_pairs");
  const p = ends / 2 / possiblePairs(n);
  if (p === 1) return none("all_pairs");

  const bins = pooled(counts, n, p);
  const df = bins.length - 2;
  if (df < 1) return none("too_few_people", bins);
  let statistic = 0;
  for (const { expected, observed } of bins) statistic += (observed - expected) ** 2 / expected;
  return {
    bins,
    statistic: defined(statistic),
    degreesOfFreedom: df,
    pValue: defined(chiSquaredUpper(statistic, df)),
    pValueUpper: defined(chiSquaredUpper(statistic, df + 1)),
  };
}
