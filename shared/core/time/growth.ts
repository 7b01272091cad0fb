import { defined, type Measured, undefinedBecause } from "../measures/measured.ts";
import { studentQuantile } from "../stats/student-law.ts";
import { type Interval, Z_95 } from "../stats/wilson-interval.ts";
import { checkSeries } from "./case-series.ts";
import { type DoublingTime, doublingTime } from "./doubling-time.ts";

type Growth = {
  /** r, growth per day of the log of cases. */
  readonly rate: Measured;
  readonly standardError: number | null;
  /** 95 % limits of r. */
  readonly interval: Interval | null;
  readonly doubling: DoublingTime | null;
};

export type PoissonGrowth = Growth & {
  /** Pearson's χ² over days − 2; null with two days. */
  readonly dispersion: number | null;
  /** The standard error was widened by the root of a dispersion above 1 (quasi-Poisson). */
  readonly widened: boolean;
};

export type LogLinearGrowth = Growth & { readonly rSquared: number | null };

type Moments = { readonly mean: number; readonly variance: number };

/** Newton on a concave likelihood with halved steps; usually fewer than ten. */
const MOST_STEPS = 100;

const NONE = { standardError: null, interval: null, doubling: null } as const;

/** The weights e^(rt) of days 0 … days − 1, scaled so that the largest is 1, with mean and variance. */
function tilted(days: number, r: number): { weights: Float64Array; total: number } & Moments {
  const shift = r > 0 ? days - 1 : 0;
  const weights = Float64Array.from({ length: days }, (_, t) => Math.exp(r * (t - shift)));
  let [total, first, second] = [0, 0, 0];
  for (let t = 0; t < days; t++) {
    total += weights[t]!;
    first += weights[t]! * t;
  }
  const mean = first / total;
  for (let t = 0; t < days; t++) second += weights[t]! * (t - mean) ** 2;
  return { weights, total, mean, variance: second / total };
}

/**
 * Exponential growth of daily counts by Poisson regression, I_t ~ Poisson(e^(α + rt)). Preferred over
 * the log-linear fit: zeros are allowed.
 *
 * Given their sum the counts are multinomial with weights e^(rt), so r alone is solved for: the
 * weighted mean day must equal the cases' mean day. Information on r: cases × the weighted variance
 * of the day. With a dispersion above 1 the standard error is widened by its root.
 *
 * @param counts cases of consecutive days
 * @throws RangeError for counts that are none
 *
 * Edge cases: fewer than two days (`too_few_days`), no case (`no_cases`), all cases on the first or
 * the last day (`growth_unbounded`: r has no finite value). Cost: O(days) per step. Source: Poisson
 * generalised linear model; methods C.9.6.
 */
export function poissonGrowth(counts: ArrayLike<number>): PoissonGrowth {
  checkSeries("counts", counts);
  const days = counts.length;
  let cases = 0;
  let moment = 0;
  for (let t = 0; t < days; t++) {
    cases += counts[t]!;
    moment += t * counts[t]!;
  }
  const none = (reason: "too_few_days" | "no_cases" | "growth_unbounded"): PoissonGrowth => ({
    rate: undefinedBecause(reason),
    ...NONE,
    dispersion: null,
    widened: false,
  });
  if (days < 2) return none("too_few_days");
  if (cases === 0) return none("no_cases");
  if (moment === 0 || moment === (days - 1) * cases) return none("growth_unbounded");

  const target = moment / cases;
  let r = 0;
  let at = tilted(days, r);
  for (let step = 0; step < MOST_STEPS; step++) {
    let move = (target - at.mean) / at.variance;
    let next = tilted(days, r + move);
    // Too long a step overshoots into a flat tail: halve until the miss shrinks.
    while (Math.abs(next.mean - target) > Math.abs(at.mean - target) && Math.abs(move) > 1e-16) {
      move /= 2;
      next = tilted(days, r + move);
    }
    r += move;
    at = next;
    if (Math.abs(move) <= 1e-15 * Math.max(1, Math.abs(r))) break;
  }

  let pearson = 0;
  for (let t = 0; t < days; t++) {
    const expected = (cases * at.weights[t]!) / at.total;
    // Beyond the range of doubles nothing is expected, and nothing was seen.
    if (expected > 0) pearson += (counts[t]! - expected) ** 2 / expected;
  }
  const dispersion = days > 2 ? pearson / (days - 2) : null;
  const widened = dispersion !== null && dispersion > 1;
  const plain = 1 / Math.sqrt(cases * at.variance);
  const standardError = widened ? plain * Math.sqrt(dispersion) : plain;
  const interval: Interval = [r - Z_95 * standardError, r + Z_95 * standardError];
  return {
    rate: defined(r),
    standardError,
    interval,
    doubling: doublingTime(r, interval),
    dispersion,
    widened,
  };
}

/**
 * Exponential growth of daily counts by a straight line through their logarithms. It differs from
 * the Poisson fit (small counts weigh as much as large ones) and cannot take a zero.
 *
 * @param counts cases of consecutive days
 * @throws RangeError for counts that are none
 *
 * Edge cases: fewer than two days (`too_few_days`), a day without a case (`zero_count`); two days
 * give a rate without interval; equal counts give R² null. Cost: O(days). Source: least squares with
 * Student's t; methods C.9.6.
 */
export function logLinearGrowth(counts: ArrayLike<number>): LogLinearGrowth {
  checkSeries("counts", counts);
  const days = counts.length;
  const none = { ...NONE, rSquared: null };
  if (days < 2) return { rate: undefinedBecause("too_few_days"), ...none };
  let meanLog = 0;
  for (let t = 0; t < days; t++) {
    if (counts[t] === 0) return { rate: undefinedBecause("zero_count"), ...none };
    meanLog += Math.log(counts[t]!) / days;
  }
  const middle = (days - 1) / 2;
  let [spread, product, total] = [0, 0, 0];
  for (let t = 0; t < days; t++) {
    const log = Math.log(counts[t]!) - meanLog;
    spread += (t - middle) ** 2;
    product += (t - middle) * log;
    total += log * log;
  }
  const r = product / spread;
  let residual = 0;
  for (let t = 0; t < days; t++) {
    residual += (Math.log(counts[t]!) - meanLog - r * (t - middle)) ** 2;
  }
  const rSquared = total === 0 ? null : 1 - residual / total;
  if (days === 2) {
    return { rate: defined(r), ...NONE, doubling: doublingTime(r, null), rSquared };
  }
  const standardError = Math.sqrt(residual / (days - 2) / spread);
  const half = studentQuantile(0.975, days - 2) * standardError;
  const interval: Interval = [r - half, r + half];
  return {
    rate: defined(r),
    standardError,
    interval,
    doubling: doublingTime(r, interval),
    rSquared,
  };
}
