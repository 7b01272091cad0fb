import { defined, type Measured, undefinedBecause } from "../measures/measured.ts";
import { type Interval, Z_95 } from "../stats/wilson-interval.ts";
import {
  expectedInformation,
  lnLikelihood,
  lnPoissonLikelihood,
  type OffspringCounts,
  observedInformation,
  offspringCounts,
  score,
} from "./offspring-likelihood.ts";

export type OffspringFit = {
  readonly cases: number;
  readonly offspring: number;
  /** R, offspring per case; its greatest likelihood is the mean whatever k. */
  readonly mean: Measured;
  /** k of the negative binomial law: R's `size`, variance R(1 + R/k). **Not** 1/k. */
  readonly dispersion: Measured;
  /** Of `dispersion`, from the observed information; null when that is undefined. */
  readonly standardError: number | null;
  /** The same from the expected information. */
  readonly expectedStandardError: number | null;
  /** 95 % by profile likelihood; a limit that is not crossed is 0 or Infinity. */
  readonly interval: Interval | null;
  /** R²/(s² − R) with s² of divisor cases − 1; undefined where that is not above 0. */
  readonly momentDispersion: Measured;
  readonly logLikelihood: number | null;
  readonly poissonLogLikelihood: number | null;
  /** Twice their difference. */
  readonly likelihoodRatio: number | null;
};

/** ln k is looked for within ± this. */
const LOG_LIMIT = 10;

/** Halvings that take an interval of 20 below the spacing of doubles. */
const HALVINGS = 70;

/** Where a function of ln k that changes sign once does so, between two points. */
function crossing(f: (logK: number) => number, from: number, to: number): number {
  const rises = f(to) > 0;
  let [low, high] = [from, to];
  for (let step = 0; step < HALVINGS; step++) {
    const middle = (low + high) / 2;
    if (f(middle) > 0 === rises) high = middle;
    else low = middle;
  }
  return (low + high) / 2;
}

function profileInterval(counts: OffspringCounts, best: number, logBest: number): Interval {
  const drop = (Z_95 * Z_95) / 2;
  const above = (logK: number) => lnLikelihood(counts, Math.exp(logK)) - best + drop;
  const low = above(-LOG_LIMIT) < 0 ? Math.exp(crossing(above, -LOG_LIMIT, logBest)) : 0;
  const high =
    logBest < LOG_LIMIT && above(LOG_LIMIT) < 0
      ? Math.exp(crossing(above, logBest, LOG_LIMIT))
      : Number.POSITIVE_INFINITY;
  return [low, high];
}

/**
 * Offspring distribution: how unevenly cases infect others, as a negative binomial law fitted by
 * greatest likelihood, k over ln k in −10 … 10.
 *
 * Include cases with no known offspring, leave out those too recent to have finished infecting.
 * Cases without a known infector bias R down, and k either way.
 *
 * @param frequencies cases with 0, 1, 2, … offspring
 * @throws RangeError for frequencies that are not whole numbers >= 0
 *
 * Edge cases: no case → all undefined (`no_cases`); nobody infected anyone → k undefined
 * (`no_offspring`); variance (divisor cases) <= mean, or the best k at the boundary → k undefined
 * (`no_overdispersion`), with the interval's upper limit Infinity; a k below e^(−10), which takes a lone
 * great spreader among some 100,000 cases, is given as e^(−10). Cost: O(most offspring) per step,
 * a few hundred steps. Source: Lloyd-Smith, Schreiber, Kopp & Getz 2005, *Superspreading and the
 * effect of individual variation on disease emergence*; methods C.9.4.
 */
export function offspringFit(frequencies: ArrayLike<number>): OffspringFit {
  const counts = offspringCounts(frequencies);
  const { cases, offspring, mean, squares } = counts;
  const bare = {
    cases,
    offspring,
    standardError: null,
    expectedStandardError: null,
    interval: null,
  };
  if (offspring === 0) {
    const why = undefinedBecause(cases === 0 ? "no_cases" : "no_offspring");
    return {
      ...bare,
      mean: cases === 0 ? why : defined(0),
      dispersion: why,
      momentDispersion: why,
      logLikelihood: null,
      poissonLogLikelihood: cases === 0 ? null : 0,
      likelihoodRatio: null,
    };
  }
  const poisson = lnPoissonLikelihood(counts);
  const excess = squares / (cases - 1) - mean;
  const shared = {
    ...bare,
    mean: defined(mean),
    momentDispersion:
      cases > 1 && excess > 0 ? defined(mean ** 2 / excess) : undefinedBecause("no_overdispersion"),
    poissonLogLikelihood: poisson,
  };
  const slope = (logK: number) => score(counts, Math.exp(logK));
  // The likelihood has a peak if and only if the variance exceeds the mean (Levin & Reeds 1977).
  if (squares <= offspring || slope(LOG_LIMIT) >= 0) {
    return {
      ...shared,
      dispersion: undefinedBecause("no_overdispersion"),
      interval: profileInterval(counts, poisson, LOG_LIMIT),
      logLikelihood: poisson,
      likelihoodRatio: 0,
    };
  }
  const logBest = crossing(slope, -LOG_LIMIT, LOG_LIMIT);
  const k = Math.exp(logBest);
  const best = lnLikelihood(counts, k);
  return {
    ...shared,
    dispersion: defined(k),
    standardError: 1 / Math.sqrt(observedInformation(counts, k)),
    expectedStandardError: 1 / Math.sqrt(expectedInformation(counts, k)),
    interval: profileInterval(counts, best, logBest),
    logLikelihood: best,
    likelihoodRatio: 2 * (best - poisson),
  };
}
