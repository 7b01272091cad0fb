import { incompleteGamma } from "../stats/incomplete-gamma.ts";

/**
 * Serial interval by whole days from a gamma law shifted by one day, each onset lying anywhere in
 * its day. With mean μ and standard deviation σ, a = ((μ − 1)/σ)², θ = σ²/(μ − 1) and F_a the gamma
 * law's share below:
 *
 *     w_k = k F_a(k) + (k − 2) F_a(k − 2) − 2(k − 1) F_a(k − 1)
 *           + a θ (2 F_{a+1}(k − 1) − F_{a+1}(k − 2) − F_{a+1}(k))
 *
 * Day 0 has weight 0. The weights of all days sum to 1; what lies beyond `lastDay` is missing.
 *
 * @param mean μ in days, > 1
 * @param deviation σ in days, > 0
 * @param lastDay last day to give, >= 1; default the first one by which at most 1e-6 is missing
 * @returns w_0 … w_lastDay
 * @throws RangeError outside these ranges
 *
 * Cost: O(lastDay) incomplete gamma functions. Source: Cori et al. 2013, web appendix 11; methods
 * C.9.5.
 */
export function serialIntervalWeights(
  mean: number,
  deviation: number,
  lastDay?: number,
): Float64Array {
  if (!(mean > 1 && Number.isFinite(mean))) throw new RangeError("mean must be above 1 day");
  if (!(deviation > 0 && Number.isFinite(deviation))) throw new RangeError("deviation must be > 0");
  if (lastDay !== undefined && !(Number.isSafeInteger(lastDay) && lastDay >= 1)) {
    throw new RangeError("lastDay must be a whole number >= 1");
  }
  const shape = ((mean - 1) / deviation) ** 2;
  const scale = deviation ** 2 / (mean - 1);
  const share = (a: number, day: number) => (day <= 0 ? 0 : incompleteGamma(a, day / scale).lower);
  const last = lastDay ?? lastDayFor(shape, scale);
  const weights = new Float64Array(last + 1);
  // k = 1 on; the formula's values at k = 0 are all 0.
  let [below, belowNext] = [0, 0];
  let [before, beforeNext] = [0, 0];
  for (let k = 1; k <= last; k++) {
    const [at, atNext] = [share(shape, k), share(shape + 1, k)];
    const weight =
      k * at +
      (k - 2) * below -
      2 * (k - 1) * before +
      shape * scale * (2 * beforeNext - belowNext - atNext);
    // Far out the terms cancel to a rounding below 0.
    weights[k] = Math.max(0, weight);
    [below, belowNext] = [before, beforeNext];
    [before, beforeNext] = [at, atNext];
  }
  return weights;
}

/** The first day by which at most a millionth is missing; bounded by thirty deviations and a year. */
function lastDayFor(shape: number, scale: number): number {
  const bound = Math.ceil(shape * scale + 30 * Math.sqrt(shape) * scale) + 366;
  let day = 2;
  // A weight reaches one day past its interval on either side.
  while (day < bound && incompleteGamma(shape, (day - 1) / scale).upper > 1e-6) day++;
  return day;
}

/**
 * Mean of a serial interval given by days, in days: Σ k w_k / Σ w_k.
 * @throws RangeError when no day has weight
 */
export function meanOfWeights(weights: ArrayLike<number>): number {
  let [total, days] = [0, 0];
  for (let k = 0; k < weights.length; k++) {
    total += weights[k]!;
    days += k * weights[k]!;
  }
  if (!(total > 0)) throw new RangeError("no day has weight");
  return days / total;
}
