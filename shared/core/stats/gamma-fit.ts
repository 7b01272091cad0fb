import { defined, type Measured, undefinedBecause } from "../measures/measured.ts";
import { digamma, trigamma } from "./digamma.ts";
import { sampleSummary } from "./sample-summary.ts";

/** Shape and **rate** (1/scale, per unit of the values) of a gamma law, undefined together. */
export type GammaFit = { readonly shape: Measured; readonly rate: Measured };

/** Newton on ln shape settles in fewer than ten steps from this start. */
const MOST_STEPS = 60;

function undefinedFit(
  reason: "no_values" | "one_value" | "values_all_equal" | "values_not_positive",
) {
  return { shape: undefinedBecause(reason), rate: undefinedBecause(reason) };
}

/** Mean and standard deviation, or why no gamma law can be fitted. */
function momentsOf(values: ArrayLike<number>) {
  const { count, mean, standardDeviation, least } = sampleSummary(values);
  if (mean.value === null || least.value === null) return "no_values";
  if (least.value <= 0) return "values_not_positive";
  if (count === 1 || standardDeviation.value === null) return "one_value";
  if (standardDeviation.value === 0) return "values_all_equal";
  return { mean: mean.value, deviation: standardDeviation.value };
}

/**
 * Gamma law with the mean and variance (divisor count − 1) of a sample: shape mean²/variance, rate
 * mean/variance.
 *
 * Edge cases: undefined for no value, one value, equal values, or any value <= 0 (a gamma law has
 * no room for it). Cost: O(count log count). Source: method of moments; methods C.9.3.
 */
export function gammaByMoments(values: ArrayLike<number>): GammaFit {
  const found = momentsOf(values);
  if (typeof found === "string") return undefinedFit(found);
  const ratio = found.mean / found.deviation;
  return { shape: defined(ratio * ratio), rate: defined(ratio / found.deviation) };
}

/**
 * Gamma law of greatest likelihood: the shape a solves ln a − ψ(a) = ln mean − mean of ln, the rate
 * is a/mean.
 *
 * Edge cases: as `gammaByMoments`. Cost: O(count log count). Source: maximum likelihood; methods
 * C.9.3.
 */
export function gammaByLikelihood(values: ArrayLike<number>): GammaFit {
  const found = momentsOf(values);
  if (typeof found === "string") return undefinedFit(found);
  // The mean of ln(value/mean), so that equal parts do not cancel.
  let logs = 0;
  for (let k = 0; k < values.length; k++) logs += Math.log(values[k]! / found.mean);
  const gap = -logs / values.length;
  if (!(gap > 0)) return undefinedFit("values_all_equal");
  // ln a − ψ(a) lies between 1/(2a) and 1/a; this start is off by 1.5 % at most.
  let shape = (3 - gap + Math.sqrt((gap - 3) ** 2 + 24 * gap)) / (12 * gap);
  for (let step = 0; step < MOST_STEPS; step++) {
    const excess = Math.log(shape) - digamma(shape) - gap;
    const move = excess / (1 - shape * trigamma(shape));
    shape *= Math.exp(-move);
    if (Math.abs(move) < 1e-15) break;
  }
  return { shape: defined(shape), rate: defined(shape / found.mean) };
}
