import { checkMeanDegree } from "./check-input.ts";
import { excessDegreeRatio } from "./excess-degree.ts";
import { defined, type Measured, undefinedBecause } from "./measured.ts";

/**
 * Share φ* of people whose removal at random takes random mixing with mean degree c down to the
 * threshold: what is left has c(1 − φ), so φ* = 1 − 1/c.
 *
 * Edge cases: c <= 1 undefined (`not_above_threshold`): there is no large group to break.
 * @throws RangeError for a negative or non-finite c
 *
 * Cost: O(1). Source: methods C.10.
 */
export function removalThresholdMixing(c: number): Measured {
  checkMeanDegree(c);
  return c > 1 ? defined(1 - 1 / c) : undefinedBecause("not_above_threshold");
}

/**
 * The same for a random network with the recorded degrees: φ* = 1 − 1/(κ − 1), κ = ⟨k²⟩/⟨k⟩. Removal
 * of those with most pairs needs far fewer; this is for people taken at random.
 *
 * @param counts how many people have 0, 1, 2, … pairs
 *
 * Edge cases: no pair undefined (`no_pairs`); κ <= 2 undefined (`not_above_threshold`). Cost:
 * O(largest degree). Source: Cohen, Erez, ben-Avraham & Havlin 2000, PRL 85:4626; methods C.10.
 */
export function removalThresholdDegrees(counts: ArrayLike<number>): Measured {
  const ratio = excessDegreeRatio(counts);
  if (ratio.value === null) return ratio;
  return ratio.value > 2
    ? defined(1 - 1 / (ratio.value - 1))
    : undefinedBecause("not_above_threshold");
}
