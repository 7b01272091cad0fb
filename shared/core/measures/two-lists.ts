import { checkCount } from "./check-count.ts";
import { defined, type Measured, undefinedBecause } from "./measured.ts";

export type TwoLists = {
  /** n₁n₂/both. */
  readonly lincolnPetersen: Measured;
  /** (n₁ + 1)(n₂ + 1)/(both + 1) − 1, defined without overlap too. */
  readonly chapman: number;
  /** Of `chapman`. */
  readonly variance: number;
};

/**
 * How many people there are when two lists name n₁ and n₂ of them and share some.
 *
 * Assumes that standing on one list says nothing about the other, that nobody enters or leaves, and
 * that matching is perfect. Two lists of one outbreak are rarely independent.
 *
 * @param first n₁
 * @param second n₂
 * @param both people on both lists
 * @throws RangeError for counts that are none, or more on both than on one
 *
 * Edge cases: no overlap → Lincoln–Petersen undefined (`no_overlap`). Cost: O(1). Source: Chapman
 * 1951, *Some properties of the hypergeometric distribution*; variance Seber 1970; methods C.8.3.
 */
export function twoLists(first: number, second: number, both: number): TwoLists {
  checkCount("first", first);
  checkCount("second", second);
  checkCount("both", both);
  if (both > Math.min(first, second)) throw new RangeError("more people on both lists than on one");
  return {
    lincolnPetersen: both === 0 ? undefinedBecause("no_overlap") : defined((first * second) / both),
    chapman: ((first + 1) * (second + 1)) / (both + 1) - 1,
    variance:
      ((first + 1) * (second + 1) * (first - both) * (second - both)) /
      ((both + 1) ** 2 * (both + 2)),
  };
}
