import { lambertGiantShare } from "../stats/lambert-giant-share.ts";
import { type Interval, wilsonInterval } from "../stats/wilson-interval.ts";
import { possiblePairs } from "./density.ts";
import type { UndefinedReason } from "./measured.ts";
import { type Region, regionsMet, type Verdict, verdictOf } from "./verdict.ts";

/** No verdict on fewer people, or fewer interviewed people, than this (convention). */
export const FEWEST_FOR_VERDICT = 30;

/** Coverage i/n from which a record can stand for the whole population (convention). */
export const FULL_COVERAGE = 0.9;

/** `complete`: every pair of the n people is on record. `interviewed`: pairs come from interviews. */
export type ThresholdPopulation = "complete" | "interviewed";

export type ThresholdInput = {
  readonly population: ThresholdPopulation;
  /** Declared population at risk when set, else people on record. */
  readonly n: number;
  /** i, interviewed people among the n; ignored (taken as n) when complete. */
  readonly interviewed: number;
  /** Distinct pairs: all when complete, else those with at least one interviewed end. */
  readonly countedPairs: number;
  /** The exposures lie in one preset window; a freely chosen range gets no verdict. */
  readonly presetWindow: boolean;
  /** The chosen population is "all on record": a verdict needs `FULL_COVERAGE`. */
  readonly coverageRequired: boolean;
  /** Recall estimate q from double reports, or null. */
  readonly recall: number | null;
};

export type ThresholdFigures = {
  readonly population: ThresholdPopulation;
  readonly n: number;
  readonly interviewed: number;
  readonly pairsPerPerson: number | null;
  readonly pairsPerPersonInterval: Interval | null;
  /** w of the critical window 1 ± w. */
  readonly criticalHalfWidth: number | null;
  /** S(c) at `pairsPerPerson`. */
  readonly expectedGiantShare: number | null;
  readonly verdict: Verdict | null;
  /** The verdicts that remain open when `not_distinguishable`; else empty. */
  readonly openVerdicts: Region[];
  /** q; this and the next only when a recall estimate was given for interviewed people. */
  readonly recall?: number;
  /** `pairsPerPerson` corrected for recall, q taken as known; shown beside it, never instead. */
  readonly pairsPerPersonRecallCorrected?: number;
};

export type Threshold = ThresholdFigures & {
  /** Key of this object → why it is null, or why its verdict was weakened. */
  readonly reasons: Readonly<Record<string, UndefinedReason>>;
};

function check(input: ThresholdInput, interviewed: number, eligible: number): void {
  for (const count of [input.n, interviewed, input.countedPairs]) {
    if (!Number.isSafeInteger(count) || count < 0) {
      throw new RangeError("n, interviewed and countedPairs must be whole numbers >= 0");
    }
  }
  if (interviewed > input.n) throw new RangeError("interviewed cannot exceed n");
  if (input.countedPairs > eligible) throw new RangeError("more pairs than n people can have");
  if (input.recall !== null && !(input.recall > 0 && input.recall <= 1)) {
    throw new RangeError("recall must lie in (0, 1]");
  }
}

/**
 * What a figure must be multiplied by to allow for recall q: the eligible pairs X over the pairs
 * that would be told of them, C(i,2)·q2 + i(n − i)·q with q2 = 1 − (1 − q)².
 */
function recallFactor(q: number, n: number, i: number, eligible: number): number {
  const both = 1 - (1 - q) ** 2;
  return eligible / (possiblePairs(i) * both + i * (n - i) * q);
}

function withheldBecause(input: ThresholdInput, interviewed: number): UndefinedReason | null {
  const { n } = input;
  if (n < FEWEST_FOR_VERDICT || interviewed < FEWEST_FOR_VERDICT) return "too_few_people";
  if (!input.presetWindow) return "free_range";
  if (input.coverageRequired && interviewed / n < FULL_COVERAGE) return "coverage_low";
  return null;
}

