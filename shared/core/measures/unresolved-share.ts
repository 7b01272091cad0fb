import { checkCount } from "./check-count.ts";
import { defined, type Measured, undefinedBecause } from "./measured.ts";

/**
 * Share of the reported contacts who are still only a head count: heads of group exposures not yet
 * turned into people, over those and the people named.
 *
 * @param heads people in group exposures who could not be named
 * @param named distinct people named
 * @throws RangeError for counts that are not whole numbers >= 0
 *
 * Edge cases: neither on record → undefined (`no_group_or_contact`). Cost: O(1). Source: methods
 * B20.
 */
export function unresolvedShare(heads: number, named: number): Measured {
  checkCount("heads", heads);
  checkCount("named", named);
  const all = heads + named;
  return all === 0 ? undefinedBecause("no_group_or_contact") : defined(heads / all);
}
