import { type Interval, wilsonInterval } from "../stats/wilson-interval.ts";
import { checkCount } from "./check-count.ts";
import { defined, type Measured, undefinedBecause } from "./measured.ts";

export type SecondaryAttackRate = {
  /** Secondary cases over contacts at risk followed to an outcome. */
  readonly rate: Measured;
  /** 95 % Wilson; null without contacts. Too narrow when contacts share households. */
  readonly interval: Interval | null;
  /** The rate if none, and if all, of the contacts lost to follow-up were cases; null without any. */
  readonly bounds: Interval | null;
};

/**
 * Secondary attack rate: the share of contacts at risk who became cases.
 *
 * At risk leaves out co-primary cases and contacts who were ill already; that is the caller's.
 *
 * @param secondary contacts who became cases
 * @param followed contacts at risk followed to an outcome, those cases included
 * @param lost contacts at risk whose outcome is not known; left out of the rate
 * @throws RangeError for counts that are none, or more cases than contacts
 *
 * Edge cases: nobody followed → undefined (`no_contacts_followed`), never 0. Cost: O(1). Source:
 * methods C.9.2 (Wilson 1927), B17 and E8 (the bounds).
 */
export function secondaryAttackRate(
  secondary: number,
  followed: number,
  lost: number,
): SecondaryAttackRate {
  checkCount("secondary", secondary);
  checkCount("followed", followed);
  checkCount("lost", lost);
  if (secondary > followed) throw new RangeError("more secondary cases than contacts followed");
  const all = followed + lost;
  return {
    rate: followed === 0 ? undefinedBecause("no_contacts_followed") : defined(secondary / followed),
    interval: wilsonInterval(secondary, followed),
    bounds: all === 0 ? null : [secondary / all, (secondary + lost) / all],
  };
}
