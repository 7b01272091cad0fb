import { clopperPearsonInterval } from "../stats/clopper-pearson-interval.ts";
import { type Interval, wilsonInterval } from "../stats/wilson-interval.ts";
import { checkPairs } from "./check-input.ts";
import { possiblePairs } from "./density.ts";

export type MeanDegreeIntervals = { readonly wilson: Interval; readonly clopperPearson: Interval };

/**
 * 95 % intervals for the mean degree c of a complete network of n people with m pairs, if the pairs
 * are thought of as one draw in which each possible pair is there with the same probability:
 * the interval for m of n(n − 1)/2, times n − 1.
 *
 * @returns `null` for fewer than two people (no possible pair)
 * @throws RangeError for an impossible n or m
 *
 * Cost: two beta quantiles. Source: methods C.2.3.
 */
export function meanDegreeIntervals(n: number, m: number): MeanDegreeIntervals | null {
  checkPairs(n, m);
  const pairs = possiblePairs(n);
  const wilson = wilsonInterval(m, pairs);
  const exact = clopperPearsonInterval(m, pairs);
  if (wilson === null || exact === null) return null;
  const times = ([lower, upper]: Interval): Interval => [lower * (n - 1), upper * (n - 1)];
  return { wilson: times(wilson), clopperPearson: times(exact) };
}
