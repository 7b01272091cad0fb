import type { Interval } from "../stats/wilson-interval.ts";

/** The three regions the mean degree can lie in, in ascending order. */
export type Region = "below" | "inside_window" | "above";

/** What may be said about the threshold; `not_distinguishable` when several regions stay open. */
export type Verdict = Region | "not_distinguishable";

/** Regions (−∞, 1 − w), [1 − w, 1 + w], (1 + w, ∞) that the interval meets, ascending. */
export function regionsMet(interval: Interval, halfWidth: number): Region[] {
  const [lower, upper] = interval;
  const met: Region[] = [];
  if (lower < 1 - halfWidth) met.push("below");
  if (lower <= 1 + halfWidth && upper >= 1 - halfWidth) met.push("inside_window");
  if (upper > 1 + halfWidth) met.push("above");
  return met;
}

/**
 * Verdict on an interval for the mean degree against the critical window 1 ± w: the one region
 * that holds the whole interval, else `not_distinguishable`.
 *
 * The factor 1 on w = n^(−1/3) is a convention: theory fixes only the order. Source: methods C.2.4.
 */
export function verdictOf(interval: Interval, halfWidth: number): Verdict {
  const met = regionsMet(interval, halfWidth);
  const [only] = met;
  return met.length === 1 && only !== undefined ? only : "not_distinguishable";
}
