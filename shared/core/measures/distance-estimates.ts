import { checkMeanDegree, checkPeople } from "./check-input.ts";
import { defined, type Measured, undefinedBecause } from "./measured.ts";

const EULER = 0.5772156649015329;

export type DistanceEstimates = {
  /** ln n / ln c. */
  readonly simple: Measured;
  /** (ln n − γ)/ln c + ½, the better of the two. */
  readonly fronczak: Measured;
};

/**
 * Estimates of the mean number of steps between two people of the largest group under random mixing.
 *
 * For c clearly above 1 and a network that is nearly one group; neither is exact, and they differ by
 * 0.1 to 0.25 at the sizes seen here. c stands for p·n in the published formula.
 *
 * Edge cases: c <= 1 undefined (`not_above_threshold`); fewer than two people (`no_people`,
 * `one_person`).
 * @throws RangeError for n no whole number >= 0, or a negative or non-finite c
 *
 * Cost: O(1). Source: Fronczak, Fronczak & Hołyst 2004, *Average path length in random networks*
 * (formula read second-hand); methods C.3.2.
 */
export function distanceEstimates(n: number, c: number): DistanceEstimates {
  checkPeople(n);
  checkMeanDegree(c);
  if (n < 2 || c <= 1) {
    const why = n === 0 ? "no_people" : n === 1 ? "one_person" : "not_above_threshold";
    return { simple: undefinedBecause(why), fronczak: undefinedBecause(why) };
  }
  const steps = Math.log(c);
  return {
    simple: defined(Math.log(n) / steps),
    fronczak: defined((Math.log(n) - EULER) / steps + 0.5),
  };
}
