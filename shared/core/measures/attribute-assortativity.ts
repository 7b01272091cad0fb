import { defined, type Measured, undefinedBecause } from "./measured.ts";
import type { MixingCounts } from "./mixing-counts.ts";

/**
 * Attribute assortativity r = (Σ e_aa − Σ a_a²)/(1 − Σ a_a²), with e_aa the share of pairs inside
 * group a and a_a its share of link ends: 1 when no pair leaves its group, 0 when pairs are as
 * mixed as the ends alone would have it, at least −1. Pairs with a missing attribute are left out
 * (`MixingCounts.pairsLeftOut`).
 *
 * Edge cases: no pair counted (`no_pairs`); all pairs in one group (`one_group`, 0/0). Cost:
 * O(groups). Source: Newman 2003, *Mixing patterns in networks*; methods C.5.3.
 */
export function attributeAssortativity(counts: MixingCounts): Measured {
  const { pairs, inside, ends, groups } = counts;
  if (pairs === 0) return undefinedBecause("no_pairs");
  let squares = 0;
  for (let g = 0; g < groups; g++) {
    if (ends[g] === 2 * pairs) return undefinedBecause("one_group");
    squares += (ends[g]! / (2 * pairs)) ** 2;
  }
  return defined((inside / pairs - squares) / (1 - squares));
}
