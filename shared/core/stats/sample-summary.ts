import { defined, type Measured, undefinedBecause } from "../measures/measured.ts";
import { sampleQuantile } from "./sample-quantile.ts";

/** Centre and spread of a sample, in the unit of its values. */
export type SampleSummary = {
  readonly count: number;
  readonly mean: Measured;
  /** Divisor count − 1. */
  readonly standardDeviation: Measured;
  readonly median: Measured;
  /** First and third quartile, type 7. */
  readonly lowerQuartile: Measured;
  readonly upperQuartile: Measured;
  readonly least: Measured;
  readonly most: Measured;
};

/**
 * Mean, standard deviation, median and quartiles of a sample.
 *
 * @param values in any order; not changed
 * @throws RangeError for a value that is not finite
 *
 * Edge cases: no value → all undefined (`no_values`); one → no standard deviation (`one_value`).
 * Cost: O(count log count). Source: methods C.9.3 and rule 5 of B.
 */
export function sampleSummary(values: ArrayLike<number>): SampleSummary {
  const sorted = Float64Array.from(values).sort();
  const count = sorted.length;
  let total = 0;
  for (const value of sorted) {
    if (!Number.isFinite(value)) throw new RangeError("values must be finite numbers");
    total += value;
  }
  const mean = total / count;
  let squares = 0;
  for (const value of sorted) squares += (value - mean) ** 2;
  const at = (p: number): Measured =>
    count === 0 ? undefinedBecause("no_values") : defined(sampleQuantile(sorted, p));
  return {
    count,
    mean: count === 0 ? undefinedBecause("no_values") : defined(mean),
    standardDeviation:
      count < 2
        ? undefinedBecause(count === 0 ? "no_values" : "one_value")
        : defined(Math.sqrt(squares / (count - 1))),
    median: at(0.5),
    lowerQuartile: at(0.25),
    upperQuartile: at(0.75),
    least: at(0),
    most: at(1),
  };
}
