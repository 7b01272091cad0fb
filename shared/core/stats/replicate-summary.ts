import { monteCarloP } from "./monte-carlo-p.ts";
import { sampleQuantile } from "./sample-quantile.ts";

/** One figure over the replicates of a null model; null = undefined, `undefinedReplicates` tells. */
export type ReplicateSummary = {
  readonly mean: number | null;
  /** Standard deviation with divisor N − 1; null below two values. */
  readonly sd: number | null;
  /** Pointwise 95 % envelope: quantiles 0.025 and 0.975. */
  readonly low: number | null;
  readonly high: number | null;
  /** Monte Carlo p-values; null without an observed value. */
  readonly pUpper: number | null;
  readonly pLower: number | null;
  readonly pTwoSided: number | null;
  /** Replicates, and those on which the figure is undefined. */
  readonly replicates: number;
  readonly undefinedReplicates: number;
};

/**
 * Mean, spread, envelope and p-values of one figure.
 *
 * Mean, sd and envelope are over the replicates on which the figure is defined; the p-values are
 * over all of them (see `monteCarloP`).
 *
 * @param observed value of the observed network, NaN = undefined
 * @param values one value per replicate, NaN = undefined
 *
 * Cost: O(N log N). Source: methods C.7.4.
 */
export function replicateSummary(observed: number, values: ArrayLike<number>): ReplicateSummary {
  const defined = Float64Array.from(values)
    .filter((value) => !Number.isNaN(value))
    .sort();
  const { length } = defined;
  let sum = 0;
  for (const value of defined) sum += value;
  const mean = sum / length;
  let squares = 0;
  for (const value of defined) squares += (value - mean) ** 2;
  const p = monteCarloP(observed, values);
  return {
    mean: length === 0 ? null : mean,
    sd: length < 2 ? null : Math.sqrt(squares / (length - 1)),
    low: length === 0 ? null : sampleQuantile(defined, 0.025),
    high: length === 0 ? null : sampleQuantile(defined, 0.975),
    pUpper: p?.upper ?? null,
    pLower: p?.lower ?? null,
    pTwoSided: p?.twoSided ?? null,
    replicates: values.length,
    undefinedReplicates: values.length - length,
  };
}