/** The figures when no pair could have been seen: no people, one person, or no interview. */
function withoutPairs(n: number, i: number, reasons: Record<string, UndefinedReason>) {
  const why = n === 0 ? "no_people" : i === 0 ? "no_one_interviewed" : "one_person";
  const zero = why === "one_person" ? 0 : null;
  reasons.pairsPerPersonInterval = why;
  if (zero === null) {
    reasons.pairsPerPerson = why;
    reasons.expectedGiantShare = why;
  }
  if (n === 0) reasons.criticalHalfWidth = why;
  return {
    pairsPerPerson: zero,
    pairsPerPersonInterval: null,
    criticalHalfWidth: n === 0 ? null : 1 / Math.cbrt(n),
    expectedGiantShare: zero,
    verdict: null,
    openVerdicts: [],
    reasons,
  };
}

/**
 * The threshold figure: contact pairs per person against 1, where under random mixing one group
 * holding a large share of all people appears.
 *
 * Of n people i were interviewed. Pairs that an interview could have brought to light:
 * X = C(i,2) + i(n − i); p = countedPairs / X; **pairsPerPerson = (n − 1)·p** (c_e), interval =
 * Wilson limits of p times (n − 1), w = n^(−1/3). With i = n, and for a complete network, this is
 * c = 2m/n with the Wilson interval on all n(n − 1)/2 pairs. It is never the mean degree of traced
 * people, which runs near c + 1.
 *
 * Verdict by C.2.4; withheld (null) in this order: `too_few_people` (n or i below 30), `free_range`,
 * `coverage_low`. Readings chosen where the method leaves room:
 * - without a recall estimate the figure is a lower bound: "below" becomes `not_distinguishable`
 *   (`recall_unknown`), and whatever lies above the lower limit stays open; the other verdicts are
 *   given as the interval gives them;
 * - with one, "below" must hold for the corrected upper limit too, else `not_distinguishable`
 *   (`recall_low`), and the open regions reach up to the corrected upper limit;
 * - a complete network needs no recall estimate, and its `interviewed` is n;
 * - S(c) is always given when c is; it may stand beside the recorded largest share only when
 *   i/n is at least `FULL_COVERAGE`.
 *
 * Edge cases: n = 0 all null (`no_people`); n = 1 complete c = 0 without interval (`one_person`);
 * nobody interviewed → c null (`no_one_interviewed`).
 * @throws RangeError when counts are impossible or recall is outside (0, 1]
 *
 * Cost: O(1). Source: methods C.2.3, C.2.4 and the box at the head of C.8.
 */
export function threshold(input: ThresholdInput): Threshold {
  const { population, n, countedPairs } = input;
  const complete = population === "complete";
  const i = complete ? n : input.interviewed;
  const eligible = possiblePairs(i) + i * (n - i);
  check(input, i, eligible);

  const reasons: Record<string, UndefinedReason> = {};
  const withheld = withheldBecause(input, i);
  if (withheld) reasons.verdict = withheld;
  const shared = { population, n, interviewed: i };

  if (eligible === 0) return { ...shared, ...withoutPairs(n, i, reasons) };

  const w = 1 / Math.cbrt(n);
  const c = ((n - 1) * countedPairs) / eligible;
  const [lower, upper] = wilsonInterval(countedPairs, eligible) ?? [0, 1];
  const interval: Interval = [lower * (n - 1), upper * (n - 1)];
  const recall = complete ? null : input.recall;
  const factor = recall === null ? 1 : recallFactor(recall, n, i, eligible);

  // How high the true figure may reach: without a recall estimate c is only a lower bound.
  const top = recall === null && !complete ? Number.POSITIVE_INFINITY : interval[1] * factor;

  let verdict = withheld ? null : verdictOf(interval, w);
  if (verdict === "below" && top >= 1 - w) {
    verdict = "not_distinguishable";
    reasons.verdict = recall === null ? "recall_unknown" : "recall_low";
  }
  const openVerdicts = verdict === "not_distinguishable" ? regionsMet([interval[0], top], w) : [];
  return {
    ...shared,
    pairsPerPerson: c,
    pairsPerPersonInterval: interval,
    criticalHalfWidth: w,
    expectedGiantShare: lambertGiantShare(c),
    verdict,
    openVerdicts,
    ...(recall === null ? {} : { recall, pairsPerPersonRecallCorrected: c * factor }),
    reasons,
  };
}
