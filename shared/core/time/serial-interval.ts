import { defined, type Measured, undefinedBecause } from "../measures/measured.ts";
import { type GammaFit, gammaByLikelihood, gammaByMoments } from "../stats/gamma-fit.ts";
import { type SampleSummary, sampleSummary } from "../stats/sample-summary.ts";
import { studentQuantile } from "../stats/student-law.ts";
import type { Interval } from "../stats/wilson-interval.ts";

export type SerialInterval = {
  readonly days: SampleSummary;
  /** 95 % interval of the mean by Student's t; null with fewer than two values. */
  readonly meanInterval: Interval | null;
  readonly standardError: Measured;
  readonly moments: GammaFit;
  readonly likelihood: GammaFit;
};

/**
 * Serial interval: days from the onset of a case to the onset of the one they infected.
 *
 * Only pairs with a certain or probable link and both onsets belong here. Negative values are legal
 * (spread before symptoms); then there is no gamma fit (`values_not_positive`). In a growing
 * outbreak long intervals have not ended yet: what is seen is too short.
 *
 * @param days one value per pair
 * @throws RangeError for a value that is not finite
 *
 * Cost: O(count log count). Source: methods C.9.3; quantiles type 7.
 */
export function serialInterval(days: ArrayLike<number>): SerialInterval {
  const summary = sampleSummary(days);
  const { count, mean, standardDeviation } = summary;
  let meanInterval: Interval | null = null;
  let standardError: Measured = undefinedBecause(count === 0 ? "no_values" : "one_value");
  if (mean.value !== null && standardDeviation.value !== null) {
    const error = standardDeviation.value / Math.sqrt(count);
    const half = studentQuantile(0.975, count - 1) * error;
    standardError = defined(error);
    meanInterval = [mean.value - half, mean.value + half];
  }
  return {
    days: summary,
    meanInterval,
    standardError,
    moments: gammaByMoments(days),
    likelihood: gammaByLikelihood(days),
  };
}
