import type { Interval } from "../stats/wilson-interval.ts";

export type DoublingTime = {
  /** Whether the time is one of doubling (r > 0), of halving (r < 0), or neither (r = 0). */
  readonly kind: "doubling" | "halving" | "neither";
  /** ln 2/|r| in days; null for r = 0. */
  readonly days: number | null;
  /** From the limits of r; null when not determined. */
  readonly interval: Interval | null;
  /** False when the interval of r holds 0: then the time must not be printed as a finding. */
  readonly determined: boolean;
};

/**
 * Doubling or halving time of a growth rate.
 *
 * @param r per day
 * @param interval limits of r, or null when there are none (then nothing is determined)
 *
 * Cost: O(1). Source: methods C.9.6.
 */
export function doublingTime(r: number, interval: Interval | null): DoublingTime {
  const kind = r > 0 ? "doubling" : r < 0 ? "halving" : "neither";
  const days = r === 0 ? null : Math.LN2 / Math.abs(r);
  const determined = interval !== null && (interval[0] > 0 || interval[1] < 0);
  if (!determined) return { kind, days, interval: null, determined };
  const ends = interval.map((limit) => Math.LN2 / Math.abs(limit)) as Interval;
  return { kind, days, interval: r > 0 ? [ends[1], ends[0]] : ends, determined };
}
